import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import type { Rows } from "@/control/plant/model";
import { pencilEigenvalues } from "@/control/structure/pencil-eigenvalues";
import { transmissionZeros } from "@/control/structure/transmission-zeros";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const matrix = (rows: Rows) => new Matrix(rows.map((row) => [...row]));

function zerosOf(A: Rows, B: Rows, C: Rows, D: Rows = C.map(() => B[0].map(() => 0))) {
  return transmissionZeros({ A: matrix(A), B: matrix(B), C: matrix(C), D: matrix(D) });
}

const INTEGRATORS = [
  [0, 1, 0],
  [0, 0, 1],
  [0, 0, 0],
];

test("the zeros of a single-input plant are the roots of its numerator", () => {
  // (s² + 2 s + 5) / s³
  const pair = zerosOf(INTEGRATORS, [[0], [0], [1]], [[5, 2, 1]]);
  expect(pair[0].re).toBeCloseTo(-1, 14);
  expect(pair[0].im).toBeCloseTo(2, 14);
  expect(pair[1]).toMatchObject({ re: pair[0].re, im: -pair[0].im });
  // (s - 3) / s³
  const single = zerosOf(INTEGRATORS, [[0], [0], [1]], [[-3, 1, 0]]);
  expect(single).toHaveLength(1);
  expect(single[0].re).toBeCloseTo(3, 14);
});

test("with feed-through there are as many zeros as states: 2 + 1/(s + 1) has one at -1.5", () => {
  expect(zerosOf([[-1]], [[1]], [[1]], [[2]])).toMatchObject([{ re: -1.5, im: 0 }]);
});

test("a chain measured at its end, a plant without outputs and one whose output sees nothing have no zeros", () => {
  expect(zerosOf(INTEGRATORS, [[0], [0], [1]], [[1, 0, 0]])).toEqual([]);
  expect(
    transmissionZeros({ A: matrix(INTEGRATORS), B: Matrix.ones(3, 1), C: Matrix.zeros(0, 3), D: Matrix.zeros(0, 1) }),
  ).toEqual([]);
});

test("more outputs than inputs leave the zeros that all outputs share, and only those", () => {
  // (s + 2)(s + 1) / s³ and (s + 2)(s - 4) / s³
  const shared = zerosOf(
    INTEGRATORS,
    [[0], [0], [1]],
    [
      [2, 3, 1],
      [-8, -2, 1],
    ],
  );
  expect(shared).toHaveLength(1);
  expect(shared[0].re).toBeCloseTo(-2, 13);
});

test("more inputs than outputs are the transposed case with the same zeros", () => {
  const transposed = transmissionZeros({
    A: matrix(INTEGRATORS).transpose(),
    B: matrix([
      [2, -8],
      [3, -2],
      [1, 1],
    ]),
    C: matrix([[0, 0, 1]]),
    D: Matrix.zeros(1, 2),
  });
  expect(transposed).toHaveLength(1);
  expect(transposed[0].re).toBeCloseTo(-2, 13);
});

test("two inputs that do the same leave the zeros of one of them", () => {
  const doubled = zerosOf(
    INTEGRATORS,
    [
      [0, 0],
      [0, 0],
      [1, 2],
    ],
    [[-3, 1, 0]],
  );
  expect(doubled).toHaveLength(1);
  expect(doubled[0].re).toBeCloseTo(3, 13);
});

test("a hidden mode counts among the zeros", () => {
  const hidden = zerosOf(
    [
      [1, 1, 0.5],
      [0, -2, 0],
      [0.3, 0, 0.7],
    ],
    [[1], [0], [0.4]],
    [[1, 0, 0]],
  );
  expect(hidden.map(({ re }) => re)[0]).toBeCloseTo(-2, 14);
  expect(hidden.map(({ re }) => re)[1]).toBeCloseTo(0.5, 14);
});

test("zeros far apart keep their digits: at -1e-6, -1 and -1e6", () => {
  // (s + 1e-6)(s + 1)(s + 1e6) = s³ + k s² + k s + 1, over s⁴.
  const k = 1e6 + 1 + 1e-6;
  const A = [
    [0, 1, 0, 0],
    [0, 0, 1, 0],
    [0, 0, 0, 1],
    [0, 0, 0, 0],
  ];
  const zeros = zerosOf(A, [[0], [0], [0], [1]], [[1, k, k, 1]]);
  expect(zeros).toHaveLength(3);
  // The polynomial is reciprocal: -1 is a root and the other two multiply to one.
  expect(zeros[1].re).toBeCloseTo(-1, 9);
  expect(zeros[0].re * zeros[2].re).toBeCloseTo(1, 9);
});

test("the pencil iteration agrees with A B⁻¹ known by construction, and drops what lies at infinity", () => {
  const random = seededUniform(3);
  for (let round = 0; round < 30; round++) {
    const n = 1 + (round % 8);
    const left = seededMatrix(random, n, n);
    const right = seededMatrix(random, n, n);
    const values = Array.from({ length: n }, (_, i) => (i + 1) * (i % 2 === 0 ? 1 : -1));
    const A = left.mmul(Matrix.diag(values)).mmul(right);
    const B = left.mmul(right);
    const found = pencilEigenvalues(Float64Array.from(A.to1DArray()), Float64Array.from(B.to1DArray()), n);
    const sorted = found.map(({ re }) => re).sort((x, y) => x - y);
    // Random factors reach condition numbers of 1e4 each: 1e8 ε, with room.
    for (const [i, value] of values.toSorted((x, y) => x - y).entries()) expect(sorted[i]).toBeCloseTo(value, 6);
  }
  const infinite = pencilEigenvalues(Float64Array.of(2, 0, 0, 1), Float64Array.of(1, 0, 0, 0), 2);
  expect(infinite).toEqual([{ re: 2, im: 0 }]);
});

test("shapes and entries are checked at the door", () => {
  expect(() => zerosOf([[1]], [[1], [2]], [[1]])).toThrow("shape-mismatch");
  expect(() => zerosOf([[Number.POSITIVE_INFINITY]], [[1]], [[1]])).toThrow("not-finite");
});
