import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { holdEquivalent } from "../../control/response/hold-equivalent";
import { type RiccatiProblem, solveRiccati } from "../../control/riccati/solve-riccati";
import { processorMs } from "../helpers/processor-time";

const I = (n: number) => Matrix.eye(n);
const refusal = (code: string, data?: Record<string, unknown>) =>
  expect.objectContaining(data ? { code, data: expect.objectContaining(data) } : { code });

describe("weights that no regulator problem has", () => {
  const plant = {
    A: new Matrix([
      [0, 1],
      [0, 0],
    ]),
    B: I(2),
  };
  test.each<[string, Partial<RiccatiProblem>, string, Record<string, unknown>]>([
    [
      "an input weight of zero",
      {
        R: new Matrix([
          [0, 0],
          [0, 0],
        ]),
      },
      "not-positive-definite",
      { matrix: "R", index: 0 },
    ],
    [
      "an indefinite input weight",
      {
        R: new Matrix([
          [1, 0],
          [0, -1],
        ]),
      },
      "not-positive-definite",
      { matrix: "R", index: 1 },
    ],
    [
      "a negative state weight",
      {
        Q: new Matrix([
          [1, 0],
          [0, -2],
        ]),
      },
      "not-positive-semidefinite",
      { matrix: "Q", eigenvalue: -2 },
    ],
    [
      "an unsymmetric state weight",
      {
        Q: new Matrix([
          [1, 1],
          [0, 1],
        ]),
      },
      "not-symmetric",
      { matrix: "Q" },
    ],
    ["a cross weight too large for its diagonal", { S: I(2).mul(2) }, "not-positive-semidefinite", { matrix: "[Q S; S' R]" }],
    ["a state weight of the wrong shape", { Q: I(3) }, "shape-mismatch", { matrix: "Q" }],
    [
      "a weight that is not a number",
      {
        R: new Matrix([
          [1, 0],
          [0, Number.NaN],
        ]),
      },
      "not-finite",
      { matrix: "R", row: 1, column: 1 },
    ],
  ])("%s is refused", (_, change, code, data) => {
    expect(() => solveRiccati({ ...plant, Q: I(2), R: I(2), ...change })).toThrow(refusal(code, data));
  });

  test("rounding below zero in C'C is not taken for indefiniteness", () => {
    const C = new Matrix([[0.1, 0.7, 0.3]]);
    const Q = C.transpose().mmul(C);
    const { residual, bound } = solveRiccati({ A: I(3).mul(-1), B: new Matrix([[1], [2], [3]]), Q, R: I(1) });
    expect(residual).toBeLessThanOrEqual(bound);
  });
});

describe("modes that stand in the way are named", () => {
  test("an unstable mode no input reaches", () => {
    const problem = {
      A: new Matrix([
        [1, 0],
        [1, -2],
      ]),
      B: new Matrix([[0], [1]]),
      Q: I(2),
      R: I(1),
    };
    expect(() => solveRiccati(problem)).toThrow(refusal("not-stabilizable", { pole: { re: 1, im: 0 }, state: 0, distance: 0 }));
  });

  test("an unstable pair out of reach behind a change of coordinates", () => {
    const hidden = new Matrix([
      [0.3, 2, 0],
      [-2, 0.3, 0],
      [1, 1, -1],
    ]);
    const turn = new Matrix([
      [0.6, 0, 0.8],
      [0, 1, 0],
      [-0.8, 0, 0.6],
    ]);
    const A = turn.mmul(hidden).mmul(turn.transpose());
    const B = turn.mmul(new Matrix([[0], [0], [1]]));
    try {
      solveRiccati({ A, B, Q: I(3), R: I(1) });
      expect.unreachable("a gain was returned");
    } catch (error) {
      expect(error).toEqual(refusal("not-stabilizable"));
      const { pole } = (error as { data: { pole: { re: number; im: number } } }).data;
      expect(pole.re).toBeCloseTo(0.3, 13);
      expect(pole.im).toBeCloseTo(2, 13);
    }
  });

  test("an unstable mode reached with 1e-13 of the input, but not one reached with 1e-7", () => {
    const problem = (input: number) => ({
      A: new Matrix([
        [1, 0],
        [0, -2],
      ]),
      B: new Matrix([[input], [1]]),
      Q: I(2),
      R: I(1),
    });
    expect(() => solveRiccati(problem(1e-13))).toThrow(refusal("not-stabilizable", { pole: { re: 1, im: 0 }, state: 0 }));
    const { closedLoopPoles, errorBound } = solveRiccati(problem(1e-7));
    expect(closedLoopPoles.every(({ re }) => re < 0)).toBe(true);
    expect(errorBound).toBeLessThan(1e-14);
  });

  test("weak inputs in weak units are not called out of reach", () => {
    const { K } = solveRiccati({ A: new Matrix([[1]]), B: new Matrix([[1e-13]]), Q: I(1), R: I(1) });
    // k = (1 + √(1 + b²)) / b
    expect(K.get(0, 0) / 2e13).toBeCloseTo(1, 14);
  });

  test.each([
    [
      "an undamped pair without weight",
      [
        [0, 1],
        [-1, 0],
      ],
      { re: 0, im: 1 },
      false,
    ],
    [
      "an integrator without weight",
      [
        [0, 1],
        [0, -1],
      ],
      { re: 0, im: 0 },
      false,
    ],
    [
      "a sampled integrator without weight",
      [
        [1, 0],
        [0, 0.5],
      ],
      { re: 1, im: 0 },
      true,
    ],
  ])("%s", (_, rows, pole, sampled) => {
    const problem = { A: new Matrix(rows), B: new Matrix([[1], [1]]), Q: Matrix.zeros(2, 2), R: I(1), sampled };
    expect(() => solveRiccati(problem)).toThrow(refusal("unweighted-boundary-mode", { pole, state: 0 }));
  });

  test.each([false, true])(
    "no weight at all leaves a drift where it is, however small rounding makes it, sampled: %s",
    (sampled) => {
      // Two carriages on a spring: a drift at rest, a slow decay, an oscillation.
      const A = new Matrix([
        [0, 0, 1, 0],
        [0, 0, 0, 1],
        [-355.3, 355.3, -0.4, 0],
        [355.3, -355.3, 0, -0.4],
      ]);
      const B = new Matrix([
        [0, 0],
        [0, 0],
        [1 / 12, 0],
        [0, 1 / 12],
      ]);
      const plant = sampled ? holdEquivalent({ A, B, period: 0.01 }) : { A, B };
      const problem = { A: plant.A, B: plant.B, Q: Matrix.zeros(4, 4), R: Matrix.diag([1 / 1600, 1 / 1600]), sampled };
      expect(() => solveRiccati(problem)).toThrow(refusal("unweighted-boundary-mode"));
    },
  );

  test("a sampled unstable mode no input reaches", () => {
    const problem = {
      A: new Matrix([
        [1.2, 0],
        [0.5, 0.4],
      ]),
      B: new Matrix([[0], [1]]),
      Q: I(2),
      R: I(1),
      sampled: true,
    };
    expect(() => solveRiccati(problem)).toThrow(refusal("not-stabilizable", { pole: { re: 1.2, im: 0 }, state: 0 }));
  });

  test("a closed loop on the axis (example 11 of SPC 95_22 with ε = 0) is refused, not returned with half its digits", () => {
    const problem = {
      A: new Matrix([
        [3, 1],
        [4, 2],
      ]),
      B: new Matrix([[1], [1]]),
      Q: new Matrix([
        [-11, -5],
        [-5, -2],
      ]),
      R: I(1),
      allowIndefinite: true,
    };
    expect(() => solveRiccati(problem)).toThrow(refusal("not-positive-semidefinite"));
  });

  test("a sampled problem without input weight and without inputs that count", () => {
    const problem = { A: I(2).mul(0.5), B: Matrix.zeros(2, 1), Q: I(2), R: Matrix.zeros(1, 1), sampled: true };
    expect(() => solveRiccati(problem)).toThrow(refusal("not-positive-definite", { matrix: "R + B'XB" }));
  });
});

describe("hard but solvable problems", () => {
  test("an unstable mode reached with 1e-7 beside strong inputs keeps its digits", () => {
    // k follows from the scalar problem when the other mode is unweighted and unreached: b k = 1 + √(1 + q b²).
    const b = 1e-7;
    const { K } = solveRiccati({
      A: new Matrix([
        [1, 0],
        [0, -2],
      ]),
      B: new Matrix([
        [b, 0],
        [0, 1],
      ]),
      Q: new Matrix([
        [1, 0],
        [0, 0],
      ]),
      R: I(2),
    });
    expect(K.get(0, 0) / ((1 + Math.sqrt(1 + b * b)) / b)).toBeCloseTo(1, 15);
    expect(K.get(1, 1)).toBe(0);
  });

  test("an oscillator with its rate weighted by q = 2^-40 gets exactly the damping √q", () => {
    // x'' = -w² x + u with q on the rate alone: k = [0, √q], exactly.
    const q = 2 ** -40;
    const { K } = solveRiccati({
      A: new Matrix([
        [0, 1],
        [-4, 0],
      ]),
      B: new Matrix([[0], [1]]),
      Q: new Matrix([
        [0, 0],
        [0, q],
      ]),
      R: I(1),
    });
    expect(K.get(0, 1)).toBe(2 ** -20);
    expect(Math.abs(K.get(0, 0))).toBeLessThan(1e-25);
  });

  test("a stable plant without weights needs no gain", () => {
    const { X, K, errorBound } = solveRiccati({ A: I(2).mul(-1), B: I(2), Q: Matrix.zeros(2, 2), R: I(2) });
    expect(X.to1DArray().concat(K.to1DArray())).toEqual([0, 0, 0, 0, 0, 0, 0, 0]);
    expect(errorBound).toBe(0);
  });

  test("sixty states are solved within two seconds", () => {
    const n = 60;
    const A = Matrix.zeros(n, n);
    for (let i = 0; i < n; i++) {
      A.set(i, i, i % 7 === 0 ? 0.1 : -0.5);
      if (i + 1 < n) A.set(i, i + 1, 1);
      if (i > 0) A.set(i, i - 1, -1);
    }
    const B = Matrix.zeros(n, 12);
    for (let j = 0; j < 12; j++) B.set(5 * j + 2, j, 1);
    const begin = processorMs();
    const { residual, bound, stabilityDistance } = solveRiccati({ A, B, Q: I(n), R: I(12) });
    expect(residual).toBeLessThanOrEqual(bound);
    expect(stabilityDistance).toBeGreaterThan(0);
    expect(processorMs() - begin).toBeLessThan(2000);
  });
});
