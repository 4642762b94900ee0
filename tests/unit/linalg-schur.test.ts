import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { eigensystem } from "../../control/linalg/eigensystem";
import { frobeniusNorm } from "../../control/linalg/norms";
import { realSchur } from "../../control/linalg/real-schur";
import { reorderSchur } from "../../control/linalg/reorder-schur";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const EPS = Number.EPSILON;

/** Dense, sparse integer and badly scaled matrices in turn. */
function hardMatrix(random: () => number, trial: number): Matrix {
  const n = 2 + (trial % 8);
  const A = seededMatrix(random, n, n);
  if (trial % 3 === 1) return A.apply((i, j) => A.set(i, j, Math.round(1.3 * A.get(i, j))));
  if (trial % 3 === 2) return A.apply((i, j) => A.set(i, j, A.get(i, j) * 2 ** Math.round(30 * (random() - 0.5))));
  return A;
}

describe("real Schur form", () => {
  test("of dense, sparse and badly scaled matrices is orthogonally similar, before and after reordering", () => {
    const random = seededUniform(21);
    for (let trial = 0; trial < 400; trial++) {
      const A = hardMatrix(random, trial);
      const n = A.rows;
      const schur = realSchur(A);
      const ordered = reorderSchur(schur, (value) => value.re < 0);
      for (const { Q, T } of [schur, ordered]) {
        expect(frobeniusNorm(Matrix.sub(Q.mmul(T).mmul(Q.transpose()), A))).toBeLessThanOrEqual(60 * n * EPS * frobeniusNorm(A));
        expect(frobeniusNorm(Matrix.sub(Q.mmul(Q.transpose()), Matrix.eye(n)))).toBeLessThan(60 * n * EPS);
        for (let i = 2; i < n; i++) expect(T.get(i, i - 2)).toBe(0);
      }
      expect(ordered.selected).toBe(schur.values.filter((value) => value.re < 0).length);
      // Multiple eigenvalues move by a root of rounding, so membership is tested with that slack.
      const slack = 1e-4 * frobeniusNorm(A);
      ordered.values.forEach((value, k) => {
        if (k < ordered.selected) expect(value.re).toBeLessThan(slack);
        else expect(value.re).toBeGreaterThan(-slack);
      });
    }
  });

  test("keeps an ordering that is already right, bit for bit", () => {
    const T = new Matrix([
      [-2, 5, 1],
      [0, -1, 7],
      [0, 0, 3],
    ]);
    const ordered = reorderSchur({ Q: Matrix.eye(3), T, values: [] }, (value) => value.re < 0);
    expect(ordered.T.to2DArray()).toEqual(T.to2DArray());
    expect(ordered.selected).toBe(2);
  });
});

describe("eigensystem", () => {
  test("right and left vectors satisfy their equations and are unit columns", () => {
    const random = seededUniform(22);
    for (let trial = 0; trial < 300; trial++) {
      const A = hardMatrix(random, trial);
      const size = frobeniusNorm(A);
      const { values, right, left } = eigensystem(A);
      values.forEach(({ re, im }, k) => {
        for (const [M, vectors, sign] of [
          [A, right, 1],
          [A.transpose(), left, -1],
        ] as const) {
          const x = vectors.re.getColumnVector(k);
          const y = vectors.im.getColumnVector(k);
          const real = M.mmul(x)
            .sub(Matrix.mul(x, re))
            .add(Matrix.mul(y, sign * im));
          const imaginary = M.mmul(y)
            .sub(Matrix.mul(y, re))
            .sub(Matrix.mul(x, sign * im));
          // The vectors are computed for the balanced matrix: 1e-10 allows for units spread over 2^30.
          expect(frobeniusNorm(real) + frobeniusNorm(imaginary)).toBeLessThanOrEqual(1e-10 * size);
          expect(Math.sqrt(frobeniusNorm(x) ** 2 + frobeniusNorm(y) ** 2)).toBeCloseTo(1, 13);
        }
      });
    }
  });

  test("of a defective matrix has nearly parallel vectors and no NaN", () => {
    const J = new Matrix([
      [2, 1, 0],
      [0, 2, 1],
      [0, 0, 2],
    ]);
    const { values, right, left } = eigensystem(J);
    expect(values).toEqual([
      { re: 2, im: 0 },
      { re: 2, im: 0 },
      { re: 2, im: 0 },
    ]);
    for (const M of [right.re, right.im, left.re, left.im]) expect(M.to1DArray().every(Number.isFinite)).toBe(true);
    for (let k = 0; k < 3; k++) expect(Math.abs(right.re.get(0, k))).toBeCloseTo(1, 12);
  });
});
