import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { type GramianProblem, gramians } from "@/control/structure/gramians";
import { hankelValues } from "@/control/structure/hankel-values";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const refusal = (problem: GramianProblem) => {
  try {
    gramians(problem);
  } catch (error) {
    return error;
  }
  return null;
};

test("one state has the gramians b²/2a and c²/2a, and the Hankel value is half its gain at rest", () => {
  const problem = { A: new Matrix([[-4]]), B: new Matrix([[3]]), C: new Matrix([[5]]), timeBase: "continuous" } as const;
  const { controllability, observability, error } = gramians(problem);
  expect([controllability.get(0, 0), observability.get(0, 0)]).toEqual([9 / 8, 25 / 8]);
  expect(error).toBeLessThan(1e-15);
  expect(hankelValues(problem).values[0]).toBeCloseTo(15 / 8, 14);
});

test("a sampled state has the gramians b²/(1 - a²) and c²/(1 - a²)", () => {
  const problem = { A: new Matrix([[0.5]]), B: new Matrix([[3]]), C: new Matrix([[6]]), timeBase: "sampled" } as const;
  const { controllability, observability } = gramians(problem);
  expect([controllability.get(0, 0), observability.get(0, 0)]).toEqual([12, 48]);
});

test("next to the stability boundary every digit holds: a pair with damping 1e-9 has gramians of 1/(4 · 1e-9) each", () => {
  // A + A' = -2e-9 I, so that W = I / 2e-9 for B = I; the decimal 1e-9 is rounded once in A and once here.
  const A = new Matrix([
    [-1e-9, 1],
    [-1, -1e-9],
  ]);
  const { controllability } = gramians({ A, B: Matrix.eye(2), C: Matrix.eye(2), timeBase: "continuous" });
  expect(controllability.get(0, 0) * 2e-9).toBeCloseTo(1, 15);
  expect(controllability.get(1, 1) * 2e-9).toBeCloseTo(1, 15);
  expect(Math.abs(controllability.get(0, 1))).toBeLessThan(1e-7);
});

test("Hankel values far below ε of the largest keep their digits", () => {
  // Modes -1 … -10 reached and seen equally: the gramians are the matrix of 1 / (i + j), whose eigenvalues they are.
  const n = 10;
  const A = Matrix.diag(Array.from({ length: n }, (_, i) => -1 - i));
  const { values, errors } = hankelValues({ A, B: Matrix.ones(n, 1), C: Matrix.ones(1, n), timeBase: "continuous" });
  // From 60-digit arithmetic.
  expect(values[0] / 1.287662716052689).toBeCloseTo(1, 14);
  expect(values[9] / 2.067520969985657e-14).toBeCloseTo(1, 14);
  expect(errors[0]).toBeLessThan(1e-13);
});

test("a hidden mode counts as a zero", () => {
  const problem = {
    A: Matrix.diag([-1, -1, -2]),
    B: Matrix.ones(3, 1),
    C: new Matrix([[1, 2, 1]]),
    timeBase: "continuous",
  } as const;
  const { values, errors } = hankelValues(problem);
  expect(values[2]).toBe(0);
  expect(errors[2]).toBeLessThan(1e-13);
  expect(values[0]).toBeCloseTo(1.7258574106942557, 14);
});

test("Hankel values do not depend on the units of the states, and the largest stated error holds", () => {
  const random = seededUniform(31);
  for (let round = 0; round < 8; round++) {
    const n = 2 + (round % 5);
    const A = Matrix.sub(seededMatrix(random, n, n), Matrix.eye(n).mul(2 * n));
    const B = seededMatrix(random, n, 2);
    const C = seededMatrix(random, 1, n);
    const units = Array.from({ length: n }, (_, i) => 2 ** ((i * 7) % 20));
    const D = Matrix.diag(units);
    const inverse = Matrix.diag(units.map((unit) => 1 / unit));
    const plain = hankelValues({ A, B, C, timeBase: "continuous" });
    const turned = hankelValues({ A: inverse.mmul(A).mmul(D), B: inverse.mmul(B), C: C.mmul(D), timeBase: "continuous" });
    for (const [k, value] of plain.values.entries()) {
      expect(Math.abs(turned.values[k] - value)).toBeLessThanOrEqual(turned.errors[k] + plain.errors[k]);
    }
  }
});

test("a plant with a mode that does not decay has no gramians, and the refusal names mode and state", () => {
  const A = new Matrix([
    [-1, 0, 0],
    [0, 0.5, 0],
    [0, 0, -3],
  ]);
  const problem = { A, B: Matrix.ones(3, 1), C: Matrix.ones(1, 3) };
  expect(refusal({ ...problem, timeBase: "continuous" })).toMatchObject({
    code: "not-stable",
    data: { pole: { re: 0.5, im: 0 }, state: 1 },
  });
  expect(refusal({ ...problem, timeBase: "sampled" })).toMatchObject({
    code: "not-stable",
    data: { pole: { re: -3 }, state: 2 },
  });
  const integrator = { A: Matrix.zeros(1, 1), B: Matrix.ones(1, 1), C: Matrix.ones(1, 1), timeBase: "continuous" } as const;
  expect(refusal(integrator)).toMatchObject({ code: "not-stable", data: { state: 0 } });
});

test("shapes and entries are checked at the door, and what leaves the range of numbers is refused", () => {
  const problem = { A: new Matrix([[-1]]), B: Matrix.ones(1, 1), C: Matrix.ones(1, 1), timeBase: "continuous" } as const;
  expect(refusal({ ...problem, B: Matrix.ones(2, 1) })).toMatchObject({ code: "shape-mismatch" });
  expect(refusal({ ...problem, C: Matrix.ones(1, 2) })).toMatchObject({ code: "shape-mismatch" });
  expect(refusal({ ...problem, A: new Matrix([[Number.NaN]]) })).toMatchObject({ code: "not-finite" });
  expect(refusal({ ...problem, B: new Matrix([[1e200]]) })).toMatchObject({ code: "too-large" });
});
