import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { cholesky } from "../../control/linalg/cholesky";
import { frobeniusNorm, infinityNorm, oneNorm, twoNorm } from "../../control/linalg/norms";
import { orthonormalBasis } from "../../control/linalg/orthogonal";
import { singularValues, smallestSingularComplex } from "../../control/linalg/singular-values";
import { solveComplex, solveLinear } from "../../control/linalg/solve-linear";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const EPS = Number.EPSILON;
const random = seededUniform(5);

describe("solveLinear", () => {
  test("solves random systems with a residual of rounding size", () => {
    for (let n = 1; n <= 30; n++) {
      const A = seededMatrix(random, n, n);
      const B = seededMatrix(random, n, 3);
      const { X } = solveLinear(A, B);
      const residual = frobeniusNorm(Matrix.sub(A.mmul(X), B));
      expect(residual).toBeLessThan(20 * n * EPS * (frobeniusNorm(A) * frobeniusNorm(X) + frobeniusNorm(B)));
    }
  });

  test("estimates the condition of a Hilbert matrix within a factor three", () => {
    const n = 6;
    const hilbert = new Matrix(Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => 1 / (i + j + 1))));
    // 1-norm condition 2.907e7 (Higham 2002, table 28.1 region); scaling by powers of two moves it a little.
    const { reciprocalCondition } = solveLinear(hilbert, Matrix.eye(n));
    expect(1 / reciprocalCondition).toBeGreaterThan(2.9e7 / 10);
    expect(1 / reciprocalCondition).toBeLessThan(2.9e7 * 3);
  });

  test("does not call bad units singular", () => {
    const { X, reciprocalCondition } = solveLinear(
      new Matrix([
        [1e-200, 0],
        [0, 1e150],
      ]),
      new Matrix([[1e-200], [1e150]]),
    );
    expect(X.to1DArray()).toEqual([1, 1]);
    expect(reciprocalCondition).toBeGreaterThan(0.1);
  });

  test.each([
    [
      "an exactly dependent pair of rows",
      [
        [1, 2],
        [2, 4],
      ],
    ],
    [
      "a pair dependent to the last digits",
      [
        [1, 2],
        [2, 4 + 1e-15],
      ],
    ],
    [
      "a zero row",
      [
        [1, 2],
        [0, 0],
      ],
    ],
  ])("refuses %s as singular", (_, rows) => {
    expect(() => solveLinear(new Matrix(rows), new Matrix([[1], [1]]))).toThrow(expect.objectContaining({ code: "singular" }));
  });

  test("solves complex systems", () => {
    const A = { re: seededMatrix(random, 5, 5), im: seededMatrix(random, 5, 5) };
    const B = { re: seededMatrix(random, 5, 2), im: seededMatrix(random, 5, 2) };
    const { X } = solveComplex(A, B);
    const re = Matrix.sub(A.re.mmul(X.re), A.im.mmul(X.im));
    const im = Matrix.add(A.re.mmul(X.im), A.im.mmul(X.re));
    expect(frobeniusNorm(Matrix.sub(re, B.re)) + frobeniusNorm(Matrix.sub(im, B.im))).toBeLessThan(1e-13);
  });
});

describe("cholesky", () => {
  test("returns the factor of a matrix made from an integer factor, exactly", () => {
    const L = new Matrix([
      [2, 0, 0],
      [-1, 3, 0],
      [4, 5, 1],
    ]);
    expect(cholesky(L.mmul(L.transpose())).to2DArray()).toEqual(L.to2DArray());
  });

  test("names the first pivot that fails", () => {
    const attempt = () =>
      cholesky(
        new Matrix([
          [1, 0, 0],
          [0, 1, 1],
          [0, 1, 1],
        ]),
        "R",
      );
    expect(attempt).toThrow(expect.objectContaining({ code: "not-positive-definite", data: { matrix: "R", index: 2 } }));
    expect(() => cholesky(new Matrix([[0]]))).toThrow(expect.objectContaining({ code: "not-positive-definite" }));
    expect(() =>
      cholesky(
        new Matrix([
          [1, 2],
          [3, 9],
        ]),
      ),
    ).toThrow(expect.objectContaining({ code: "not-symmetric" }));
  });
});

describe("singular values", () => {
  test("keep relative accuracy down a graded diagonal", () => {
    expect(
      singularValues(
        new Matrix([
          [1e-8, 0, 0],
          [0, 1, 0],
          [0, 0, 1e-16],
        ]),
      ),
    ).toEqual([1, 1e-8, 1e-16]);
  });

  test("square and add up to the Frobenius norm, wide or tall, and the largest is the 2-norm", () => {
    for (const [r, c] of [
      [4, 4],
      [7, 3],
      [3, 8],
      [1, 5],
      [30, 30],
    ]) {
      const M = seededMatrix(random, r, c);
      const values = singularValues(M);
      expect(values).toHaveLength(Math.min(r, c));
      const sum = values.reduce((total, value) => total + value * value, 0);
      expect(Math.abs(Math.sqrt(sum) / frobeniusNorm(M) - 1)).toBeLessThan(20 * EPS * r);
      expect(twoNorm(M)).toBe(values[0]);
      expect(twoNorm(M)).toBeLessThanOrEqual(Math.sqrt(oneNorm(M) * infinityNorm(M)) * (1 + 10 * EPS));
    }
  });

  test("the smallest complex one comes with vectors that attain it", () => {
    for (const [r, c] of [
      [3, 5],
      [5, 3],
      [4, 4],
      [6, 8],
    ]) {
      const re = seededMatrix(random, r, c);
      const im = seededMatrix(random, r, c);
      const { value, right, left } = smallestSingularComplex(re, im);
      const column = (x: Float64Array) => Matrix.columnVector([...x]);
      const real = Matrix.sub(re.mmul(column(right.re)), im.mmul(column(right.im)));
      const imaginary = Matrix.add(re.mmul(column(right.im)), im.mmul(column(right.re)));
      expect(frobeniusNorm(Matrix.sub(real, column(left.re).mul(value)))).toBeLessThan(1e-14);
      expect(frobeniusNorm(Matrix.sub(imaginary, column(left.im).mul(value)))).toBeLessThan(1e-14);
      const doubled = new Matrix(2 * r, 2 * c);
      doubled.setSubMatrix(re, 0, 0).setSubMatrix(im, r, 0).setSubMatrix(Matrix.mul(im, -1), 0, c).setSubMatrix(re, r, c);
      const values = singularValues(doubled);
      expect(Math.abs(value - values[values.length - 1])).toBeLessThan(1e-14);
    }
  });

  test("converge, with vectors of unit length, for entries from the smallest to the largest numbers there are", () => {
    const entry = (exponent: number) => (random() < 0.2 ? 0 : (2 * random() - 1) * 10 ** Math.min(307, Math.max(-320, exponent)));
    for (let round = 0; round < 3_000; round++) {
      const [r, c] = [1 + Math.floor(6 * random()), 1 + Math.floor(6 * random())];
      const [base, spread] = [[300, 307, -300, 0][round % 4], [0, 20, 150, 600][Math.floor(4 * random())]];
      const sizes = Array.from({ length: r }, () => base + spread * (random() - 0.5));
      const shifts = Array.from({ length: c }, () => spread * (random() - 0.5));
      const filled = () => new Matrix(sizes.map((size) => shifts.map((shift) => entry(size + shift))));
      const re = filled();
      // Every other one has two equal rows.
      if (round % 2 === 1 && r > 1) re.setRow(1, re.getRow(0));
      const { value, right, left } = smallestSingularComplex(re, round % 3 === 0 ? Matrix.zeros(r, c) : filled());
      const squares = [right, left].map(({ re, im }) => re.reduce((sum, x, k) => sum + x * x + im[k] * im[k], 0));
      for (const square of squares) expect(Math.abs(square - 1), `round ${round}`).toBeLessThan(1e-13);
      expect(value).toBeGreaterThanOrEqual(0);
    }
  });

  test("a singular matrix gets a unit vector of its null space", () => {
    const { value, right } = smallestSingularComplex(
      new Matrix([
        [1, 1],
        [1, 1],
      ]),
      Matrix.zeros(2, 2),
    );
    expect(value).toBeLessThan(4 * EPS);
    expect(Math.abs(right.re[0] + right.re[1])).toBeLessThan(4 * EPS);
    expect(Math.abs(right.re[0])).toBeCloseTo(Math.SQRT1_2, 14);
  });
});

describe("orthonormalBasis", () => {
  test.each([
    [5, 3, 2],
    [3, 6, 2],
    [4, 4, 4],
    [4, 2, 0],
  ])("splits a %i×%i matrix of rank %i", (r, c, rank) => {
    const M = seededMatrix(random, r, rank).mmul(seededMatrix(random, rank, c));
    const basis = orthonormalBasis(rank === 0 ? Matrix.zeros(r, c) : M);
    expect(basis.rank).toBe(rank);
    expect([basis.range.columns, basis.complement.columns]).toEqual([rank, r - rank]);
    const whole = Matrix.zeros(r, r);
    if (rank > 0) whole.setSubMatrix(basis.range, 0, 0);
    if (rank < r) whole.setSubMatrix(basis.complement, 0, rank);
    expect(frobeniusNorm(Matrix.sub(whole.transpose().mmul(whole), Matrix.eye(r)))).toBeLessThan(1e-14);
    if (rank > 0 && rank < r) expect(frobeniusNorm(basis.complement.transpose().mmul(M))).toBeLessThan(1e-14);
  });
});

test("Matrix norms of a small example are those worked out by hand", () => {
  const M = new Matrix([
    [1, -2],
    [3, 4],
  ]);
  expect([oneNorm(M), infinityNorm(M), frobeniusNorm(M)]).toEqual([6, 7, Math.sqrt(30)]);
  expect(frobeniusNorm(new Matrix([[3e200, 4e200]]))).toBeCloseTo(5e200, -186);
});
