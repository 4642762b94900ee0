import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { solveRiccati } from "../../control/riccati/solve-riccati";

const EPS = Number.EPSILON;
const ROOT5 = Math.sqrt(5);

/** Every entry within two roundings of the closed form, which is itself rounded. */
function expectEntries(M: Matrix, expected: number[][]): void {
  expect([M.rows, M.columns]).toEqual([expected.length, expected[0].length]);
  for (const [i, row] of expected.entries()) {
    for (const [j, value] of row.entries()) expect(Math.abs(M.get(i, j) - value)).toBeLessThanOrEqual(2 * EPS * Math.abs(value));
  }
}

const times = (factor: number, rows: number[][]) => rows.map((row) => row.map((entry) => factor * entry));

// Benner, Laub & Mehrmann, A collection of benchmark examples for the numerical solution of algebraic Riccati equations I:
// continuous-time case, report SPC 95_22, TU Chemnitz-Zwickau 1995.
describe("continuous equations with printed closed forms (SPC 95_22)", () => {
  test("example 1: X = [2 1; 1 2]", () => {
    const { X, K, residual, bound, closedLoopPoles } = solveRiccati({
      A: new Matrix([
        [0, 1],
        [0, 0],
      ]),
      B: new Matrix([[0], [1]]),
      Q: new Matrix([
        [1, 0],
        [0, 2],
      ]),
      R: new Matrix([[1]]),
    });
    expectEntries(X, [
      [2, 1],
      [1, 2],
    ]);
    expectEntries(K, [[1, 2]]);
    expect(residual).toBeLessThanOrEqual(bound);
    for (const pole of closedLoopPoles) expect(Math.abs(pole.re + 1) + Math.abs(pole.im)).toBeLessThan(1e-7);
  });

  test("example 2: X = (1 + √2) [9 6; 6 4], singular, with a stable mode out of reach", () => {
    const { X, K, residual, bound } = solveRiccati({
      A: new Matrix([
        [4, 3],
        [-4.5, -3.5],
      ]),
      B: new Matrix([[1], [-1]]),
      Q: new Matrix([
        [9, 6],
        [6, 4],
      ]),
      R: new Matrix([[1]]),
    });
    expectEntries(
      X,
      times(1 + Math.SQRT2, [
        [9, 6],
        [6, 4],
      ]),
    );
    expectEntries(K, times(1 + Math.SQRT2, [[3, 2]]));
    expect(residual).toBeLessThanOrEqual(bound);
  });

  test.each([1, 1e3, 1e6])("example 9 with ε = %d, badly scaled", (e) => {
    const root = Math.sqrt(1 + 2 * e);
    const { X } = solveRiccati({
      A: new Matrix([
        [0, e],
        [0, 0],
      ]),
      B: new Matrix([[0], [1]]),
      Q: Matrix.eye(2),
      R: new Matrix([[1]]),
    });
    expectEntries(X, [
      [root / e, 1],
      [1, root],
    ]);
  });

  test("example 11 with ε = 1: X = [2 1; 1 1] although its state weight is indefinite", () => {
    const problem = {
      A: new Matrix([
        [2, 1],
        [4, 1],
      ]),
      B: new Matrix([[1], [1]]),
      Q: new Matrix([
        [-7, -3],
        [-3, 0],
      ]),
      R: new Matrix([[1]]),
    };
    expectEntries(solveRiccati({ ...problem, allowIndefinite: true }).X, [
      [2, 1],
      [1, 1],
    ]);
    expect(() => solveRiccati(problem)).toThrow(expect.objectContaining({ code: "not-positive-semidefinite" }));
  });

  test.each([4, 8, 16])("example 17, %d integrators in a row: Butterworth poles, corner entry one", (n) => {
    const A = Matrix.zeros(n, n);
    for (let i = 0; i + 1 < n; i++) A.set(i, i + 1, 1);
    const B = Matrix.zeros(n, 1);
    B.set(n - 1, 0, 1);
    const Q = Matrix.zeros(n, n);
    Q.set(0, 0, 1);
    const { X, K, closedLoopPoles } = solveRiccati({ A, B, Q, R: Matrix.eye(1) });
    expect(X.get(0, n - 1)).toBe(1);
    expect(K.get(0, 0)).toBe(1);
    // Poles on the unit circle at equal angles; rounding moves those of a companion matrix by n ε times its largest entry
    // times their condition, here below 100.
    const tolerance = 100 * n * EPS * K.max();
    for (const { re, im } of closedLoopPoles) expect(Math.abs(Math.sqrt(re * re + im * im) - 1)).toBeLessThan(tolerance);
    const largest = Math.max(...closedLoopPoles.map(({ im }) => im));
    expect(Math.abs(largest - Math.cos(Math.PI / (2 * n)))).toBeLessThan(tolerance);
  });
});

// The same authors, collection II: discrete-time case, report SPC 95_23.
describe("sampled equations with printed closed forms (SPC 95_23)", () => {
  test("example 1: X = (1 + √5)/2 [9 6; 6 4]", () => {
    const { X } = solveRiccati({
      A: new Matrix([
        [4, 3],
        [-4.5, -3.5],
      ]),
      B: new Matrix([[1], [-1]]),
      Q: new Matrix([
        [9, 6],
        [6, 4],
      ]),
      R: new Matrix([[1]]),
      sampled: true,
    });
    expectEntries(
      X,
      times((1 + ROOT5) / 2, [
        [9, 6],
        [6, 4],
      ]),
    );
  });

  test("example 3, without input weight: X = I", () => {
    const { X, closedLoopPoles } = solveRiccati({
      A: new Matrix([
        [2, -1],
        [1, 0],
      ]),
      B: new Matrix([[1], [0]]),
      Q: new Matrix([
        [0, 0],
        [0, 1],
      ]),
      R: new Matrix([[0]]),
      sampled: true,
    });
    expectEntries(X, [
      [1, 0],
      [0, 1],
    ]);
    for (const { re, im } of closedLoopPoles) expect(Math.abs(re) + Math.abs(im)).toBeLessThan(1e-7);
  });

  test("example 5: X = [1 2; 2 2 + √5]", () => {
    const { X } = solveRiccati({
      A: new Matrix([
        [0, 1],
        [0, 0],
      ]),
      B: new Matrix([[0], [1]]),
      Q: new Matrix([
        [1, 2],
        [2, 4],
      ]),
      R: new Matrix([[1]]),
      sampled: true,
    });
    expectEntries(X, [
      [1, 2],
      [2, 2 + ROOT5],
    ]);
  });

  test.each([1, 1e3, 1e6])("example 12 with ε = %d: X = diag(1, 1 + ε²), K = 0", (e) => {
    const { X, K, stabilityDistance } = solveRiccati({
      A: new Matrix([
        [0, e],
        [0, 0],
      ]),
      B: new Matrix([[0], [1]]),
      Q: Matrix.eye(2),
      R: new Matrix([[1]]),
      sampled: true,
    });
    expectEntries(X, [
      [1, 0],
      [0, 1 + e * e],
    ]);
    expectEntries(K, [[0, 0]]);
    expect(stabilityDistance).toBe(1);
  });
});

describe("closed forms of textbooks", () => {
  test("double integrator with unit weights: K = [1 √3] (Athans & Falb, Optimal Control, 1966, chapter 9; by hand)", () => {
    const { K, X, errorBound } = solveRiccati({
      A: new Matrix([
        [0, 1],
        [0, 0],
      ]),
      B: new Matrix([[0], [1]]),
      Q: Matrix.eye(2),
      R: Matrix.eye(1),
    });
    expect(K.to2DArray()).toEqual([[1, Math.sqrt(3)]]);
    expectEntries(X, [
      [Math.sqrt(3), 1],
      [1, Math.sqrt(3)],
    ]);
    expect(errorBound).toBeLessThan(2 * EPS);
  });

  test("sampled integrator with unit weights: X is the golden ratio, K its inverse (by hand: x² = x + 1)", () => {
    const one = Matrix.eye(1);
    const { X, K, closedLoopPoles } = solveRiccati({ A: one, B: one, Q: one, R: one, sampled: true });
    expectEntries(X, [[(1 + ROOT5) / 2]]);
    expectEntries(K, [[(ROOT5 - 1) / 2]]);
    expect(closedLoopPoles[0].re).toBeCloseTo((3 - ROOT5) / 2, 15);
  });

  test("cross weight: u'u + 2x'Su of a scalar plant is the completed square (by hand)", () => {
    // a = 0, b = 1, q = 4, r = 1, s = 1: (x + 1)² = 4, so x = 1 and k = x + s = 2.
    const { X, K } = solveRiccati({
      A: new Matrix([[0]]),
      B: new Matrix([[1]]),
      Q: new Matrix([[4]]),
      R: new Matrix([[1]]),
      S: new Matrix([[1]]),
    });
    expectEntries(X, [[1]]);
    expectEntries(K, [[2]]);
  });
});
