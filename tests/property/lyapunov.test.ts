import fc from "fast-check";
import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import { frobeniusNorm } from "@/control/linalg/norms";
import { solveLyapunov } from "@/control/linalg/solve-lyapunov";
import { symmetricEigenvalues } from "@/control/linalg/symmetric-eigenvalues";
import { matchPoles } from "@/control/poles/match-poles";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const EPS = Number.EPSILON;
const seeds = fc.integer({ min: 1, max: 2 ** 31 - 1 });
const runs = { numRuns: 200, seed: 47 };
const TIME_BASES = ["continuous", "sampled"] as const;
type TimeBase = (typeof TIME_BASES)[number];

/** A random plant; `stable`: moved, or scaled when sampled, to have some margin. */
function drawn(seed: number, timeBase: TimeBase, stable = true) {
  const random = seededUniform(seed);
  const n = 1 + Math.floor(8 * random());
  const M = seededMatrix(random, n, n);
  const poles = eigenvalues(M);
  const radius = Math.max(...poles.map(({ re, im }) => Math.hypot(re, im)));
  const right = Math.max(...poles.map(({ re }) => re));
  const A = !stable ? M : timeBase === "sampled" ? M.mul(0.9 / radius) : Matrix.sub(M, Matrix.eye(n).mul(right + 0.2));
  const G = seededMatrix(random, n, 1 + Math.floor(n * random()));
  return { n, A, G, Q: G.mmul(G.transpose()), random };
}

describe.each(TIME_BASES)("the %s Lyapunov equation", (timeBase) => {
  test("of a stable plant has a symmetric, semidefinite solution", () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const { n, A, Q } = drawn(seed, timeBase);
        const { X, residual, bound } = solveLyapunov({ A, Q, timeBase });
        expect(X.to2DArray()).toEqual(X.transpose().to2DArray());
        expect(residual).toBeLessThanOrEqual(bound);
        expect(symmetricEigenvalues(X)[0]).toBeGreaterThanOrEqual(-10 * n * EPS * frobeniusNorm(X));
      }),
      runs,
    );
  });

  test("grows with its weight", () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const { n, A, Q, random } = drawn(seed, timeBase);
        const more = seededMatrix(random, n, n);
        const less = solveLyapunov({ A, Q, timeBase }).X;
        const greater = solveLyapunov({ A, Q: Matrix.add(Q, more.mmul(more.transpose())), timeBase }).X;
        const least = symmetricEigenvalues(Matrix.sub(greater, less))[0];
        expect(least).toBeGreaterThanOrEqual(-1e2 * n * EPS * frobeniusNorm(greater));
      }),
      runs,
    );
  });

  test("is linear in its weight: a power of two passes through exactly", () => {
    fc.assert(
      fc.property(seeds, fc.integer({ min: -60, max: 60 }), (seed, exponent) => {
        const { A, Q } = drawn(seed, timeBase);
        const here = solveLyapunov({ A, Q, timeBase }).X;
        const there = solveLyapunov({ A, Q: Matrix.mul(Q, 2 ** exponent), timeBase }).X;
        expect(there.to2DArray()).toEqual(Matrix.mul(here, 2 ** exponent).to2DArray());
      }),
      runs,
    );
  });

  test("turns along with the states", () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const { n, A, Q, random } = drawn(seed, timeBase);
        const v = seededMatrix(random, n, 1);
        const length = frobeniusNorm(v) ** 2;
        fc.pre(length > 0.01);
        const T = Matrix.sub(Matrix.eye(n), v.mmul(v.transpose()).mul(2 / length));
        const even = (M: Matrix) => Matrix.add(M, M.transpose()).mul(0.5);
        const here = solveLyapunov({ A, Q, timeBase }).X;
        const there = solveLyapunov({ A: T.mmul(A).mmul(T), Q: even(T.mmul(Q).mmul(T)), timeBase }).X;
        const taken = frobeniusNorm(solveLyapunov({ A, Q: Matrix.eye(n), timeBase }).X);
        const condition = 1 + taken * (1 + frobeniusNorm(A)) ** 2;
        expect(frobeniusNorm(Matrix.sub(there, T.mmul(here).mmul(T)))).toBeLessThanOrEqual(
          1e2 * n * EPS * condition * (frobeniusNorm(here) + frobeniusNorm(Q)),
        );
      }),
      runs,
    );
  });
});

// Ostrowski & Schneider 1962: with a definite weight the solution has as many negative eigenvalues as A has right of the axis.
test("tells how many poles are unstable by the signs of its eigenvalues", () => {
  let compared = 0;
  fc.assert(
    fc.property(seeds, (seed) => {
      const { n, A } = drawn(seed, "continuous", false);
      const poles = eigenvalues(A);
      // Next to the axis, or to a mirrored pair, rounding may decide.
      const apart = Math.min(...poles.flatMap((p) => poles.map((q) => Math.hypot(p.re + q.re, p.im + q.im))));
      if (apart < 1e-3) return;
      compared++;
      const signs = symmetricEigenvalues(solveLyapunov({ A, Q: Matrix.eye(n), timeBase: "continuous" }).X);
      expect(signs.filter((value) => value < 0).length).toBe(poles.filter(({ re }) => re > 0).length);
    }),
    runs,
  );
  expect(compared).toBeGreaterThan(150);
});

describe("eigenvalues", () => {
  test("come in exact pairs, add up to the trace, and scale exactly with powers of four", () => {
    fc.assert(
      fc.property(seeds, fc.integer({ min: -100, max: 100 }), (seed, exponent) => {
        const { n, A } = drawn(seed, "continuous", false);
        const values = eigenvalues(A);
        values.forEach(({ im }, k) => {
          if (im > 0) expect(values[k + 1]).toEqual({ re: values[k].re, im: -im });
        });
        const sum = values.reduce((total, { re }) => total + re, 0);
        expect(Math.abs(sum - A.trace())).toBeLessThanOrEqual(10 * n * EPS * frobeniusNorm(A));
        const unit = 4 ** exponent; // the root in a pair takes half of it
        expect(eigenvalues(Matrix.mul(A, unit))).toEqual(values.map(({ re, im }) => ({ re: re * unit, im: im * unit })));
      }),
      runs,
    );
  });

  test("of the transpose, and in units of powers of two, are the same within the square root of rounding", () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const { n, A, random } = drawn(seed, "continuous", false);
        const units = Array.from({ length: n }, () => 2 ** Math.floor(40 * random() - 20));
        const scaled = new Matrix(A.to2DArray().map((row, i) => row.map((entry, j) => (entry * units[j]) / units[i])));
        const values = eigenvalues(A);
        for (const other of [A.transpose(), scaled]) {
          matchPoles(values, eigenvalues(other)).forEach(({ re, im }, k) => {
            const apart = Math.hypot(re - values[k].re, im - values[k].im);
            expect(apart).toBeLessThanOrEqual(10 * n * Math.sqrt(EPS) * frobeniusNorm(A));
          });
        }
      }),
      runs,
    );
  });
});
