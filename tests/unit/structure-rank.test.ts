import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { controllabilityReport, observabilityReport } from "@/control/structure/controllability-report";
import { seededMatrix, seededUniform } from "../helpers/seeded";

function chain(n: number, gain: number): { A: Matrix; B: Matrix } {
  const A = Matrix.zeros(n, n);
  for (let i = 0; i + 1 < n; i++) A.set(i, i + 1, gain);
  const B = Matrix.zeros(n, 1);
  B.set(n - 1, 0, gain);
  return { A, B };
}

const norm = (x: readonly number[]) => Math.sqrt(x.reduce((sum, entry) => sum + entry * entry, 0));

test("a chain of 12 integrators with gain 100 is wholly reachable", () => {
  const { A, B } = chain(12, 100);
  const report = controllabilityReport(A, B);
  expect(report.rank).toBe(12);
  expect(report.singularValues).toHaveLength(1);
  expect(report.singularValues[0]).toBeGreaterThan(1e12 * report.tolerance);
});

test("30 decaying modes that one input reaches alike are all reached, and the smallest distance is far from rounding", () => {
  const A = Matrix.diag(Array.from({ length: 30 }, (_, i) => -1 - i));
  const report = controllabilityReport(A, Matrix.ones(30, 1));
  expect(report.rank).toBe(30);
  expect(report.weakestValue).toBeGreaterThan(1e-3);
});

test("of two equal modes on one input one is lost, on two inputs none", () => {
  const A = Matrix.diag([-1, -1, -2]);
  expect(controllabilityReport(A, new Matrix([[1], [1], [1]])).rank).toBe(2);
  const both = new Matrix([
    [1, 0],
    [0, 1],
    [1, 1],
  ]);
  expect(controllabilityReport(A, both).rank).toBe(3);
});

test("a pair without any input or output has rank zero, a mode with a weak path full rank and a small distance", () => {
  const A = new Matrix([
    [1, 1e-4, 0],
    [0, -2, 1],
    [0, 0, -3],
  ]);
  expect(controllabilityReport(A, Matrix.zeros(3, 1)).rank).toBe(0);
  expect(observabilityReport(A, Matrix.zeros(0, 3)).rank).toBe(0);
  const weak = controllabilityReport(A, new Matrix([[0], [0], [1]]));
  expect(weak.rank).toBe(3);
  expect(weak.weakestValue).toBeGreaterThan(1e-7);
  expect(weak.weakestValue).toBeLessThan(1e-5);
  expect(weak.weakestDirection[0]).toBeGreaterThan(0.999);
});

describe("a part cut off by construction and hidden by a rotation", () => {
  const cases = [11, 12, 13, 14, 15, 16].map((seed) => ({ seed, n: 4 + (seed % 5), hidden: 1 + (seed % 3) }));

  test.each(cases)("is found with its size: seed $seed, $hidden of $n states", ({ seed, n, hidden }) => {
    const random = seededUniform(seed);
    const A = seededMatrix(random, n, n);
    const B = seededMatrix(random, n, 2);
    for (let i = n - hidden; i < n; i++) {
      for (let j = 0; j < n - hidden; j++) A.set(i, j, 0);
      for (let j = 0; j < 2; j++) B.set(i, j, 0);
    }
    const Q = rotation(random, n);
    const report = controllabilityReport(Q.mmul(A).mmul(Q.transpose()), Q.mmul(B));
    expect(report.rank).toBe(n - hidden);
    // The direction lies in the part that was cut off: in the coordinates before the rotation the rest vanishes.
    const before = Q.transpose()
      .mmul(Matrix.columnVector([...report.weakestDirection]))
      .to1DArray();
    expect(norm(before.slice(0, n - hidden))).toBeLessThan(1e-10);
    expect(norm(report.weakestDirection)).toBeCloseTo(1, 14);
  });
});

function rotation(random: () => number, n: number): Matrix {
  const v = seededMatrix(random, n, 1);
  const square = v.transpose().mmul(v).get(0, 0);
  return Matrix.sub(Matrix.eye(n), v.mmul(v.transpose()).mul(2 / square));
}

test("units spread over 1e12 do not change the verdict, neither for a full pair nor for one with a hidden part", () => {
  const random = seededUniform(5);
  for (let round = 0; round < 20; round++) {
    const n = 6;
    const A = seededMatrix(random, n, n);
    const B = seededMatrix(random, n, 1);
    const cut = round % 2 === 1;
    if (cut) {
      for (let j = 0; j < n - 1; j++) A.set(n - 1, j, 0);
      B.set(n - 1, 0, 0);
    }
    const units = Array.from({ length: n }, () => 10 ** Math.round(12 * random() - 6));
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) A.set(i, j, (A.get(i, j) * units[j]) / units[i]);
      B.set(i, 0, B.get(i, 0) / units[i]);
    }
    expect(controllabilityReport(A, B).rank, `round ${round}`).toBe(cut ? n - 1 : n);
  }
});

test("a defective hidden part is found although its computed eigenvalues are off by the root of rounding", () => {
  const random = seededUniform(21);
  const A = new Matrix([
    [-1, 2, 1, 0.5, 1],
    [0.3, -2, 1, 1, 0.2],
    [0, 0, 0.5, 1, 0],
    [0, 0, 0, 0.5, 1],
    [0, 0, 0, 0, 0.5],
  ]);
  const B = new Matrix([[1], [2], [0], [0], [0]]);
  const Q = rotation(random, 5);
  expect(controllabilityReport(Q.mmul(A).mmul(Q.transpose()), Q.mmul(B)).rank).toBe(2);
});

test("shapes that do not fit and entries that are not finite are refused", () => {
  expect(() => controllabilityReport(Matrix.zeros(2, 3), Matrix.zeros(2, 1))).toThrow("shape-mismatch");
  expect(() => controllabilityReport(Matrix.zeros(2, 2), Matrix.zeros(3, 1))).toThrow("shape-mismatch");
  expect(() => observabilityReport(Matrix.zeros(2, 2), Matrix.zeros(1, 3))).toThrow("shape-mismatch");
  expect(() => controllabilityReport(Matrix.zeros(1, 1), new Matrix([[Number.NaN]]))).toThrow("not-finite");
});
