import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { eigenvalues } from "../../control/linalg/eigenvalues";
import { realSchur } from "../../control/linalg/real-schur";
import { symmetricEigenvalues } from "../../control/linalg/symmetric-eigenvalues";

const matrixOf = (n: number, entry: (i: number, j: number) => number) =>
  new Matrix(Array.from({ length: n }, (_, i) => Array.from({ length: n }, (__, j) => entry(i, j))));

// Wilkinson, The Algebraic Eigenvalue Problem, Oxford 1965, chapter 5, section 45 (from memory; digits from 40-digit arithmetic).
test("Wilkinson's W21+: the two largest eigenvalues agree to 13 digits and differ behind them", () => {
  const W = matrixOf(21, (i, j) => (i === j ? Math.abs(10 - i) : Math.abs(i - j) === 1 ? 1 : 0));
  for (const values of [symmetricEigenvalues(W), eigenvalues(W).map(({ re }) => re)]) {
    const [below, largest] = values.slice(-2);
    expect(Math.abs(below - 10.746194182903322)).toBeLessThan(1e-14);
    expect(Math.abs(largest - 10.746194182903393)).toBeLessThan(1e-14);
  }
});

// Frank, Computing eigenvalues of complex matrices by determinant evaluation, J. SIAM 6 (1958) 378-392; printed again in
// Wilkinson 1965 and Golub & Wilkinson, SIAM Rev. 18 (1976) 578-619 (from memory; digits from 40-digit arithmetic).
test("Frank's matrix of order 12: the large eigenvalues to 14 digits, the small ones to what their condition of 1e8 leaves", () => {
  const n = 12;
  const values = eigenvalues(matrixOf(n, (i, j) => (j >= i - 1 ? n - Math.max(i, j) : 0)));
  const published = [
    0.031028060644010015, 0.049507429185278305, 0.08122765924040504, 0.14364651976922047, 0.2847497205584782, 0.6435053190048554,
    1.553988709132107, 3.5118559485807572, 6.9615330855671225, 12.311077400868527, 20.19898864587708, 32.228891501572164,
  ];
  values.forEach(({ re, im }, k) => {
    expect(im).toBe(0);
    expect(Math.abs(re / published[k] - 1)).toBeLessThan(k < 5 ? 1e-6 : k < 8 ? 1e-11 : 2e-14);
  });
});

// Rosser, Lanczos, Hestenes & Karush, Separation of close eigenvalues of a real symmetric matrix, J. Research NBS 47 (1951) 291-297.
test("Rosser's matrix: a double, two nearly equal, a zero, and two opposite eigenvalues", () => {
  const R = new Matrix([
    [611, 196, -192, 407, -8, -52, -49, 29],
    [196, 899, 113, -192, -71, -43, -8, -44],
    [-192, 113, 899, 196, 61, 49, 8, 52],
    [407, -192, 196, 611, 8, 44, 59, -23],
    [-8, -71, 61, 8, 411, -599, 208, 208],
    [-52, -43, 49, 44, -599, 411, 208, 208],
    [-49, -8, 8, 59, 208, 208, 99, -911],
    [29, -44, 52, -23, 208, 208, -911, 99],
  ]);
  const [a, b] = [10 * Math.sqrt(10405), 100 * Math.sqrt(26)];
  const exact = [-a, 0, 510 - b, 1000, 1000, 510 + b, 1020, a];
  for (const values of [symmetricEigenvalues(R), eigenvalues(R).map(({ re }) => re)])
    values.forEach((value, k) => {
      expect(Math.abs(value - exact[k])).toBeLessThan(3e-12);
    });
});

// Clement, A class of triple-diagonal matrices for test purposes, SIAM Rev. 1 (1959) 50-52.
test("Clement's tridiagonal matrix of order 20 has the odd numbers from -19 to 19", () => {
  const n = 20;
  const values = eigenvalues(matrixOf(n, (i, j) => (j === i + 1 ? n - 1 - i : j === i - 1 ? i : 0)));
  values.forEach(({ re, im }, k) => {
    expect(im).toBe(0);
    expect(Math.abs(re - (2 * k - (n - 1)))).toBeLessThan(1e-12);
  });
});

// Forsythe's matrix, a Jordan block with ε in its corner; Wilkinson 1965, chapter 2, section 22 (from memory): λ - a = ε^(1/n).
test("a Jordan block of order 10 with 2^-50 in its corner: ten eigenvalues on a circle of radius 2^-5", () => {
  const n = 10;
  const values = eigenvalues(matrixOf(n, (i, j) => (j === i + 1 ? 1 : i === n - 1 && j === 0 ? 2 ** -50 : 0)));
  for (const { re, im } of values) expect(Math.abs(Math.hypot(re, im) * 32 - 1)).toBeLessThan(1e-14);
  expect(values.filter(({ im }) => im !== 0)).toHaveLength(8);
});

// Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 4.8.6 (from memory): second differences, 4 sin²(kπ / 2(n + 1)).
test("the second-difference matrix of order 30 has the eigenvalues of a clamped string", () => {
  const n = 30;
  const T = matrixOf(n, (i, j) => (i === j ? 2 : Math.abs(i - j) === 1 ? -1 : 0));
  const exact = Array.from({ length: n }, (_, k) => 4 * Math.sin(((k + 1) * Math.PI) / (2 * (n + 1))) ** 2);
  for (const values of [symmetricEigenvalues(T), eigenvalues(T).map(({ re }) => re)])
    values.forEach((value, k) => {
      expect(Math.abs(value - exact[k])).toBeLessThan(2e-14);
    });
});

// Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 7.4.6: the companion matrix of a polynomial.
test("a companion matrix has the roots of its polynomial: z³ - 4 z² + 30 z - 52 = (z - 2)(z² - 2 z + 26)", () => {
  const values = eigenvalues(
    new Matrix([
      [4, -30, 52],
      [1, 0, 0],
      [0, 1, 0],
    ]),
  );
  expect(values).toHaveLength(3);
  const [first, second, real] = values;
  expect(Math.abs(first.re - 1)).toBeLessThan(1e-14);
  expect(Math.abs(first.im - 5)).toBeLessThan(1e-14);
  expect(second).toEqual({ re: first.re, im: -first.im });
  expect(Math.abs(real.re - 2)).toBeLessThan(1e-14);
});

// Lehmer (1946) and Newman & Todd, The evaluation of matrix inversion programs, J. SIAM 6 (1958) 466-476: A(i, j) = min / max.
test("Lehmer's matrix of order 10 is positive definite with a condition between n and 4 n²", () => {
  const n = 10;
  const values = symmetricEigenvalues(matrixOf(n, (i, j) => (Math.min(i, j) + 1) / (Math.max(i, j) + 1)));
  expect(values[0]).toBeGreaterThan(0);
  const condition = values[n - 1] / values[0];
  expect(condition).toBeGreaterThan(n);
  expect(condition).toBeLessThan(4 * n * n);
});

// Givens; Gregory & Karney 1969, example 4.15 (from memory): min(i, j) has the eigenvalues 1 / (4 sin²((2k - 1)π / (4n + 2))).
test("min(i, j) of order 15 has the reciprocals of squared sines", () => {
  const n = 15;
  const values = symmetricEigenvalues(matrixOf(n, (i, j) => Math.min(i, j) + 1)).reverse();
  values.forEach((value, k) => {
    expect(Math.abs(value * 4 * Math.sin(((2 * k + 1) * Math.PI) / (4 * n + 2)) ** 2 - 1)).toBeLessThan(1e-13);
  });
});

// Watkins, Understanding the QR algorithm, SIAM Rev. 24 (1982) 427-440: a cyclic shift is orthogonal, and unshifted QR stands still.
test("the cyclic shift of order 4, on which unshifted QR stands still, has the fourth roots of one and a real Schur form", () => {
  const P = matrixOf(4, (i, j) => ((i + 1) % 4 === j ? 1 : 0));
  const values = eigenvalues(P);
  expect(values.map(({ im }) => Math.round(im))).toEqual([0, 1, -1, 0]);
  for (const { re, im } of values) expect(Math.abs(Math.hypot(re, im) - 1)).toBeLessThan(4e-15);
  const { Q, T } = realSchur(P);
  expect(Matrix.sub(Q.mmul(T).mmul(Q.transpose()), P).norm()).toBeLessThan(4e-15);
});
