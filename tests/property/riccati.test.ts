import fc from "fast-check";
import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { NumericalError } from "../../control/errors";
import { frobeniusNorm } from "../../control/linalg/norms";
import { solveLyapunov } from "../../control/linalg/solve-lyapunov";
import { symmetricEigenvalues } from "../../control/linalg/symmetric-eigenvalues";
import { checkProblem } from "../../control/riccati/check-problem";
import { refine } from "../../control/riccati/refine";
import { removeCrossTerm } from "../../control/riccati/remove-cross-term";
import { splitProblem } from "../../control/riccati/residual";
import { scaleProblem } from "../../control/riccati/scale-problem";
import { solveRiccati } from "../../control/riccati/solve-riccati";
import { startByDoubling } from "../../control/riccati/start-by-doubling";
import { startBySchur } from "../../control/riccati/start-by-schur";

const EPS = Number.EPSILON;
const SEED = 20240607;

const entries = (rows: number, columns: number, entry: fc.Arbitrary<number>) =>
  fc
    .array(fc.array(entry, { minLength: columns, maxLength: columns }), { minLength: rows, maxLength: rows })
    .map((a) => new Matrix(a));

// Thousandths, not fc.double: that favours numbers next to zero, which make nearly every plant unsolvable.
const ordinary = fc.integer({ min: -2000, max: 2000 }).map((x) => x / 1000);

const problem = fc.integer({ min: 1, max: 5 }).chain((n) =>
  fc.integer({ min: 1, max: 2 }).chain((m) =>
    fc
      .record({ A: entries(n, n, ordinary), B: entries(n, m, ordinary), C: entries(n, n, ordinary), sampled: fc.boolean() })
      .map(({ A, B, C, sampled }) => ({
        A,
        B,
        Q: C.transpose().mmul(C),
        R: Matrix.eye(m),
        sampled,
      })),
  ),
);

/** Undefined where the problem is refused with a typed error; anything else is a failure of the test. */
function attempt<T>(solve: () => T): T | undefined {
  try {
    return solve();
  } catch (error) {
    if (error instanceof NumericalError) return undefined;
    throw error;
  }
}

test("most of the problems drawn here are solved, so that what follows says something", () => {
  const drawn = fc.sample(problem, { seed: SEED, numRuns: 200 });
  expect(drawn.filter((given) => attempt(() => solveRiccati(given))).length).toBeGreaterThan(150);
});

describe("whatever is returned", () => {
  test("is finite, symmetric, stabilising, positive semidefinite and within its residual bound", () => {
    fc.assert(
      fc.property(problem, (given) => {
        const solution = attempt(() => solveRiccati(given));
        if (!solution) return;
        const { X, K, residual, bound, errorBound, closedLoopPoles, stabilityDistance } = solution;
        expect([...X.to1DArray(), ...K.to1DArray(), residual, errorBound].every(Number.isFinite)).toBe(true);
        expect(X.to2DArray()).toEqual(X.transpose().to2DArray());
        expect(residual).toBeLessThanOrEqual(bound);
        expect(stabilityDistance).toBeGreaterThan(0);
        const margin = ({ re, im }: { re: number; im: number }) => (given.sampled ? 1 - Math.sqrt(re * re + im * im) : -re);
        expect(Math.min(...closedLoopPoles.map(margin))).toBeCloseTo(stabilityDistance, 12);
        const least = symmetricEigenvalues(X)[0];
        expect(least).toBeGreaterThanOrEqual(-20 * X.rows * EPS * frobeniusNorm(X));
      }),
      { seed: SEED, numRuns: 300 },
    );
  });

  test("is the cost of its own gain: X solves the Lyapunov equation of the closed loop", () => {
    fc.assert(
      fc.property(problem, (given) => {
        const solution = attempt(() => solveRiccati(given));
        // Close to the boundary the cost is a poor measure: its condition is one over the distance.
        if (!solution || solution.stabilityDistance < 1e-2) return;
        const loop = Matrix.sub(given.A, given.B.mmul(solution.K));
        const weight = Matrix.add(given.Q, solution.K.transpose().mmul(solution.K));
        weight.add(weight.transpose()).mul(0.5);
        const cost = solveLyapunov({ A: loop.transpose(), Q: weight, timeBase: given.sampled ? "sampled" : "continuous" }).X;
        const condition =
          ((1 + frobeniusNorm(loop)) ** 2 * frobeniusNorm(cost) + frobeniusNorm(weight)) / solution.stabilityDistance ** 2;
        expect(frobeniusNorm(Matrix.sub(cost, solution.X))).toBeLessThanOrEqual(1e3 * EPS * condition);
      }),
      { seed: SEED, numRuns: 200 },
    );
  });
});

test("doubling and the ordered Schur form, refined, end in the same bits", () => {
  let compared = 0;
  fc.assert(
    fc.property(problem, (given) => {
      const checked = checkProblem(given).problem;
      const scaled = scaleProblem(checked, (plain) => removeCrossTerm(plain, "R").g).problem;
      const units = new Float64Array(checked.n).fill(1);
      const from = (start: typeof startByDoubling) =>
        attempt(() => refine(splitProblem(scaled), { x: start(removeCrossTerm(scaled, "R")) }, units));
      const one = from(startByDoubling);
      const two = from(startBySchur);
      // Where the figures are in doubt so are the last bits, and the bound says so.
      if (!one || !two || Math.max(one.error.rows, two.error.rows) > 1e-22) return;
      compared += 1;
      expect([...one.x.hi]).toEqual([...two.x.hi]);
      expect([...one.gain.k.hi]).toEqual([...two.gain.k.hi]);
    }),
    { seed: SEED, numRuns: 300 },
  );
  expect(compared).toBeGreaterThan(200);
});

test("more state weight never costs less", () => {
  fc.assert(
    fc.property(problem, entries(5, 1, ordinary), (given, more) => {
      const c = more.subMatrix(0, given.A.rows - 1, 0, 0);
      const heavier = { ...given, Q: Matrix.add(given.Q, c.mmul(c.transpose())) };
      const one = attempt(() => solveRiccati(given));
      const two = attempt(() => solveRiccati(heavier));
      if (!one || !two) return;
      const least = symmetricEigenvalues(Matrix.sub(two.X, one.X))[0];
      expect(least).toBeGreaterThanOrEqual(-50 * given.A.rows * EPS * (frobeniusNorm(two.X) + frobeniusNorm(one.X)));
    }),
    { seed: SEED, numRuns: 200 },
  );
});

test("an orthogonal change of coordinates turns X and K along", () => {
  fc.assert(
    fc.property(problem, entries(5, 1, ordinary), (given, direction) => {
      const n = given.A.rows;
      const v = direction.subMatrix(0, n - 1, 0, 0);
      const length = frobeniusNorm(v);
      if (length < 1e-2) return;
      const H = Matrix.sub(Matrix.eye(n), v.mmul(v.transpose()).mul(2 / (length * length)));
      const Q = H.mmul(given.Q).mmul(H);
      const one = attempt(() => solveRiccati(given));
      const two = attempt(() =>
        solveRiccati({ ...given, A: H.mmul(given.A).mmul(H), B: H.mmul(given.B), Q: Matrix.add(Q, Q.transpose()).mul(0.5) }),
      );
      // The two problems differ by rounding; what that may do to X is not bounded when the loop is nearly unstable.
      if (!one || !two || Math.min(one.stabilityDistance, two.stabilityDistance) < 0.05) return;
      const size = frobeniusNorm(one.X) * (1 + frobeniusNorm(one.X) + frobeniusNorm(given.A)) ** 2;
      expect(frobeniusNorm(Matrix.sub(H.mmul(two.X).mmul(H), one.X))).toBeLessThanOrEqual(
        (1e4 * EPS * (size + 1)) / one.stabilityDistance,
      );
    }),
    { seed: SEED, numRuns: 200 },
  );
});

test("dual equations have inverse solutions: that of (-A', C', BB') inverts that of (A, B, C'C)", () => {
  const square = fc
    .integer({ min: 1, max: 5 })
    .chain((n) => fc.tuple(entries(n, n, ordinary), entries(n, n, ordinary), entries(n, n, ordinary)));
  let compared = 0;
  fc.assert(
    fc.property(square, ([A, B, C]) => {
      const n = A.rows;
      const one = attempt(() => solveRiccati({ A, B, Q: C.transpose().mmul(C), R: Matrix.eye(n) }));
      const two = attempt(() =>
        solveRiccati({ A: A.transpose().mul(-1), B: C.transpose(), Q: B.mmul(B.transpose()), R: Matrix.eye(n) }),
      );
      if (!one || !two) return;
      compared += 1;
      const condition = frobeniusNorm(one.X) * frobeniusNorm(two.X);
      // Forming C'C and BB' rounds the data of both: X is no closer than that allows.
      const loop =
        1 +
        (1 + frobeniusNorm(A) + frobeniusNorm(one.X) + frobeniusNorm(two.X)) /
          Math.min(one.stabilityDistance, two.stabilityDistance);
      expect(frobeniusNorm(Matrix.sub(one.X.mmul(two.X), Matrix.eye(n)))).toBeLessThanOrEqual(1e3 * EPS * condition * loop);
    }),
    { seed: SEED, numRuns: 200 },
  );
  expect(compared).toBeGreaterThan(100);
});

test("hostile entries (zero, tiny, huge, mixed) end in an answer that stabilises or in a typed refusal", () => {
  const hostile = fc.oneof(
    fc.constantFrom(0, 0, 0, 1, -1, 1e-300, -1e200, 1e150, 5e-324, 1.7e308),
    fc.double({ noNaN: true, noDefaultInfinity: true }),
    ordinary,
  );
  const wild = fc
    .integer({ min: 1, max: 4 })
    .chain((n) => fc.tuple(entries(n, n, hostile), entries(n, 1, hostile), fc.boolean()));
  fc.assert(
    fc.property(wild, ([A, B, sampled]) => {
      const solution = attempt(() => solveRiccati({ A, B, Q: Matrix.eye(A.rows), R: Matrix.eye(1), sampled }));
      if (!solution) return;
      expect([...solution.X.to1DArray(), ...solution.K.to1DArray()].every(Number.isFinite)).toBe(true);
      expect(solution.stabilityDistance).toBeGreaterThan(0);
    }),
    { seed: SEED, numRuns: 1500 },
  );
});
