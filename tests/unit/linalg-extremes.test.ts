import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { orthonormalBasis } from "../../control/linalg/orthogonal";
import { realSchur } from "../../control/linalg/real-schur";
import { reorderSchur } from "../../control/linalg/reorder-schur";
import { singularValues } from "../../control/linalg/singular-values";
import { solveLyapunov } from "../../control/linalg/solve-lyapunov";
import { seededMatrix, seededUniform } from "../helpers/seeded";

describe("at the ends of the number range", () => {
  test("a singular value beyond the largest double is refused, one just below it is given", () => {
    const large = new Matrix([
      [1.7e308, 1.7e308],
      [0, 1],
    ]);
    for (const call of [singularValues, orthonormalBasis])
      expect(() => call(large)).toThrow(expect.objectContaining({ code: "too-large" }));
    expect(singularValues(new Matrix([[1.1e308, 1.1e308]]))[0]).toBeCloseTo(1.1e308 * Math.SQRT2, -295);
  });

  test("powers of two in the size of a matrix change its reordered Schur form by exactly those powers", () => {
    const random = seededUniform(91);
    for (let trial = 0; trial < 20; trial++) {
      const A = seededMatrix(random, 5, 5);
      const stable = ({ re }: { re: number }) => re < 0;
      const plain = reorderSchur(realSchur(A), stable);
      for (const power of [2 ** -900, 2 ** 900]) {
        const scaled = reorderSchur(realSchur(Matrix.mul(A, power)), stable);
        expect(scaled.selected).toBe(plain.selected);
        expect(Matrix.sub(Matrix.mul(scaled.T, 1 / power), plain.T).norm()).toBeLessThan(1e-12);
      }
    }
  });

  test("a Lyapunov equation answers for weights and plants of any size", () => {
    const A = new Matrix([
      [-1, 3],
      [0, -2],
    ]);
    const plain = solveLyapunov({ A, Q: Matrix.eye(2), timeBase: "continuous" }).X;
    for (const power of [2 ** -1000, 2 ** 1000]) {
      const { X } = solveLyapunov({ A, Q: Matrix.eye(2).mul(power), timeBase: "continuous" });
      expect(X.to2DArray()).toEqual(Matrix.mul(plain, power).to2DArray());
    }
    const tiny = solveLyapunov({ A: Matrix.mul(A, 1e-200), Q: Matrix.eye(2), timeBase: "sampled" }).X;
    expect(tiny.to2DArray()).toEqual(Matrix.eye(2).to2DArray());
  });
});

test("sweeps that stall on nearly defective pairs under a coupling of 2^30 end with a backward error of rounding size", () => {
  const big = -(2 ** 30);
  const A = Matrix.zeros(11, 11);
  const set = (entries: readonly (readonly [number, number, number])[]) => {
    for (const [i, j, value] of entries) A.set(i, j, value);
  };
  set([
    [0, 1, -1],
    [0, 6, 9.094947017729282e-13],
    [1, 9, 1],
    [1, 10, -1],
    [3, 3, big],
    [3, 4, -1],
    [4, 4, 0.0019417032600626757],
    [5, 1, 1],
    [5, 5, -1],
    [5, 6, 1],
    [6, 5, big],
    [8, 3, 2.947158500906715],
    [8, 5, -0.00004124641418457032],
    [8, 6, -5.574662910146289e-12],
    [9, 1, big],
    [10, 2, 1],
    [10, 5, 1.0119392506046995e-15],
    [10, 9, 9.094947017729282e-13],
  ]);
  const { Q, T } = realSchur(A);
  expect(Matrix.sub(Q.mmul(T).mmul(Q.transpose()), A).norm()).toBeLessThan(1e-12 * A.norm());
  expect(Matrix.sub(Q.mmul(Q.transpose()), Matrix.eye(11)).norm()).toBeLessThan(1e-13);
});
