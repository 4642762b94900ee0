import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { eigenvalues } from "../../control/linalg/eigenvalues";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const EPS = Number.EPSILON;

describe("matrices on which an unshifted or uncapped iteration never ends", () => {
  // Characteristic polynomials worked out by hand.
  test.each([
    {
      rows: [
        [0, 0, 1, 0],
        [0, 0, 1, -1],
        [-1, -1, 0, 0],
        [0, 0, 0, 0],
      ],
      expected: [
        [0, 0],
        [0, 0],
        [0, Math.SQRT2],
        [0, -Math.SQRT2],
      ],
    },
    {
      rows: [
        [0, -3, 0, 3],
        [0, 0, 0, 0],
        [0, 0, 0, -2],
        [-3, -1, 2, 0],
      ],
      expected: [
        [0, 0],
        [0, 0],
        [0, Math.sqrt(13)],
        [0, -Math.sqrt(13)],
      ],
    },
    {
      rows: [
        [0, 0, 1],
        [1, 0, 0],
        [0, 1, 0],
      ],
      expected: [
        [-0.5, Math.sqrt(3) / 2],
        [-0.5, -Math.sqrt(3) / 2],
        [1, 0],
      ],
    },
    {
      rows: [
        [0, 0, 0, 1],
        [1, 0, 0, 0],
        [0, 1, 0, 0],
        [0, 0, 1, 0],
      ],
      expected: [
        [-1, 0],
        [0, 1],
        [0, -1],
        [1, 0],
      ],
    },
    {
      rows: [
        [0, 0, 0, 0, 0],
        [0, 0, 0, 0, 1],
        [0, 0, 0, 1, 0],
        [1, 1, 0, 0, 1],
        [1, 0, 1, 0, 1],
      ],
      expected: [
        [(1 - Math.sqrt(5)) / 2, 0],
        [0, 0],
        [0, 1],
        [0, -1],
        [(1 + Math.sqrt(5)) / 2, 0],
      ],
    },
  ])("eigenvalues of $rows come out to rounding", ({ rows, expected }) => {
    const values = eigenvalues(new Matrix(rows));
    const left = expected.map(([re, im]) => ({ re, im }));
    for (const { re, im } of values) {
      const nearest = left.findIndex((v) => Math.abs(v.re - re) + Math.abs(v.im - im) < 100 * EPS);
      expect(nearest).toBeGreaterThanOrEqual(0);
      left.splice(nearest, 1);
    }
  });

  test("a six-state chain of integrators with two more couplings ends", () => {
    const A = Matrix.zeros(6, 6);
    for (let i = 0; i < 5; i++) A.set(i, i + 1, 1);
    A.set(3, 0, 1);
    A.set(5, 2, 1);
    expect(eigenvalues(A)).toHaveLength(6);
  });

  test("3000 random sparse matrices of -1, 0 and 1 end with the right trace and second trace", () => {
    const random = seededUniform(7);
    for (let trial = 0; trial < 3000; trial++) {
      const n = 2 + (trial % 6);
      const A = new Matrix(
        Array.from({ length: n }, () => Array.from({ length: n }, () => Math.round(1.2 * (2 * random() - 1)))),
      );
      const values = eigenvalues(A);
      const first = values.reduce((sum, v) => sum + v.re, 0);
      const second = values.reduce((sum, v) => sum + v.re * v.re - v.im * v.im, 0);
      const size = A.norm("frobenius") + 1;
      // A defective value of multiplicity n moves by eps^(1/n), but symmetric functions of the values do not.
      expect(Math.abs(first - A.trace())).toBeLessThan(100 * n * EPS * size);
      expect(Math.abs(second - A.mmul(A).trace())).toBeLessThan(200 * n * EPS * size * size);
    }
  });
});

test("a nilpotent shift has exactly zero eigenvalues", () => {
  const A = Matrix.zeros(8, 8);
  for (let i = 0; i < 7; i++) A.set(i + 1, i, 3);
  expect(eigenvalues(A)).toEqual(Array.from({ length: 8 }, () => ({ re: 0, im: 0 })));
});

test("pairs are exactly conjugate and adjacent, and values are sorted by real part, then by size of the imaginary part", () => {
  const random = seededUniform(11);
  for (let trial = 0; trial < 100; trial++) {
    const values = eigenvalues(seededMatrix(random, 9, 9));
    for (let k = 0; k < values.length; k++) {
      if (values[k].im > 0) expect(values[k + 1]).toEqual({ re: values[k].re, im: -values[k].im });
      if (k > 0) expect(values[k].re).toBeGreaterThanOrEqual(values[k - 1].re);
    }
    expect(values.filter((v) => v.im > 0)).toHaveLength(values.filter((v) => v.im < 0).length);
  }
});

test("units spread over twelve decades do not spoil the eigenvalues", () => {
  const random = seededUniform(3);
  for (let trial = 0; trial < 50; trial++) {
    const A = seededMatrix(random, 6, 6);
    const exponents = Array.from({ length: 6 }, () => Math.round(40 * (random() - 0.5)));
    const scaled = A.clone();
    for (let i = 0; i < 6; i++) for (let j = 0; j < 6; j++) scaled.set(i, j, A.get(i, j) * 2 ** (exponents[j] - exponents[i]));
    const plain = eigenvalues(A);
    const bad = eigenvalues(scaled);
    // Balancing brings both to nearly one matrix; what is left is the condition of random eigenvalues.
    for (let k = 0; k < 6; k++) {
      expect(Math.abs(plain[k].re - bad[k].re)).toBeLessThan(1e-11);
      expect(Math.abs(plain[k].im - bad[k].im)).toBeLessThan(1e-11);
    }
  }
});

test("entries near 1e200 and near the smallest double are scaled, not overflowed", () => {
  const A = [
    [1, 2, 0],
    [3, 4, 1],
    [1, 2, 3],
  ];
  const plain = eigenvalues(new Matrix(A));
  for (const exponent of [660, -660]) {
    const values = eigenvalues(new Matrix(A).mul(2 ** exponent));
    for (const [k, v] of values.entries()) expect(Math.abs(v.re / 2 ** exponent - plain[k].re)).toBeLessThan(50 * EPS * 6);
  }
  expect(eigenvalues(new Matrix(A).mul(1e-322)).every((v) => Number.isFinite(v.re))).toBe(true);
});

test.each([
  [
    "not-finite",
    new Matrix([
      [1, Number.NaN],
      [0, 1],
    ]),
  ],
  [
    "not-finite",
    new Matrix([
      [1, 0, 0],
      [0, Number.POSITIVE_INFINITY, 0],
      [0, 0, 1],
    ]),
  ],
  [
    "shape-mismatch",
    new Matrix([
      [1, 2, 3],
      [4, 5, 6],
    ]),
  ],
  [
    "too-large",
    new Matrix([
      [1.5e308, 1.5e308],
      [1.5e308, 1.5e308],
    ]),
  ],
])("refuses with %s", (code, A) => {
  expect(() => eigenvalues(A)).toThrow(expect.objectContaining({ code }));
});
