import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import type { NumericalError } from "../../control/errors";
import { eigenvalues } from "../../control/linalg/eigenvalues";
import { frobeniusNorm } from "../../control/linalg/norms";
import { type ReducedObserver, reducedObserver } from "../../control/observer/reduced-observer";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const real = (...values: number[]) => values.map((re) => ({ re, im: 0 }));

function refusal(run: () => unknown): NumericalError {
  try {
    run();
  } catch (error) {
    return error as NumericalError;
  }
  throw new Error("expected a refusal");
}

/**
 * For the estimate to follow the state there must be a T with T A - Fw T = Fy C, Fu = T B - Fy D and Gw T + Gy C = I;
 * the last two give T by the pseudo-inverse of Gw.
 */
function defects(A: Matrix, B: Matrix, C: Matrix, D: Matrix, found: ReducedObserver): number[] {
  const { Fw, Fy, Fu, Gw, Gy } = found;
  const rest = Matrix.sub(Matrix.eye(A.rows), Gy.mmul(C));
  const normal = Gw.transpose().mmul(Gw);
  const T = solveSmall(normal, Gw.transpose().mmul(rest));
  const size = frobeniusNorm(T) * frobeniusNorm(A) + frobeniusNorm(Fw) * frobeniusNorm(T) + frobeniusNorm(Fy) * frobeniusNorm(C);
  return [
    frobeniusNorm(Matrix.sub(Gw.mmul(T), rest)) / frobeniusNorm(rest),
    frobeniusNorm(Matrix.sub(Matrix.sub(T.mmul(A), Fw.mmul(T)), Fy.mmul(C))) / size,
    frobeniusNorm(Matrix.sub(Matrix.sub(T.mmul(B), Fy.mmul(D)), Fu)) / (frobeniusNorm(T.mmul(B)) + frobeniusNorm(Fu)),
  ];
}

/** Gauss without pivoting, for the positive definite matrices of this file. */
function solveSmall(M: Matrix, right: Matrix): Matrix {
  const a = M.to2DArray();
  const b = right.to2DArray();
  for (let k = 0; k < a.length; k++) {
    for (let i = 0; i < a.length; i++) {
      if (i === k) continue;
      const factor = a[i][k] / a[k][k];
      a[i] = a[i].map((entry, j) => entry - factor * a[k][j]);
      b[i] = b[i].map((entry, j) => entry - factor * b[k][j]);
    }
  }
  return new Matrix(b.map((row, k) => row.map((entry) => entry / a[k][k])));
}

describe("reducedObserver", () => {
  test("follows the state of random plants with feed-through, and has the wanted poles", () => {
    const random = seededUniform(21);
    for (const [n, m, p] of [
      [3, 1, 1],
      [4, 2, 2],
      [6, 2, 3],
      [7, 3, 2],
      [8, 1, 5],
    ]) {
      const [A, B, C, D] = [
        seededMatrix(random, n, n),
        seededMatrix(random, n, m),
        seededMatrix(random, p, n),
        seededMatrix(random, p, m),
      ];
      const poles = real(...Array.from({ length: n - p }, (_, i) => -2 - i / 2));
      const found = reducedObserver({ A, B, C, D, poles });
      expect(found.order).toBe(n - p);
      for (const defect of defects(A, B, C, D, found)) expect(defect).toBeLessThan(1e-11);
      const achieved = eigenvalues(found.Fw).map(({ re }) => re);
      poles.toReversed().forEach(({ re }, k) => {
        expect(achieved[k]).toBeCloseTo(re, 8);
      });
      expect(found.residual).toBeLessThanOrEqual(found.bound);
    }
  });

  test("averages outputs that repeat others", () => {
    const A = new Matrix([
      [0.5, 0, 1],
      [0, -1, 1],
      [0, -0.5, -2],
    ]);
    const B = new Matrix([[0], [1], [0]]);
    const C = new Matrix([
      [1, 0, 0],
      [0, 1, 0],
      [2, 0, 0],
    ]);
    const found = reducedObserver({ A, B, C, poles: real(-5) });
    expect(found.order).toBe(1);
    for (const defect of defects(A, B, C, Matrix.zeros(3, 1), found)) expect(defect).toBeLessThan(1e-14);
    // A quantity seen twice is estimated from both.
    expect(found.Gy.get(0, 0)).not.toBe(0);
    expect(found.Gy.get(0, 2)).not.toBe(0);
  });

  test("holds with states in units far apart", () => {
    const random = seededUniform(8);
    const [A, B, C] = [seededMatrix(random, 5, 5), seededMatrix(random, 5, 2), seededMatrix(random, 2, 5)];
    [1e-6, 1e5, 1, 1e-3, 1e6].forEach((unit, i) => {
      A.mulRow(i, 1 / unit);
      A.mulColumn(i, unit);
      B.mulRow(i, 1 / unit);
      C.mulColumn(i, unit);
    });
    C.mulRow(0, 1e-5);
    const { achieved, poleError } = reducedObserver({ A, B, C, poles: real(-1, -2, -3) });
    expect(poleError).toBeLessThan(1e-12);
    expect(achieved.map(({ re }) => Math.round(re))).toEqual([-1, -2, -3]);
  });

  test("reads all states from the outputs when they show them all, and then wants no poles", () => {
    const C = new Matrix([
      [1, 1],
      [0, 2],
    ]);
    const found = reducedObserver({ A: Matrix.eye(2), B: new Matrix([[1], [0]]), C, poles: [] });
    expect(found.order).toBe(0);
    expect(frobeniusNorm(Matrix.sub(found.Gy.mmul(C), Matrix.eye(2)))).toBeLessThan(8 * Number.EPSILON);
    expect([found.Fw.rows, found.Fy.rows, found.Fu.rows, found.Gw.columns]).toEqual([0, 0, 0, 0]);
    expect(refusal(() => reducedObserver({ A: Matrix.eye(2), B: new Matrix([[1], [0]]), C, poles: real(-1) })).code).toBe(
      "pole-count",
    );
  });

  test("counts the poles it wants by the rank of C, not by its rows", () => {
    const C = new Matrix([
      [1, 0, 0],
      [3, 0, 0],
    ]);
    const problem = {
      A: new Matrix([
        [0, 1, 0],
        [0, 0, 1],
        [0, 0, 0],
      ]),
      B: new Matrix([[0], [0], [1]]),
      C,
    };
    expect(refusal(() => reducedObserver({ ...problem, poles: real(-1) })).data).toEqual({ expected: 2, given: 1 });
    expect(reducedObserver({ ...problem, poles: real(-1, -2) }).order).toBe(2);
  });

  test("names a mode that no output sees in the states of the whole plant", () => {
    const A = new Matrix([
      [-1, 1, 0],
      [-0.5, -2, 0],
      [0, 0, 0.5],
    ]);
    const error = refusal(() =>
      reducedObserver({ A, B: new Matrix([[1], [0], [0]]), C: new Matrix([[0, 1, 0]]), poles: real(-5, -6) }),
    );
    expect(error.code).toBe("not-observable");
    expect(error.data.state).toBe(2);
    expect(error.data.pole).toEqual({ re: 0.5, im: 0 });
  });

  test("refuses a plant without outputs as not observable", () => {
    const problem = {
      A: new Matrix([
        [1, 1],
        [0, 2],
      ]),
      B: new Matrix([[0], [1]]),
      C: new Matrix(0, 2),
      poles: real(-1, -2),
    };
    expect(refusal(() => reducedObserver(problem)).code).toBe("not-observable");
  });
});
