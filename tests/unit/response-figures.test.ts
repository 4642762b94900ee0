import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { type ResponseRequest, respond } from "@/control/response/respond";
import { responseHorizon, roundUpToDecade } from "@/control/response/response-horizon";
import { timeGrid } from "@/control/response/sample-record";
import { processorMs } from "../helpers/processor-time";

/** z = y = x of a plant that is stable by itself, one input, unit step. */
function single(A: number[][], B: number[][], period: number | null, more: Partial<ResponseRequest> = {}): ResponseRequest {
  const H = new Matrix([A.map((_, i) => (i === 0 ? 1 : 0))]);
  return {
    plant: { A: new Matrix(A), B: new Matrix(B), C: H, D: new Matrix([[0]]), H, J: new Matrix([[0]]) },
    period,
    K: Matrix.zeros(1, A.length),
    F: Matrix.eye(1),
    observer: null,
    experiments: { amplitudes: [1], initialState: A.map(() => 0), inputDisturbance: [0] },
    room: [{ up: null, down: null }],
    horizon: null,
    ...more,
  };
}

describe("figures of a sampled loop", () => {
  test("1 - 0.5^k reaches 10 % at sample 1, 90 % at 4 and stays within 2 % from 6 on", () => {
    const [{ commanded }] = respond(single([[0.5]], [[0.5]], 0.1)).figures;
    expect(commanded[0]).toMatchObject({ final: 1, peak: 1, peakAt: null, overshoot: 0, undershoot: 0 });
    expect(commanded[0].rise).toBeCloseTo(0.3, 14);
    expect(commanded[0].settling).toBeCloseTo(0.6, 14);
  });

  test("1 - (-0.8)^k peaks at its first sample, 80 % beyond the set point", () => {
    const [{ commanded }] = respond(single([[-0.8]], [[1.8]], 1)).figures;
    expect(commanded[0].overshoot).toBeCloseTo(80, 12);
    expect(commanded[0]).toMatchObject({ peakAt: 1, rise: 0 });
    expect(commanded[0].settling).toBe(18); // 0.8^17 > 0.02 > 0.8^18
  });

  test("a loop that is done after two samples settles then", () => {
    const [{ commanded }] = respond(
      single(
        [
          [0, 1],
          [0, 0],
        ],
        [[0], [1]],
        0.5,
      ),
    ).figures;
    expect(commanded[0]).toMatchObject({ final: 1, settling: 1, overshoot: 0 });
  });
});

describe("efforts and cross-axis peaks", () => {
  test("an input is held against the way from the operating point to the limit on the side it goes to", () => {
    const request = single([[-1]], [[1]], null, { K: new Matrix([[3]]), F: new Matrix([[4]]), room: [{ up: 2, down: 0.5 }] });
    const [{ effort }] = respond(request).figures; // u = 4 - 3 x falls from 4 to 1
    expect(effort).toEqual([{ peak: 4, at: 0, overLimit: 2 }]);
    const down = respond({ ...request, experiments: { ...request.experiments, amplitudes: [-1] } });
    expect(down.figures[0].effort).toEqual([{ peak: 4, at: 0, overLimit: 8 }]);
    expect(down.summary.fullState.peakEffort).toEqual([{ peak: 4, overLimit: 8 }]);
  });

  test("an effort that only grows towards its final value has a peak but no time for it", () => {
    const [{ effort }] = respond(single([[-1]], [[1]], null, { K: new Matrix([[-0.5]]) })).figures;
    expect(effort[0].peak).toBeCloseTo(2, 12);
    expect(effort[0].at).toBeNull();
  });

  test("the worst cross-axis peak is named in parts of that quantity's own amplitude", () => {
    const plant = {
      A: new Matrix([
        [-1, 0],
        [0.5, -1],
      ]),
      B: Matrix.eye(2),
      C: Matrix.zeros(0, 2),
      D: Matrix.zeros(0, 2),
      H: Matrix.eye(2),
      J: Matrix.zeros(2, 2),
    };
    const request: ResponseRequest = {
      ...single([[-1]], [[1]], null),
      plant,
      K: Matrix.zeros(2, 2),
      F: Matrix.eye(2),
      experiments: { amplitudes: [2, 10], initialState: [0, 0], inputDisturbance: [0, 0] },
      room: [
        { up: null, down: null },
        { up: null, down: null },
      ],
    };
    const { summary, figures } = respond(request);
    expect(summary.fullState.worstCrossPeak).toMatchObject({ source: 0, signal: 1 });
    expect(summary.fullState.worstCrossPeak?.peak).toBeCloseTo(0.1, 12); // 2 · 0.5 over 10
    expect(figures[1].commanded[0]).toMatchObject({ final: 0, peak: 0, settling: null, rise: null });
  });

  test("without a reference gain there are no steps, but starts and disturbances", () => {
    const request = single([[-1]], [[1]], null, {
      F: null,
      experiments: { amplitudes: [1], initialState: [3], inputDisturbance: [2] },
    });
    const { records, figures, summary, horizon } = respond(request);
    expect(records.map(({ kind }) => kind)).toEqual(["initial", "disturbance"]);
    expect(figures).toEqual([]);
    expect(summary.fullState).toMatchObject({ worstSettling: null, worstCrossPeak: null });
    expect(horizon).toBe(10); // 1.3 ln 50 = 5.1 up to the next of 1, 2, 5
  });
});

describe("horizon and moments", () => {
  test.each([
    [1, 1],
    [1.0001, 2],
    [2, 2],
    [3, 5],
    [5.01, 10],
    [0.13, 0.2],
    [7e-7, 1e-6],
    [4.2e5, 5e5],
  ])("%d is rounded up to %d", (value, rounded) => expect(roundUpToDecade(value)).toBe(rounded));

  test("where nothing settles, four time constants of the slowest pole are shown", () => {
    expect(
      responseHorizon(
        null,
        0,
        [
          { re: -0.5, im: 3 },
          { re: -20, im: 0 },
        ],
        null,
      ),
    ).toBe(20);
    expect(responseHorizon(null, 0, [{ re: 0.5, im: 0 }], 0.1)).toBe(2);
    expect(responseHorizon(3.7, 100, [], null)).toBe(3.7);
    expect(responseHorizon(0.01, 1, [], 0.1)).toBe(0.1);
  });

  test("a sampled record keeps every k-th instant and reaches the horizon", () => {
    expect(timeGrid(1, 0.01, 401)).toEqual({ step: 0.01, samples: 101 });
    expect(timeGrid(10, 0.01, 401)).toEqual({ step: 0.03, samples: 335 });
    expect(timeGrid(2, null, 401)).toEqual({ step: 0.005, samples: 401 });
  });
});

describe("limits", () => {
  test.each([
    [
      "a lightly damped loop of 1e-9",
      [
        [0, 1],
        [-1, -2e-9],
      ],
      null,
    ],
    [
      "a sampled pole 1e-12 inside the circle",
      [
        [1 - 1e-12, 0.1],
        [0, 0.5],
      ],
      0.01,
    ],
    [
      "rates spread over 1e12",
      [
        [-1e-6, 1],
        [0, -1e6],
      ],
      null,
    ],
  ])("%s ends within seconds with figures or null, never with NaN", (_, A, period) => {
    const started = processorMs();
    const evidence = respond(single(A, [[0], [1]], period));
    expect(processorMs() - started).toBeLessThan(5_000);
    const { settling, peak } = evidence.figures[0].commanded[0];
    expect(settling === null || settling >= 0).toBe(true);
    expect(Number.isFinite(peak)).toBe(true);
    expect(evidence.records[0].values.every(Number.isFinite)).toBe(true);
  });

  test("a mode that would take longer to fade than any number of steps can count is refused as standing on the boundary", () => {
    const request = single(
      [
        [-1e-300, 0],
        [0, -1],
      ],
      [[0], [1]],
      null,
    );
    expect(() => respond(request)).toThrow(
      expect.objectContaining({ code: "on-stability-boundary", data: { distance: 1e-300 } }),
    );
  });

  test.each([1e-3, 1e-4, 1e-6, 1e-9])(
    "a mode with damping %d gets its settling time to the swing, however far off",
    (damping) => {
      const { settling, overshoot } = respond(
        single(
          [
            [0, 1],
            [-1, -2 * damping],
          ],
          [[0], [1]],
          null,
        ),
      ).figures[0].commanded[0];
      const turn = Math.sqrt(1 - damping * damping);
      // The last extreme outside the band stands at a whole number of half turns; the signal leaves the band soon after it.
      const extreme = (Math.floor((Math.log(50) * turn) / (damping * Math.PI)) * Math.PI) / turn;
      const beyond = (t: number) =>
        Math.exp(-damping * (extreme + t)) * (Math.cos(turn * t) + (damping / turn) * Math.sin(turn * t)) - 0.02;
      let [low, high] = [0, Math.PI / 2];
      for (let k = 0; k < 60; k++) {
        if (beyond((low + high) / 2) > 0) low = (low + high) / 2;
        else high = (low + high) / 2;
      }
      expect((settling ?? 0) / (extreme + low)).toBeCloseTo(1, 12);
      expect(overshoot).toBeCloseTo(100 * Math.exp((-damping * Math.PI) / turn), 10);
    },
  );

  test("a slow swing beside a fast one that fades just as slowly is honest about what it cannot prove", () => {
    const request = single(
      [
        [0, 1, 0, 0],
        [-1, -2e-7, 0, 0],
        [0, 0, 0, 1],
        [0, 0, -1.0001, -2e-7],
      ],
      [[0], [1], [0], [1]],
      null,
    );
    const H = new Matrix([[1, 0, 1, 0]]);
    const { peak, settling } = respond({ ...request, plant: { ...request.plant, H, C: H } }).figures[0].commanded[0];
    expect(peak).toBeGreaterThan(3.9); // both swings nearly in step at first
    expect(settling === null || settling > Math.log(50) / 1e-7).toBe(true);
  });

  test.each([1e2, 1e4, 1e6])("rates spread by %d, mixed over the states, keep eight digits of the settling time", (spread) => {
    const [c, s] = [0.6, 0.8]; // states turned by the angle with this cosine and sine
    const [slow, fast] = [1, spread];
    const A = [
      [-slow * c * c - fast * s * s, (fast - slow) * c * s],
      [(fast - slow) * c * s, -slow * s * s - fast * c * c],
    ];
    const request = single(A, [[c * slow - s * fast], [s * slow + c * fast]], null);
    const H = new Matrix([[(c - s) / 2, (s + c) / 2]]); // half of each mode
    const { settling, overshoot } = respond({ ...request, plant: { ...request.plant, H, C: H } }).figures[0].commanded[0];
    expect((settling ?? 0) / Math.log(25)).toBeCloseTo(1, 8);
    expect(overshoot).toBe(0);
  });

  test("records of many signals are thinned", () => {
    const n = 60;
    const A = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => (i === j ? -1 - i / n : 0)));
    const inputs = 12;
    const B = Array.from({ length: n }, (_, i) => Array.from({ length: inputs }, (_, j) => (i === j ? 1 : 0)));
    const request: ResponseRequest = {
      plant: {
        A: new Matrix(A),
        B: new Matrix(B),
        C: Matrix.eye(12, n),
        D: Matrix.zeros(12, inputs),
        H: Matrix.eye(12, n),
        J: Matrix.zeros(12, inputs),
      },
      period: null,
      K: Matrix.zeros(inputs, n),
      F: Matrix.eye(inputs),
      observer: { kind: "full", L: Matrix.zeros(n, 12) },
      experiments: { amplitudes: Array(12).fill(1), initialState: Array(n).fill(1), inputDisturbance: Array(12).fill(1) },
      room: Array(12).fill({ up: null, down: null }),
      horizon: null,
    };
    const { records } = respond(request);
    const total = records.reduce((sum, { values }) => sum + values.length, 0);
    expect(records[0].samples).toBeLessThan(401);
    expect(total).toBeLessThanOrEqual(2 ** 21);
  });

  test("lists of the wrong length and responses beyond the largest double are refused", () => {
    const request = single([[-1]], [[1]], null);
    const { experiments } = request;
    expect(() => respond({ ...request, experiments: { ...experiments, initialState: [] } })).toThrow(NumericalError);
    expect(() =>
      respond({
        ...request,
        experiments: { ...experiments, initialState: [1e308] },
        plant: { ...request.plant, H: new Matrix([[1e308]]) },
      }),
    ).toThrow(NumericalError);
  });
});
