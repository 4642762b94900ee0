import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { distanceToUncontrollability, distanceToUnobservability } from "@/control/structure/distance-to-uncontrollability";
import { modeDistance } from "@/control/structure/mode-distance";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const smallestAt = (A: Matrix, B: Matrix, s: { re: number; im: number }) => {
  const flat = (M: Matrix) => Float64Array.from(M.to1DArray());
  const { relative } = modeDistance(flat(A), flat(B), A.rows, B.columns, s);
  let square = 0;
  for (let i = 0; i < A.rows; i++) {
    for (let j = 0; j < A.rows; j++) square += (A.get(i, j) - (i === j ? s.re : 0)) ** 2 + (i === j ? s.im ** 2 : 0);
    for (let j = 0; j < B.columns; j++) square += B.get(i, j) ** 2;
  }
  return relative * Math.sqrt(square);
};

test("one state is as far from being out of reach as its input is strong", () => {
  const found = distanceToUncontrollability(new Matrix([[3]]), new Matrix([[0.25]]));
  expect(found.upper).toBeCloseTo(0.25, 15);
  expect(found.at.re).toBeCloseTo(3, 7);
  expect(found.lower).toBeGreaterThan(0.247);
});

test("the upper bound is attained where it says, the lower one is within a per cent, and no point of a grid lies below it", () => {
  const random = seededUniform(12);
  for (let round = 0; round < 12; round++) {
    const n = 2 + (round % 5);
    const A = seededMatrix(random, n, n);
    const B = seededMatrix(random, n, 1 + (round % 2));
    const { lower, upper, at } = distanceToUncontrollability(A, B);
    expect(smallestAt(A, B, at) / upper).toBeCloseTo(1, 9);
    expect(lower).toBeGreaterThanOrEqual(0.99 * upper);
    for (let k = 0; k < 400; k++) {
      const s = { re: 4 * random() - 2, im: 2 * random() };
      expect(smallestAt(A, B, s)).toBeGreaterThanOrEqual(lower * (1 - 1e-9));
    }
  }
});

test("a mode out of reach has distance zero: the lower bound says so, the upper one is rounding", () => {
  const A = new Matrix([
    [1, 1, 0.5],
    [0, -2, 0],
    [0.3, 0, 0.7],
  ]);
  const { lower, upper, at } = distanceToUncontrollability(A, new Matrix([[1], [0], [0.4]]));
  expect(lower).toBe(0);
  expect(upper).toBeLessThan(1e-15);
  expect(at.re).toBeCloseTo(-2, 12);
});

test("the work is bounded by what is allowed, and the bracket says what is proven by then", () => {
  const A = seededMatrix(seededUniform(4), 8, 8);
  const B = seededMatrix(seededUniform(5), 8, 1);
  const short = distanceToUncontrollability(A, B, 30);
  const long = distanceToUncontrollability(A, B);
  expect(short.evaluations).toBeLessThanOrEqual(30 + 12);
  expect(short.lower).toBeLessThanOrEqual(long.upper);
  expect(short.upper).toBeGreaterThanOrEqual(long.lower);
});

test("what outputs see is as far from hidden as the dual pair from out of reach, bit for bit", () => {
  const A = seededMatrix(seededUniform(7), 5, 5);
  const C = seededMatrix(seededUniform(8), 2, 5);
  expect(distanceToUnobservability(A, C)).toEqual(distanceToUncontrollability(A.transpose(), C.transpose()));
});

test("without inputs, and without anything at all, the distance is zero, and shapes and entries are checked at the door", () => {
  expect(distanceToUncontrollability(new Matrix([[2]]), Matrix.zeros(1, 0))).toMatchObject({ lower: 0 });
  expect(distanceToUncontrollability(Matrix.zeros(2, 2), Matrix.zeros(2, 1))).toMatchObject({ lower: 0, upper: 0 });
  expect(() => distanceToUncontrollability(Matrix.eye(2), Matrix.ones(3, 1))).toThrow("shape-mismatch");
  expect(() => distanceToUnobservability(Matrix.eye(2), Matrix.ones(1, 3))).toThrow("shape-mismatch");
  expect(() => distanceToUncontrollability(new Matrix([[Number.NaN]]), Matrix.ones(1, 1))).toThrow("not-finite");
});
