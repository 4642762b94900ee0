import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { cholesky } from "../../control/linalg/cholesky";
import { toFlat } from "../../control/linalg/flat";
import { factorLu, inverseOneNorm } from "../../control/linalg/lu";
import { oneNorm } from "../../control/linalg/norms";
import { singularValues } from "../../control/linalg/singular-values";
import { solveLinear } from "../../control/linalg/solve-linear";
import { symmetricEigenvalues } from "../../control/linalg/symmetric-eigenvalues";

const matrixOf = (rows: number, columns: number, entry: (i: number, j: number) => number) =>
  new Matrix(Array.from({ length: rows }, (_, i) => Array.from({ length: columns }, (__, j) => entry(i, j))));
const hilbert = (n: number) => matrixOf(n, n, (i, j) => 1 / (i + j + 1));

// Todd, The condition of the finite segments of the Hilbert matrix, NBS Appl. Math. Ser. 39 (1954); Higham, Accuracy and
// Stability of Numerical Algorithms, 2nd ed. 2002, table 28.1: 2-norm conditions (more digits from 40-digit arithmetic).
test.each([
  [3, 524.0567775860608, 1e-13],
  [4, 15513.738738932589, 1e-11],
  [5, 476607.25024256081, 1e-10],
  [6, 14951058.640131216, 1e-8],
  [8, 15257575741.646942, 1e-5],
  [10, 16026286870216.883, 2e-2],
] as const)("the Hilbert matrix of order %i has condition %d, as far as rounding its entries allows", (n, published, allowed) => {
  const values = singularValues(hilbert(n));
  expect(Math.abs(values[0] / values[n - 1] / published - 1)).toBeLessThan(allowed);
});

// Choi, Tricks or treats with the Hilbert matrix, Amer. Math. Monthly 90 (1983) 301-312: integer inverse, here of order 4.
test("the inverse of the Hilbert matrix of order 4 is a matrix of integers", () => {
  const { X, reciprocalCondition } = solveLinear(hilbert(4), Matrix.eye(4));
  const exact = [
    [16, -120, 240, -140],
    [-120, 1200, -2700, 1680],
    [240, -2700, 6480, -4200],
    [-140, 1680, -4200, 2800],
  ];
  X.to2DArray().forEach((row, i) => {
    row.forEach((x, j) => {
      expect(Math.abs(x / exact[i][j] - 1)).toBeLessThan(4e-13);
    });
  });
  expect(reciprocalCondition).toBeLessThan(1e-3);
});

// Higham 2002, table 28.1 (from memory) and exact integers: ‖H₆‖₁ ‖H₆⁻¹‖₁ = 29070279.
test("the estimate of the inverse's 1-norm is exact for the Hilbert matrix of order 6: condition 29070279", () => {
  const H = hilbert(6);
  expect(oneNorm(H) * inverseOneNorm(factorLu(toFlat(H), 6))).toBeCloseTo(29070279, -2);
});

// T. S. Wilson, in Morris, Phil. Mag. 37 (1946) 106; Todd, Basic Numerical Mathematics 2, 1977; Moler, 2018 (from memory).
test("Wilson's matrix: eigenvalues, condition 2984.0927, and the system that 1, 1, 1, 1 solves", () => {
  const W = new Matrix([
    [5, 7, 6, 5],
    [7, 10, 8, 7],
    [6, 8, 10, 9],
    [5, 7, 9, 10],
  ]);
  const published = [0.010150048397891869, 0.8431071498550319, 3.8580574559449508, 30.288685345802126];
  symmetricEigenvalues(W).forEach((value, k) => {
    expect(Math.abs(value - published[k])).toBeLessThan(1e-14);
  });
  const values = singularValues(W);
  expect(values[0] / values[3]).toBeCloseTo(2984.0927016754, 8);
  const { X } = solveLinear(W, Matrix.columnVector([23, 32, 33, 31]));
  for (const x of X.to1DArray()) expect(Math.abs(x - 1)).toBeLessThan(1e-12);
});

// Wilkinson 1965, chapter 4, section 26 (from memory); Higham 2002, section 9.4: growth 2^(n-1) with partial pivoting.
test("Wilkinson's matrix of order 30 makes elimination with partial pivoting grow by 2^29", () => {
  const n = 30;
  const A = matrixOf(n, n, (i, j) => (i === j || j === n - 1 ? 1 : j < i ? -1 : 0));
  const { lu, zeroPivot } = factorLu(toFlat(A), n);
  expect(zeroPivot).toBe(-1);
  expect(lu[n * n - 1]).toBe(2 ** (n - 1));
});

// Läuchli, Jordan-Elimination und Ausgleichung nach kleinsten Quadraten, Numer. Math. 3 (1961) 226-240.
test("Läuchli's matrix, on which normal equations lose everything: singular values √(3 + μ²), μ, μ", () => {
  const mu = 2 ** -33;
  const values = singularValues(matrixOf(4, 3, (i, j) => (i === 0 ? 1 : i === j + 1 ? mu : 0)));
  expect(Math.abs(values[0] / Math.sqrt(3) - 1)).toBeLessThan(1e-15);
  for (const value of values.slice(1)) expect(Math.abs(value / mu - 1)).toBeLessThan(1e-6);
});

// Demmel & Veselic, Jacobi's method is more accurate than QR, SIAM J. Matrix Anal. Appl. 13 (1992) 1204-1245: small values of a
// graded matrix keep their digits. Exact: D Hadamard(4) with D = diag(1, 1e-20, 1e-40, 1e-60) has singular values 2 D.
test("a graded matrix keeps the digits of its smallest singular value", () => {
  const grades = [1, 1e-20, 1e-40, 1e-60];
  const signs = [
    [1, 1, 1, 1],
    [1, -1, 1, -1],
    [1, 1, -1, -1],
    [1, -1, -1, 1],
  ];
  singularValues(matrixOf(4, 4, (i, j) => grades[i] * signs[i][j])).forEach((value, k) => {
    expect(Math.abs(value / (2 * grades[k]) - 1)).toBeLessThan(4e-16);
  });
});

// Brawer & Pirovino, The linear algebra of the Pascal matrix, Linear Algebra Appl. 174 (1992) 13-23.
test("the Cholesky factor of Pascal's symmetric matrix is his triangle, exactly", () => {
  const n = 9;
  const choose = (m: number, k: number): number => (k === 0 ? 1 : (choose(m - 1, k - 1) * m) / k);
  const L = cholesky(matrixOf(n, n, (i, j) => choose(i + j, i)));
  expect(L.to2DArray()).toEqual(matrixOf(n, n, (i, j) => (j <= i ? choose(i, j) : 0)).to2DArray());
});
