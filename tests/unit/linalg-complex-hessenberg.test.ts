import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { factorShiftedHessenberg, shiftedHessenbergRoom, solveShiftedHessenberg } from "../../control/linalg/complex-hessenberg";
import { toFlat } from "../../control/linalg/flat";
import { solveComplex } from "../../control/linalg/solve-linear";
import { seededMatrix, seededUniform } from "../helpers/seeded";

function hessenberg(random: () => number, n: number): Matrix {
  const H = seededMatrix(random, n, n);
  for (let i = 2; i < n; i++) for (let j = 0; j < i - 1; j++) H.set(i, j, 0);
  return H;
}

describe("solving with sI - H", () => {
  test("agrees with the general complex solver", () => {
    const random = seededUniform(41);
    for (let trial = 0; trial < 60; trial++) {
      const n = 1 + (trial % 12);
      const columns = 1 + (trial % 3);
      const H = hessenberg(random, n);
      const s = { re: 4 * random() - 2, im: trial % 5 === 0 ? 0 : 4 * random() - 2 };
      const B = { re: seededMatrix(random, n, columns), im: seededMatrix(random, n, columns) };
      const re = toFlat(B.re);
      const im = toFlat(B.im);
      solveShiftedHessenberg(factorShiftedHessenberg(toFlat(H), n, s), re, im, columns);
      const whole = { re: Matrix.eye(n).mul(s.re).sub(H), im: Matrix.eye(n).mul(s.im) };
      const { X, reciprocalCondition } = solveComplex(whole, B);
      const size = Math.max(X.re.norm("max"), X.im.norm("max"));
      const allowed = (16 * n * Number.EPSILON * size) / reciprocalCondition;
      const off = (exact: Matrix, x: Float64Array) => Math.max(...toFlat(exact).map((entry, i) => Math.abs(entry - x[i])));
      expect(off(X.re, re)).toBeLessThan(allowed);
      expect(off(X.im, im)).toBeLessThan(allowed);
    }
  });

  test("reused room gives the same bits as new room", () => {
    const random = seededUniform(42);
    const n = 7;
    const room = shiftedHessenbergRoom(n);
    for (let trial = 0; trial < 20; trial++) {
      const h = toFlat(hessenberg(random, n));
      const s = { re: 0, im: 10 ** (4 * random() - 2) };
      const solve = (factors: ReturnType<typeof factorShiftedHessenberg>) => {
        const x = { re: new Float64Array(n).fill(1), im: new Float64Array(n) };
        solveShiftedHessenberg(factors, x.re, x.im, 1);
        return x;
      };
      expect(solve(factorShiftedHessenberg(h, n, s, room))).toEqual(solve(factorShiftedHessenberg(h, n, s)));
    }
  });

  test("a matrix that lets elimination grow as far as it can grows at most n times", () => {
    const n = 40;
    const H = Matrix.zeros(n, n);
    for (let i = 0; i < n; i++) {
      for (let j = i; j < n; j++) H.set(i, j, j === n - 1 ? -1 : 0);
      H.set(i, i, -1);
      if (i > 0) H.set(i, i - 1, 1);
    }
    const { re } = factorShiftedHessenberg(toFlat(H), n, { re: 0, im: 0 });
    const largest = Math.max(...re.map(Math.abs));
    expect(largest).toBe(n);
  });

  test("names the row without a pivot at an eigenvalue, and divides by none", () => {
    const h = Float64Array.of(0, 1, -4, 0);
    const factors = factorShiftedHessenberg(h, 2, { re: 0, im: 2 });
    expect(factors.zeroPivot).toBe(1);
    expect(() => solveShiftedHessenberg(factors, Float64Array.of(1, 0), Float64Array.of(0, 0), 1)).toThrow(
      expect.objectContaining({ code: "singular", data: { matrix: "sI - H", row: 1 } }),
    );
    expect(factorShiftedHessenberg(new Float64Array(9), 3, { re: 0, im: 0 }).zeroPivot).toBe(0);
  });

  test("nothing to solve is solved", () => {
    expect(factorShiftedHessenberg(new Float64Array(0), 0, { re: 1, im: 0 }).zeroPivot).toBe(-1);
  });
});
