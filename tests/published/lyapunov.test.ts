import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { frobeniusNorm } from "../../control/linalg/norms";
import { solveLyapunov } from "../../control/linalg/solve-lyapunov";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const EPS = Number.EPSILON;

describe("closed forms worked out by hand", () => {
  test("a mass on a spring and damper under white noise: variances N/(2ck) and N/(2cm)", () => {
    // Crandall & Mark, Random Vibration in Mechanical Systems, Academic Press 1963, section 2.3 (from memory); mass one.
    const [stiffness, damping, noise] = [0.5, 1, 9];
    const { X, residual, bound } = solveLyapunov({
      A: new Matrix([
        [0, 1],
        [-stiffness, -damping],
      ]),
      Q: new Matrix([
        [0, 0],
        [0, noise],
      ]),
      timeBase: "continuous",
    });
    expect(X.get(0, 0)).toBe(noise / (2 * damping * stiffness));
    expect(X.get(1, 1)).toBe(noise / (2 * damping));
    expect(Math.abs(X.get(0, 1))).toBeLessThan(1e-30);
    expect(residual).toBeLessThanOrEqual(bound);
  });

  test("a sampled scalar: x = q / (1 - a²), also close to the unit circle", () => {
    for (const a of [0.5, -0.999, 0.999999]) {
      const { X } = solveLyapunov({ A: new Matrix([[a]]), Q: new Matrix([[3]]), timeBase: "sampled" });
      // (1 - a)(1 + a) loses nothing to cancellation, since 1 - a is exact.
      expect(Math.abs(X.get(0, 0) * (1 - a) * (1 + a) - 3)).toBeLessThan(8 * EPS);
    }
  });

  test("an antistable matrix with rational solution: A = [1 2; 3 4], Q = -[9 10; 10 12] gives [-0.7 2.6; 2.6 -0.45]", () => {
    const { X } = solveLyapunov({
      A: new Matrix([
        [1, 2],
        [3, 4],
      ]),
      Q: new Matrix([
        [-9, -10],
        [-10, -12],
      ]),
      timeBase: "continuous",
    });
    expect(X.to2DArray()).toEqual([
      [-0.7, 2.6],
      [2.6, -0.45],
    ]);
  });
});

// Newton, Gould & Kaiser, Analytical Design of Linear Feedback Controls, Wiley 1957, appendix E; James, Nichols & Phillips,
// Theory of Servomechanisms, 1947, section 7.9 (from memory): integrals of |c(s) / d(s)|² along the axis, here with c = c0.
test.each([
  ["I2 = c0² / (2 d0 d1)", [2, 0.75], 1 / (2 * 2 * 0.75)],
  ["I3 = c0² d2 / (2 d0 (d1 d2 - d0 d3))", [3, 5, 2], 2 / (2 * 3 * (5 * 2 - 3))],
] as const)("Phillips' table of noise integrals, %s", (_name, d, published) => {
  const n = d.length;
  const A = Matrix.zeros(n, n);
  for (let i = 0; i + 1 < n; i++) A.set(i, i + 1, 1);
  d.forEach((entry, j) => {
    A.set(n - 1, j, -entry);
  });
  const Q = Matrix.zeros(n, n);
  Q.set(n - 1, n - 1, 1);
  const { X } = solveLyapunov({ A, Q, timeBase: "continuous" });
  expect(Math.abs(X.get(0, 0) / published - 1)).toBeLessThan(2 * EPS);
});

// Box & Jenkins, Time Series Analysis, Holden-Day 1970, equation 3.2.28 (from memory).
test("the variance of a second-order autoregressive process, (1 - φ2) / ((1 + φ2)((1 - φ2)² - φ1²))", () => {
  for (const [one, two] of [
    [0.75, -0.5],
    [1.25, -0.375],
    [1.9375, -0.9375 - 2 ** -20],
  ]) {
    const A = new Matrix([
      [one, two],
      [1, 0],
    ]);
    const Q = new Matrix([
      [1, 0],
      [0, 0],
    ]);
    const { X } = solveLyapunov({ A, Q, timeBase: "sampled" });
    // (1 - φ2)² - φ1² as a product, so that the last, nearly unstable case loses nothing to cancellation.
    const published = (1 - two) / ((1 + two) * (1 - two - one) * (1 - two + one));
    expect(Math.abs(X.get(0, 0) / published - 1)).toBeLessThan(8 * EPS);
  }
});

// Bartels & Stewart, Solution of the matrix equation AX + XB = C, Commun. ACM 15 (1972) 820-826, solve by a known X; here X = I.
test("A + A' = -Q has the solution X = I, whatever the part of A that is skew", () => {
  const A = new Matrix([
    [-1, 7, -3],
    [-7, -2, 11],
    [3, -11, -4],
  ]);
  const { X } = solveLyapunov({ A, Q: Matrix.diag([2, 4, 8]), timeBase: "continuous" });
  for (let i = 0; i < 3; i++) for (let j = 0; j < 3; j++) expect(Math.abs(X.get(i, j) - (i === j ? 1 : 0))).toBeLessThan(1e-30);
});

// Kitagawa, An algorithm for solving the matrix equation X = F X F' + S, Int. J. Control 25 (1977) 745-753: the 5×5 matrices
// below are those of his example as commonly quoted (from memory); the digits are from 320-bit arithmetic.
const KITAGAWA = {
  A: new Matrix([
    [3, 9, 5, 1, 4],
    [1, 2, 3, 8, 4],
    [4, 6, 6, 6, 3],
    [1, 5, 2, 0, 7],
    [5, 3, 3, 1, 5],
  ]),
  Q: new Matrix([
    [2, 4, 1, 0, 1],
    [4, 1, 0, 2, 0],
    [1, 0, 3, 0, 3],
    [0, 2, 0, 1, 0],
    [1, 0, 3, 0, 4],
  ]),
};

test("Kitagawa's unstable 5×5 matrices, continuous and sampled, to the last digit", () => {
  const continuous = solveLyapunov({ A: KITAGAWA.A, Q: Matrix.mul(KITAGAWA.Q, -1), timeBase: "continuous" }).X;
  expect(continuous.getRow(0)).toEqual([
    0.8622639412250508, 0.14651090714117443, -0.5463331871189693, -0.03427660329522125, -0.034861862263913634,
  ]);
  const sampled = solveLyapunov({ ...KITAGAWA, timeBase: "sampled" }).X;
  expect(sampled.getRow(4)).toEqual([
    0.02516661402714015, 0.09948822194729642, -0.062205424793932845, 0.06572064737693169, -0.08633542075936357,
  ]);
});

describe("identities", () => {
  test("the solution satisfies the equation and is symmetric to the bit", () => {
    const random = seededUniform(31);
    for (let trial = 0; trial < 60; trial++) {
      const n = 1 + (trial % 12);
      const A = seededMatrix(random, n, n);
      const C = seededMatrix(random, n, n);
      const Q = C.mmul(C.transpose());
      const timeBase = trial % 2 === 0 ? "continuous" : "sampled";
      const { X, residual, bound } = solveLyapunov({ A, Q, timeBase });
      expect(X.to2DArray()).toEqual(X.transpose().to2DArray());
      expect(residual).toBeLessThanOrEqual(bound);
      const AX = A.mmul(X);
      const left = timeBase === "continuous" ? Matrix.add(AX, AX.transpose()) : Matrix.sub(AX.mmul(A.transpose()), X);
      const size = (1 + frobeniusNorm(A)) ** 2 * frobeniusNorm(X) + frobeniusNorm(Q);
      expect(frobeniusNorm(left.add(Q))).toBeLessThan(4 * n * EPS * size);
    }
  });

  test("a stable matrix and a positive definite weight give a positive definite solution", () => {
    const random = seededUniform(32);
    for (let trial = 0; trial < 40; trial++) {
      const n = 1 + (trial % 8);
      const A = seededMatrix(random, n, n).sub(Matrix.eye(n).mul(n));
      const { X } = solveLyapunov({ A, Q: Matrix.eye(n), timeBase: "continuous" });
      for (let i = 0; i < n; i++) expect(X.get(i, i)).toBeGreaterThan(0);
      expect(X.trace()).toBeGreaterThan(0);
      const x = seededMatrix(random, n, 1);
      expect(x.transpose().mmul(X).mmul(x).get(0, 0)).toBeGreaterThan(0);
    }
  });

  test("powers of two in the units of states change the solution by exactly those powers", () => {
    const random = seededUniform(33);
    for (let trial = 0; trial < 30; trial++) {
      const A = seededMatrix(random, 5, 5).sub(Matrix.eye(5).mul(3));
      const d = Array.from({ length: 5 }, () => 2 ** Math.round(30 * (random() - 0.5)));
      const scaled = A.clone();
      for (let i = 0; i < 5; i++) for (let j = 0; j < 5; j++) scaled.set(i, j, (A.get(i, j) * d[i]) / d[j]);
      const plain = solveLyapunov({ A, Q: Matrix.eye(5), timeBase: "continuous" }).X;
      const other = solveLyapunov({ A: scaled, Q: Matrix.diag(d.map((entry) => entry * entry)), timeBase: "continuous" }).X;
      for (let i = 0; i < 5; i++) for (let j = 0; j < 5; j++) expect(other.get(i, j)).toBe(plain.get(i, j) * d[i] * d[j]);
    }
  });
});

test.each([
  [
    "singular",
    {
      A: [
        [0, 1],
        [-1, 0],
      ],
      Q: [
        [1, 0],
        [0, 1],
      ],
      timeBase: "continuous",
    },
  ],
  ["singular", { A: [[1]], Q: [[1]], timeBase: "sampled" }],
  [
    "not-symmetric",
    {
      A: [
        [-1, 0],
        [0, -1],
      ],
      Q: [
        [1, 2],
        [0, 1],
      ],
      timeBase: "continuous",
    },
  ],
  ["not-finite", { A: [[Number.NaN]], Q: [[1]], timeBase: "continuous" }],
  [
    "shape-mismatch",
    {
      A: [[-1]],
      Q: [
        [1, 0],
        [0, 1],
      ],
      timeBase: "continuous",
    },
  ],
] as const)("refuses with %s", (code, { A, Q, timeBase }) => {
  const attempt = () =>
    solveLyapunov({ A: new Matrix(A.map((row) => [...row])), Q: new Matrix(Q.map((row) => [...row])), timeBase });
  expect(attempt).toThrow(expect.objectContaining({ code }));
});
