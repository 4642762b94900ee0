import fc from "fast-check";
import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import { frobeniusNorm } from "@/control/linalg/norms";
import { solveLyapunov } from "@/control/linalg/solve-lyapunov";
import { observerFromNoise } from "@/control/observer/observer-from-noise";
import { matchPoles } from "@/control/poles/match-poles";
import { solveRiccati } from "@/control/riccati/solve-riccati";
import { seededMatrix, seededUniform } from "../helpers/seeded";

type Problem = { A: Matrix; B: Matrix; Q: Matrix; R: Matrix; S: Matrix; sampled: boolean };

/** [Q S; S' R] = [C D]'[C D] + I: always definite. */
function problem(seed: number): Problem {
  const random = seededUniform(seed);
  const n = 1 + Math.floor(7 * random());
  const m = 1 + Math.floor(3 * random());
  const [C, D] = [seededMatrix(random, n, n), seededMatrix(random, n, m)];
  return {
    A: seededMatrix(random, n, n),
    B: seededMatrix(random, n, m),
    Q: C.transpose().mmul(C).add(Matrix.eye(n)),
    R: D.transpose().mmul(D).add(Matrix.eye(m)),
    S: C.transpose().mmul(D),
    sampled: random() < 0.5,
  };
}

const seeds = fc.integer({ min: 1, max: 2 ** 31 - 1 });
const runs = { numRuns: 150, seed: 31 };

/** D₁ M D₂ for powers of two. */
const scaled = (M: Matrix, left: readonly number[], right: readonly number[]) =>
  new Matrix(M.to2DArray().map((row, i) => row.map((entry, j) => entry * left[i] * right[j])));

const inverted = (powers: readonly number[]) => powers.map((power) => 1 / power);

/** Undefined where a plant is refused. */
function attempt<T>(work: () => T): T | undefined {
  try {
    return work();
  } catch (error) {
    if (error instanceof NumericalError) return undefined;
    throw error;
  }
}

describe("powers of two change a Riccati solution by exactly those powers", () => {
  test("as units of states and inputs", () => {
    let compared = 0;
    fc.assert(
      fc.property(seeds, fc.array(fc.integer({ min: -20, max: 20 }), { minLength: 12, maxLength: 12 }), (seed, exponents) => {
        const { A, B, Q, R, S, sampled } = problem(seed);
        const units = exponents.map((exponent) => 2 ** exponent);
        const [states, inputs] = [units.slice(0, A.rows), units.slice(8, 8 + B.columns)];
        const here = attempt(() => solveRiccati({ A, B, Q, R, S, sampled }));
        const there = attempt(() =>
          solveRiccati({
            A: scaled(A, inverted(states), states),
            B: scaled(B, inverted(states), inputs),
            Q: scaled(Q, states, states),
            R: scaled(R, inputs, inputs),
            S: scaled(S, states, inputs),
            sampled,
          }),
        );
        if (!here || !there) return;
        compared++;
        expect(there.X.to2DArray()).toEqual(scaled(here.X, states, states).to2DArray());
        expect(there.K.to2DArray()).toEqual(scaled(here.K, inverted(inputs), states).to2DArray());
      }),
      runs,
    );
    expect(compared).toBeGreaterThan(140);
  });

  test("as a unit of cost, and for a continuous plant of time", () => {
    let compared = 0;
    fc.assert(
      fc.property(seeds, fc.integer({ min: -30, max: 30 }), fc.integer({ min: -30, max: 30 }), (seed, cost, rate) => {
        const { A, B, Q, R, S, sampled } = problem(seed);
        const [price, speed] = [2 ** cost, sampled ? 1 : 2 ** rate];
        const here = attempt(() => solveRiccati({ A, B, Q, R, S, sampled }));
        const there = attempt(() =>
          solveRiccati({
            A: Matrix.mul(A, speed),
            B: Matrix.mul(B, speed),
            Q: Matrix.mul(Q, price),
            R: Matrix.mul(R, price),
            S: Matrix.mul(S, price),
            sampled,
          }),
        );
        if (!here || !there) return;
        compared++;
        expect(there.X.to2DArray()).toEqual(Matrix.mul(here.X, price / speed).to2DArray());
        expect(there.K.to2DArray()).toEqual(here.K.to2DArray());
      }),
      runs,
    );
    expect(compared).toBeGreaterThan(140);
  });
});

test("the Kalman gain is the transposed regulator gain of the dual plant, bit for bit", () => {
  fc.assert(
    fc.property(seeds, (seed) => {
      const { A, B, Q, R, sampled } = problem(seed);
      const regulator = attempt(() => solveRiccati({ A, B, Q, R, sampled }));
      const observer = attempt(() =>
        observerFromNoise({ A: A.transpose(), C: B.transpose(), processNoise: Q, measurementNoise: R, sampled }),
      );
      expect(observer?.L.to2DArray()).toEqual(regulator?.K.transpose().to2DArray());
      expect(observer?.covariance.to2DArray()).toEqual(regulator?.X.to2DArray());
    }),
    runs,
  );
});

test("the order of states and inputs does not matter: entries move along within one unit in the last place", () => {
  fc.assert(
    fc.property(seeds, (seed) => {
      const { A, B, Q, R, S, sampled } = problem(seed);
      const [n, m] = [A.rows, B.columns];
      const reversed = (M: Matrix) =>
        new Matrix(
          M.to2DArray()
            .map((row) => [...row].reverse())
            .reverse(),
        );
      const here = attempt(() => solveRiccati({ A, B, Q, R, S, sampled }));
      const there = attempt(() =>
        solveRiccati({ A: reversed(A), B: reversed(B), Q: reversed(Q), R: reversed(R), S: reversed(S), sampled }),
      );
      if (!here || !there) return;
      const back = reversed(there.K);
      for (let i = 0; i < m; i++) {
        const row = Math.hypot(...here.K.getRow(i));
        for (let j = 0; j < n; j++) expect(Math.abs(here.K.get(i, j) - back.get(i, j))).toBeLessThanOrEqual(Number.EPSILON * row);
      }
    }),
    runs,
  );
});

test("the closed loop has the stable half of the Hamiltonian's eigenvalues", () => {
  let compared = 0;
  fc.assert(
    fc.property(seeds, (seed) => {
      const { A, B, Q } = problem(seed);
      const n = A.rows;
      const solution = attempt(() => solveRiccati({ A, B, Q, R: Matrix.eye(B.columns) }));
      if (!solution) return;
      compared++;
      const hamiltonian = Matrix.zeros(2 * n, 2 * n);
      hamiltonian.setSubMatrix(A, 0, 0);
      hamiltonian.setSubMatrix(B.mmul(B.transpose()).mul(-1), 0, n);
      hamiltonian.setSubMatrix(Matrix.mul(Q, -1), n, 0);
      hamiltonian.setSubMatrix(A.transpose().mul(-1), n, n);
      const stable = eigenvalues(hamiltonian).filter(({ re }) => re < 0);
      expect(stable.length).toBe(n);
      const matched = matchPoles(stable, solution.closedLoopPoles);
      // To the power n both have the same polynomial: a defective pair moves by the square root of rounding.
      const size = frobeniusNorm(hamiltonian);
      stable.forEach(({ re, im }, k) => {
        expect(Math.hypot(re - matched[k].re, im - matched[k].im)).toBeLessThanOrEqual(1e2 * Math.sqrt(Number.EPSILON) * size);
      });
      const sum = (values: readonly { re: number }[]) => values.reduce((total, { re }) => total + re, 0);
      expect(Math.abs(sum(stable) - sum(solution.closedLoopPoles))).toBeLessThanOrEqual(1e2 * n * Number.EPSILON * size);
    }),
    runs,
  );
  expect(compared).toBeGreaterThan(140);
});

test("X is the cost of the optimal loop: the Lyapunov equation of A - BK gives it back", () => {
  fc.assert(
    fc.property(seeds, (seed) => {
      const { A, B, Q, R, sampled } = problem(seed);
      const solution = attempt(() => solveRiccati({ A, B, Q, R, sampled }));
      if (!solution) return;
      const { X, K } = solution;
      const closed = Matrix.sub(A, B.mmul(K));
      const weight = Matrix.add(Q, K.transpose().mmul(R).mmul(K));
      const even = Matrix.add(weight, weight.transpose()).mul(0.5);
      const cost = solveLyapunov({ A: closed.transpose(), Q: even, timeBase: sampled ? "sampled" : "continuous" });
      const taken = solveLyapunov({ A: closed.transpose(), Q: Matrix.eye(A.rows), timeBase: sampled ? "sampled" : "continuous" });
      const condition = 1 + frobeniusNorm(taken.X) * (frobeniusNorm(A) + frobeniusNorm(B.mmul(K)) + 1) ** 2;
      expect(frobeniusNorm(Matrix.sub(cost.X, X))).toBeLessThanOrEqual(
        10 * A.rows * Number.EPSILON * condition * (frobeniusNorm(X) + frobeniusNorm(weight)),
      );
    }),
    runs,
  );
});
