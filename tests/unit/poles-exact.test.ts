import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { eigenvalues } from "../../control/linalg/eigenvalues";
import type { Complex } from "../../control/plant/model";
import { achievedPoles } from "../../control/poles/achieved-poles";
import { loopPoles } from "../../control/poles/loop-poles";
import { placePoles } from "../../control/poles/place-poles";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const real = (...values: number[]): Complex[] => values.map((re) => ({ re, im: 0 }));

/** n integrators in a chain, with the gain that gives the loop the polynomial sⁿ + k[n-1] sⁿ⁻¹ + ... + k[0]. */
function chain(k: readonly number[]): { A: Matrix; B: Matrix; K: Matrix } {
  const n = k.length;
  const A = Matrix.zeros(n, n);
  for (let i = 0; i + 1 < n; i++) A.set(i, i + 1, 1);
  return { A, B: Matrix.zeros(n, 1).set(n - 1, 0, 1), K: Matrix.rowVector([...k]) };
}

/** Coefficients of the product of (s + r), lowest first, without the leading one. */
function coefficients(roots: readonly number[]): number[] {
  let p = [1];
  for (const r of roots) {
    const longer = [...p, 0];
    p = longer.map((_, i) => (i < p.length ? r * p[i] : 0) + (i > 0 ? p[i - 1] : 0));
  }
  return p.slice(0, -1);
}

describe("poles of a loop are found with more digits than its gain has", () => {
  test("integer roots to -14, which plain eigenvalues miss in the fourth digit, have no error in 24 digits", () => {
    const roots = Array.from({ length: 14 }, (_, i) => i + 1);
    const { A, B, K } = chain(coefficients(roots));
    const wanted = real(...roots.map((r) => -r));
    const { errors, exact } = achievedPoles(A, B, K, wanted);
    expect(exact).toBe(true);
    expect(Math.max(...errors)).toBeLessThan(1e-24);
    const plain = eigenvalues(Matrix.sub(A, B.mmul(K)));
    expect(Math.max(...wanted.map(({ re }) => Math.min(...plain.map((p) => Math.hypot(p.re - re, p.im)))))).toBeGreaterThan(1e-7);
  });

  test("a change in the last digit of one entry shows as the first-order shift of the pole", () => {
    const k = coefficients([1, 2, 3, 4, 5]);
    const { A, B, K } = chain(k);
    const change = 2 ** -44;
    K.set(0, 0, k[0] + change);
    const { errors } = achievedPoles(A, B, K, real(-1, -2, -3, -4, -5));
    // The root moves by the change over the derivative of the polynomial there: 4!, 3!, 4, 3!, 4!.
    [24, 6, 4, 6, 24].forEach((slope, i) => {
      expect((errors[i] * slope) / change).toBeCloseTo(1, 3);
    });
  });

  test("two real poles that rounding turned into a pair are told as that pair", () => {
    const { A, B, K } = chain([1 + 2 ** -40, 2]);
    const { poles, errors, exact } = achievedPoles(A, B, K, real(-1, -1));
    expect(exact).toBe(true);
    expect(poles.map(({ im }) => Math.abs(im))).toEqual([2 ** -20, 2 ** -20]);
    for (const error of errors) expect(error * 2 ** 20).toBeCloseTo(1, 4);
  });

  test("a pair, a repeated pole with independent eigenvectors and a pole at zero", () => {
    const A = new Matrix([
      [-1, 2, 0, 0, 0],
      [-2, -1, 0, 0, 0],
      [0, 0, -3, 0, 0],
      [0, 0, 0, -3, 0],
      [0, 0, 0, 0, 0],
    ]);
    const wanted = [{ re: -1, im: 2 }, { re: -1, im: -2 }, ...real(-3, -3, 0)];
    const found = loopPoles(A, Matrix.zeros(5, 1), Matrix.zeros(1, 5), wanted);
    expect(found?.map(({ re }) => re)).toEqual([-1, -1, -3, -3, 0]);
    expect(found?.map(({ im }) => im)).toEqual([2, -2, 0, 0, 0]);
  });

  test("in units from 1e-12 to 1e12 the same as in even ones", () => {
    const random = seededUniform(5);
    const A = seededMatrix(random, 7, 7);
    const B = seededMatrix(random, 7, 2);
    const wanted = real(-1, -1.5, -2, -2.5, -3, -3.5, -4);
    const { K } = placePoles({ A, B, poles: wanted });
    const here = achievedPoles(A, B, K, wanted);
    for (let i = 0; i < 7; i++) {
      const unit = 2 ** (12 * (i - 3));
      A.mulRow(i, 1 / unit);
      A.mulColumn(i, unit);
      B.mulRow(i, 1 / unit);
      K.mulColumn(i, unit);
    }
    const there = achievedPoles(A, B, K, wanted);
    here.errors.forEach((error, k) => {
      expect(there.errors[k] / error).toBeCloseTo(1, 3);
    });
  });
});

describe("placePoles tells the error of the gain it returns, not of its check", () => {
  test("sixteen states on one input, where plain eigenvalues are off by a percent", () => {
    const random = seededUniform(33);
    const A = seededMatrix(random, 16, 16);
    const B = seededMatrix(random, 16, 1);
    const poles = real(...Array.from({ length: 16 }, (_, i) => -0.5 - i / 4));
    const { K, poleError, method } = placePoles({ A, B, poles });
    expect(method).toContain("rounding of the gain moves visibly");
    const plain = eigenvalues(Matrix.sub(A, B.mmul(K)));
    const seen = Math.max(...poles.map(({ re }) => Math.min(...plain.map((p) => Math.hypot(p.re - re, p.im))) / -re));
    expect(poleError).toBeLessThan(1e-2);
    expect(seen).toBeGreaterThan(10 * poleError);
  });
});
