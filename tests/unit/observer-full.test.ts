import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import type { NumericalError } from "../../control/errors";
import { observerByPoles } from "../../control/observer/observer-by-poles";
import { observerFromNoise } from "../../control/observer/observer-from-noise";
import { placePoles } from "../../control/poles/place-poles";
import { seededMatrix, seededUniform } from "../helpers/seeded";

function refusal(run: () => unknown): NumericalError {
  try {
    run();
  } catch (error) {
    return error as NumericalError;
  }
  throw new Error("expected a refusal");
}

const real = (...values: number[]) => values.map((re) => ({ re, im: 0 }));

/** The first state is unstable and no output sees it when `seen` is zero. */
const plant = (seen: number) => ({
  A: new Matrix([
    [0.5, 0, 0],
    [0, -1, 1],
    [0, -0.5, -2],
  ]),
  C: new Matrix([[seen, 1, 0]]),
});

describe("observerByPoles", () => {
  test("is the transposed regulator of the dual plant, bit for bit", () => {
    const random = seededUniform(3);
    const A = seededMatrix(random, 5, 5);
    const C = seededMatrix(random, 2, 5);
    const poles = real(-1, -2, -3, -4, -5);
    const { L } = observerByPoles({ A, C, poles });
    const { K } = placePoles({ A: A.transpose(), B: C.transpose(), poles });
    expect(L.to2DArray()).toEqual(K.transpose().to2DArray());
  });

  test("refuses a mode that no output sees, naming pole, state and distance", () => {
    const error = refusal(() => observerByPoles({ ...plant(0), poles: real(-5, -6, -7) }));
    expect(error.code).toBe("not-observable");
    expect(error.data).toEqual({ pole: { re: 0.5, im: 0 }, state: 0, distance: expect.closeTo(0, 15) });
  });

  test("tells the other refusals in terms of the observer", () => {
    expect(refusal(() => observerByPoles({ ...plant(1), poles: real(-5, -6) })).code).toBe("pole-count");
    const repeated = refusal(() => observerByPoles({ ...plant(1), poles: real(-5, -5, -6) }));
    expect([repeated.code, repeated.data.rank]).toEqual(["pole-multiplicity", 1]);
    const shape = refusal(() => observerByPoles({ A: plant(1).A, C: new Matrix([[1, 0]]), poles: real(-1, -2, -3) }));
    expect([shape.code, shape.data.matrix]).toEqual(["shape-mismatch", "C"]);
    const spoiled = new Matrix([[1, Number.NaN, 0]]);
    expect(refusal(() => observerByPoles({ A: plant(1).A, C: spoiled, poles: real(-1, -2, -3) })).data.matrix).toBe("C");
  });

  test("keeps a mode that no output sees when it is wanted", () => {
    const A = new Matrix([
      [-3, 0, 0],
      [0, -1, 1],
      [0, -0.5, -2],
    ]);
    const { fixedModes, achieved } = observerByPoles({ A, C: new Matrix([[0, 1, 0]]), poles: real(-6, -3, -7) });
    expect(fixedModes).toEqual([{ re: -3, im: 0 }]);
    expect(achieved[1].re).toBeCloseTo(-3, 14);
  });
});

describe("observerFromNoise", () => {
  const noise = { processNoise: Matrix.eye(3), measurementNoise: Matrix.eye(1) };

  test("solves the covariance equation of the filter, continuous and sampled", () => {
    const { A, C } = plant(1);
    const continuous = observerFromNoise({ A, C, ...noise });
    const { L, covariance: P } = continuous;
    const rate = A.mmul(P).add(P.mmul(A.transpose())).add(noise.processNoise).sub(L.mmul(L.transpose()));
    expect(Math.max(...rate.to1DArray().map(Math.abs))).toBeLessThan(1e-13);
    expect(continuous.achieved.every(({ re }) => re < 0)).toBe(true);
    const sampled = observerFromNoise({ A, C, ...noise, sampled: true });
    const M = sampled.covariance;
    const V = C.mmul(M).mmul(C.transpose()).get(0, 0) + 1;
    const gain = A.mmul(M).mmul(C.transpose()).div(V);
    expect(Math.max(...Matrix.sub(gain, sampled.L).to1DArray().map(Math.abs))).toBeLessThan(1e-14);
    const next = A.mmul(M).mmul(A.transpose()).add(noise.processNoise).sub(gain.mmul(gain.transpose()).mul(V)).sub(M);
    expect(Math.max(...next.to1DArray().map(Math.abs))).toBeLessThan(1e-13);
    expect(sampled.achieved.every(({ re, im }) => Math.hypot(re, im) < 1)).toBe(true);
  });

  test("refuses an undetectable mode, naming pole and state", () => {
    const error = refusal(() => observerFromNoise({ ...plant(0), ...noise }));
    expect([error.code, error.data.pole, error.data.state]).toEqual(["not-detectable", { re: 0.5, im: 0 }, 0]);
  });

  test("names the noise matrix that is at fault", () => {
    const { A, C } = plant(1);
    const negative = refusal(() =>
      observerFromNoise({ A, C, processNoise: Matrix.eye(3).mul(-1), measurementNoise: Matrix.eye(1) }),
    );
    expect([negative.code, negative.data.matrix]).toEqual(["not-positive-semidefinite", "process noise"]);
    for (const sampled of [false, true]) {
      const exact = refusal(() =>
        observerFromNoise({ A, C, processNoise: Matrix.eye(3), measurementNoise: Matrix.zeros(1, 1), sampled }),
      );
      expect([exact.code, exact.data.matrix]).toEqual(["not-positive-definite", "measurement noise"]);
    }
    const lopsided = Matrix.eye(3).set(0, 1, 1);
    const error = refusal(() => observerFromNoise({ A, C, processNoise: lopsided, measurementNoise: Matrix.eye(1) }));
    expect([error.code, error.data.matrix]).toEqual(["not-symmetric", "process noise"]);
    const short = refusal(() => observerFromNoise({ A, C, processNoise: Matrix.eye(2), measurementNoise: Matrix.eye(1) }));
    expect([short.code, short.data.matrix]).toEqual(["shape-mismatch", "process noise"]);
  });

  test("refuses a mode on the boundary that the process noise does not drive", () => {
    const A = new Matrix([
      [0, 0],
      [0, -1],
    ]);
    const error = refusal(() =>
      observerFromNoise({
        A,
        C: new Matrix([[1, 1]]),
        processNoise: new Matrix([
          [0, 0],
          [0, 1],
        ]),
        measurementNoise: Matrix.eye(1),
      }),
    );
    expect([error.code, error.data.state]).toEqual(["unweighted-boundary-mode", 0]);
  });
});
