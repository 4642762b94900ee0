import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { bestStepLength } from "../../control/riccati/line-search";
import { type RiccatiProblem, solveRiccati } from "../../control/riccati/solve-riccati";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const EPS = Number.EPSILON;
const I = (n: number) => Matrix.eye(n);
const refusal = (code: string, data?: Record<string, unknown>) =>
  expect.objectContaining(data ? { code, data: expect.objectContaining(data) } : { code });

/** Largest error of a row relative to the row. */
function worstRow(M: Matrix, expected: Matrix): number {
  return Math.max(
    ...expected.to2DArray().map((row, i) => {
      const size = Math.sqrt(row.reduce((sum, x) => sum + x * x, 0));
      const off = Math.sqrt(row.reduce((sum, x, j) => sum + (M.get(i, j) - x) ** 2, 0));
      return size === 0 ? off : off / size;
    }),
  );
}

describe("input weights next to nothing", () => {
  test("a state weight of rank one and two cheap inputs, sampled: what the weight does not see is still optimal", () => {
    // The first state is seen and brought to zero at once; the second, with poles 3 and weight zero, is mirrored: k = 3 - 1/3.
    const problem = (r: number): RiccatiProblem => ({
      A: Matrix.diag([0.5, 3]),
      B: I(2),
      Q: Matrix.diag([1, 0]),
      R: I(2).mul(r),
      sampled: true,
    });
    for (const r of [2 ** -20, 2 ** -40, 2 ** -60]) {
      const { K, X, errorBound } = solveRiccati(problem(r));
      expect(Math.abs(K.get(1, 1) - (3 - 1 / 3))).toBeLessThan(4 * EPS);
      expect(Math.abs(X.get(1, 1) / (8 * r) - 1)).toBeLessThan(4 * EPS);
      expect(errorBound).toBeLessThan(1e-12);
    }
  });

  test("the same behind a rotation by 3, 4, 5: the gain keeps more digits than its weight has", () => {
    const T = new Matrix([
      [0.6, -0.8],
      [0.8, 0.6],
    ]);
    const r = 2 ** -36;
    const A = new Matrix([
      [0.5, 0],
      [0, 3],
    ]);
    const B = T.clone().mul(5);
    const { K, errorBound } = solveRiccati({ A, B, Q: Matrix.diag([1, 0]), R: I(2).mul(r), sampled: true });
    // In the inputs v = T u the plant splits: both rows then follow from scalar equations.
    const first = scalarGain(0.5, 5, 1, r);
    const second = (3 - 1 / 3) / 5;
    const expected = T.transpose().mmul(Matrix.diag([first, second]));
    expect(worstRow(K, expected)).toBeLessThan(1e-15);
    expect(errorBound).toBeLessThan(1e-12);
  });

  test("a continuous plant with input weight 1e-12 and a slow zero", () => {
    const random = seededUniform(3);
    for (let trial = 0; trial < 20; trial++) {
      const n = 3 + (trial % 6);
      const { stabilityDistance, errorBound, residual, bound } = solveRiccati({
        A: seededMatrix(random, n, n).mul(3),
        B: seededMatrix(random, n, 1),
        Q: I(n),
        R: new Matrix([[1e-12]]),
      });
      expect(stabilityDistance).toBeGreaterThan(0);
      expect(errorBound).toBeLessThan(1e-6);
      expect(residual).toBeLessThanOrEqual(bound);
    }
  });
});

/** Of x(k+1) = a x + b u with weights q, r: from the positive root of b² x² + (r - a² r - b² q) x - q r = 0. */
function scalarGain(a: number, b: number, q: number, r: number): number {
  const half = (b * b * q + a * a * r - r) / 2;
  const x = (half + Math.sqrt(half * half + b * b * q * r)) / (b * b);
  return (a * b * x) / (r + b * b * x);
}

describe("unstable modes that are hard to reach", () => {
  test.each([1e-5, 1e-7, 1e-9])("a mode reached with %d of the input: least effort mirrors it exactly", (weak) => {
    const { K, errorBound } = solveRiccati({
      A: Matrix.diag([1, -1]),
      B: new Matrix([[weak], [1]]),
      Q: Matrix.zeros(2, 2),
      R: I(1),
    });
    expect(Math.abs((K.get(0, 0) * weak) / 2 - 1)).toBeLessThan(4 * EPS);
    expect(K.get(0, 1)).toBe(0);
    expect(errorBound).toBeLessThan(1e-2);
  });

  test("sampled poles far outside the circle, one input", () => {
    const poles = [40, -25, 12, -6, 3];
    const { K, closedLoopPoles } = solveRiccati({
      A: Matrix.diag(poles),
      B: Matrix.ones(5, 1),
      Q: Matrix.zeros(5, 5),
      R: I(1),
      sampled: true,
    });
    expect(K.to1DArray().every(Number.isFinite)).toBe(true);
    const found = closedLoopPoles.map(({ re }) => re).sort((x, y) => x - y);
    const mirrored = poles.map((pole) => 1 / pole).sort((x, y) => x - y);
    for (const [k, pole] of found.entries()) expect(Math.abs(pole - mirrored[k])).toBeLessThan(1e-6);
  });
});

describe("modes on the boundary that a cross weight hides", () => {
  // With S the weight left for the states is Q - S R⁻¹ S', of the plant A - B R⁻¹ S'.
  test.each([
    ["continuous", false, { re: 0, im: 0 }],
    ["sampled", true, { re: 1, im: 0 }],
  ] as const)("%s: the state weight is used up by the cross weight", (_, sampled, pole) => {
    const S = new Matrix([[2], [0]]);
    const A = new Matrix([
      [sampled ? 3 : 2, 0],
      [0, sampled ? 0.5 : -1],
    ]);
    const problem = { A, B: new Matrix([[1], [0]]), Q: Matrix.diag([4, 1]), R: I(1), S, sampled };
    expect(() => solveRiccati(problem)).toThrow(refusal("unweighted-boundary-mode", { pole, state: 0 }));
    expect(() => solveRiccati({ ...problem, Q: Matrix.diag([4.5, 1]) })).not.toThrow();
  });
});

describe("numbers further apart than any digits", () => {
  test.each([1e-200, 1e160, 1e300])("an input matrix of size %d is refused for its size", (size) => {
    const problem = {
      A: new Matrix([
        [0.5, 1],
        [0.2, -1],
      ]),
      B: new Matrix([[1], [0.5]]).mul(size),
      Q: I(2),
      R: I(1),
    };
    expect(() => solveRiccati(problem)).toThrow(refusal("too-large"));
  });

  test.each([1e-300, 1e300])("everything times %d is solved as before", (size) => {
    const problem = {
      A: new Matrix([
        [0.5, 1],
        [0.2, -1],
      ]),
      B: new Matrix([[1], [0.5]]),
      Q: I(2),
      R: I(1),
    };
    const plain = solveRiccati({ ...problem, A: problem.A.clone(), B: problem.B.clone() });
    const scale = (M: Matrix) => M.clone().mul(2 ** Math.round(Math.log2(size)));
    const large = solveRiccati({ A: scale(problem.A), B: scale(problem.B), Q: scale(problem.Q), R: scale(problem.R) });
    expect(large.K.to2DArray()).toEqual(plain.K.to2DArray());
  });
});

test("states that act on no weighted state have rows of exact zeros", () => {
  const { X, K } = solveRiccati({
    A: new Matrix([
      [1, 2, 0, 0],
      [3, -1, 0, 0],
      [0.1, 0.7, -1, 0.3],
      [0.2, 0.9, -0.3, -2],
    ]),
    B: new Matrix([[1], [0.3], [0.6], [1]]),
    Q: Matrix.diag([1, 1, 0, 0]),
    R: I(1),
  });
  expect(
    X.subMatrix(2, 3, 0, 3)
      .to1DArray()
      .every((x) => x === 0),
  ).toBe(true);
  expect(K.subMatrix(0, 0, 2, 3).to1DArray()).toEqual([0, 0]);
});

test("the certificate says how far a change of the data can go: worse by the square of a weak input", () => {
  const condition = (weak: number) =>
    solveRiccati({ A: Matrix.diag([1, -2]), B: new Matrix([[weak], [1]]), Q: I(2), R: I(1) }).condition;
  expect(condition(1)).toBeGreaterThanOrEqual(1);
  expect(condition(1)).toBeLessThan(100);
  expect(condition(1e-4)).toBeGreaterThan(condition(1e-2));
});

test("the step length makes the residual least: no other length on a grid does better", () => {
  // a = 1, b = 1, q = 1, r = 1 at x = 10: residual 2x + 1 - x² = -79, full step n with 2 (1 - x) n + residual = 0.
  const problem = { n: 1, m: 1, sampled: false, a: f(1), b: f(1), q: f(1), r: f(1), s: f(0) };
  const residual = 2 * 10 + 1 - 100;
  const step = residual / (2 * (10 - 1));
  const length = bestStepLength(problem, f(1), f(residual), f(step));
  const at = (t: number) => Math.abs(2 * (10 + t * step) + 1 - (10 + t * step) ** 2);
  for (let t = 0; t <= 2; t += 1 / 64) expect(at(length)).toBeLessThanOrEqual(at(t) + 1e-6);
  expect(length).toBeGreaterThan(1);
});

function f(value: number): Float64Array {
  return Float64Array.of(value);
}
