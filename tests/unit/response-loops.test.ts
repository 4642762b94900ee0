import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { observerByPoles } from "@/control/observer/observer-by-poles";
import { reducedObserver } from "@/control/observer/reduced-observer";
import { placePoles } from "@/control/poles/place-poles";
import type { LoopPlant, ObserverInLoop } from "@/control/response/close-loop";
import { respond } from "@/control/response/respond";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const [n, m, p, q] = [5, 2, 2, 2];
const SAMPLES = 60;
const random = seededUniform(77);
const plant: LoopPlant = {
  A: Matrix.mul(seededMatrix(random, n, n), 0.9),
  B: seededMatrix(random, n, m),
  C: seededMatrix(random, p, n),
  D: seededMatrix(random, p, m),
  H: seededMatrix(random, q, n),
  J: seededMatrix(random, q, m),
};
const F = seededMatrix(random, m, q);
const real = (...values: number[]) => values.map((re) => ({ re, im: 0 }));
const { K } = placePoles({ A: plant.A, B: plant.B, poles: real(0.5, 0.45, 0.4, 0.35, 0.3) });
const { L } = observerByPoles({ A: plant.A, C: plant.C, poles: real(0.2, 0.15, 0.1, 0.05, 0.01) });
const small = reducedObserver({ ...plant, poles: real(0.2, 0.1, 0.05) });

const column = (values: readonly number[]) => Matrix.columnVector([...values]);

/** The loop as its definition reads, sample by sample; rows as in a response record. */
function simulate(
  observer: ObserverInLoop | null,
  x0: readonly number[],
  r: readonly number[],
  d: readonly number[],
): number[][] {
  const { A, B, C, D, H, J } = plant;
  const rows: number[][] = [];
  let x = column(x0);
  let own = Matrix.zeros(observer?.kind === "reduced" ? observer.Fw.rows : n, 1);
  for (let k = 0; k < SAMPLES; k++) {
    // y - D u = C x + D d holds whatever u is, so the estimate is known before u
    const seen = Matrix.add(C.mmul(x), D.mmul(column(d)));
    const estimate =
      observer === null ? x : observer.kind === "full" ? own : Matrix.add(observer.Gw.mmul(own), observer.Gy.mmul(seen));
    const u = Matrix.sub(F.mmul(column(r)), K.mmul(estimate));
    const input = Matrix.add(u, column(d));
    const y = Matrix.add(C.mmul(x), D.mmul(input));
    const z = Matrix.add(H.mmul(x), J.mmul(input));
    rows.push([z, y, x, ...(observer ? [estimate] : []), u].flatMap((M) => M.to1DArray()));
    if (observer?.kind === "full") {
      const innovation = Matrix.sub(y, Matrix.add(C.mmul(own), D.mmul(u)));
      own = Matrix.add(Matrix.add(A.mmul(own), B.mmul(u)), observer.L.mmul(innovation));
    } else if (observer?.kind === "reduced") {
      own = Matrix.add(Matrix.add(observer.Fw.mmul(own), observer.Fy.mmul(y)), observer.Fu.mmul(u));
    }
    x = Matrix.add(A.mmul(x), B.mmul(input));
  }
  return rows;
}

const x0 = [1, -0.5, 0.25, 2, -1];
const request = (observer: ObserverInLoop | null) => ({
  plant,
  period: 0.1,
  K,
  F,
  observer,
  experiments: { amplitudes: [2, -1], initialState: x0, inputDisturbance: [0.5, 3] },
  room: [
    { up: null, down: null },
    { up: null, down: null },
  ],
  horizon: (SAMPLES - 1) * 0.1,
});

describe.each<[string, ObserverInLoop | null]>([
  ["full state", null],
  ["full-order observer", { kind: "full", L }],
  ["reduced-order observer", { kind: "reduced", ...small }],
])("the loop with %s", (_, observer) => {
  test("goes sample by sample as its definition says, for set points, a start and disturbances", () => {
    const wanted = observer ? "observer" : "full-state";
    const records = respond(request(observer)).records.filter(({ loop }) => loop === wanted);
    expect(records.map(({ kind, source, amplitude }) => [kind, source, amplitude])).toEqual([
      ["step", 0, 2],
      ["step", 1, -1],
      ["initial", 0, 1],
      ["disturbance", 0, 0.5],
      ["disturbance", 1, 3],
    ]);
    const zero = [0, 0];
    const rest = x0.map(() => 0);
    const truths = [
      simulate(observer, rest, [2, 0], zero),
      simulate(observer, rest, [0, -1], zero),
      simulate(observer, x0, zero, zero),
      simulate(observer, rest, zero, [0.5, 0]),
      simulate(observer, rest, zero, [0, 3]),
    ];
    records.forEach(({ values, samples, step }, i) => {
      expect(samples).toBe(SAMPLES);
      expect(step).toBeCloseTo(0.1, 15);
      const size = Math.max(...truths[i].flat().map(Math.abs));
      const worst = Math.max(
        ...truths[i].flatMap((row, k) => row.map((value, signal) => Math.abs(values[signal * samples + k] - value))),
      );
      expect(worst).toBeLessThanOrEqual(1e-12 * size); // gains of size 10 to 100 multiply the rounding of each sample
    });
  });
});

test("with an observer the full-state responses are given, too", () => {
  const evidence = respond(request({ kind: "full", L }));
  expect(evidence.records.map(({ loop }) => loop)).toEqual([...Array(5).fill("full-state"), ...Array(5).fill("observer")]);
  expect(evidence.figures).toHaveLength(4);
  expect(evidence.summary.observer).not.toBeNull();
});

test("a set point does not disturb a full-order estimate: both loops step alike", () => {
  const { figures } = respond(request({ kind: "full", L }));
  const [plain, observed] = [figures[0].commanded[0], figures[2].commanded[0]];
  expect(observed.settling).toBe(plain.settling);
  expect(observed.peak).toBeCloseTo(plain.peak, 12);
});

test("matrices of a reduced-order observer that belong to another plant are refused", () => {
  const foreign = { kind: "reduced" as const, ...small, Fy: Matrix.mul(small.Fy, 2) };
  expect(() => respond(request(foreign))).toThrow(NumericalError);
});

test("a loop that does not settle is refused with its pole", () => {
  const loose = { ...request(null), K: Matrix.zeros(m, n), plant: { ...plant, A: Matrix.mul(Matrix.eye(n), 1.25) } };
  expect(() => respond(loose)).toThrow(expect.objectContaining({ code: "not-stabilising", data: { pole: { re: 1.25, im: 0 } } }));
});
