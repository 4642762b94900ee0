import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { checkProblem } from "../../control/riccati/check-problem";
import type { FlatProblem, Start } from "../../control/riccati/problem";
import { refine } from "../../control/riccati/refine";
import { removeCrossTerm } from "../../control/riccati/remove-cross-term";
import { splitProblem } from "../../control/riccati/residual";
import { scaleProblem } from "../../control/riccati/scale-problem";
import { type RiccatiProblem, solveRiccati } from "../../control/riccati/solve-riccati";
import { startByDoubling } from "../../control/riccati/start-by-doubling";
import { startByGain } from "../../control/riccati/start-by-gain";
import { startBySchur } from "../../control/riccati/start-by-schur";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const STARTS: Record<string, (problem: FlatProblem) => Start> = {
  doubling: (problem) => ({ x: startByDoubling(removeCrossTerm(problem, "R")) }),
  "ordered Schur form": (problem) => ({ x: startBySchur(removeCrossTerm(problem, "R")) }),
  "stabilising gain": (problem) => ({ gain: startByGain(problem, 1) }),
};

function refinedFrom(given: RiccatiProblem, start: (problem: FlatProblem) => Start): number[] {
  const { problem } = scaleProblem(checkProblem(given).problem, (scaled) => removeCrossTerm(scaled, "R").g);
  return [...refine(splitProblem(problem), start(problem), new Float64Array(problem.n).fill(1)).x.hi];
}

function randomProblem(random: () => number, trial: number): RiccatiProblem {
  const n = 2 + (trial % 6);
  const m = 1 + (trial % 2);
  const C = seededMatrix(random, n, n);
  // [Q S; S' R] = [C; D]'[C; D] + I stays positive definite.
  const D = seededMatrix(random, n, m);
  return {
    A: seededMatrix(random, n, n),
    B: seededMatrix(random, n, m),
    Q: C.transpose().mmul(C).add(Matrix.eye(n)),
    R: D.transpose().mmul(D).add(Matrix.eye(m)),
    S: C.transpose().mmul(D),
    sampled: trial % 3 === 0,
  };
}

describe("three unrelated starts", () => {
  test("end in the same bits on 60 random problems with cross terms", () => {
    const random = seededUniform(41);
    for (let trial = 0; trial < 60; trial++) {
      const problem = randomProblem(random, trial);
      const [first, ...others] = Object.values(STARTS).map((start) => refinedFrom(problem, start));
      for (const other of others) expect(other).toEqual(first);
    }
  });

  test("are told apart in the result: an unstable mode the weights do not see goes beyond doubling", () => {
    const seen = solveRiccati({ A: new Matrix([[1]]), B: new Matrix([[1]]), Q: new Matrix([[1]]), R: new Matrix([[1]]) });
    expect(seen.method).toBe("doubling");
    const unseen = solveRiccati({
      A: new Matrix([
        [1, 0],
        [0, -1],
      ]),
      B: new Matrix([[1], [1]]),
      Q: Matrix.zeros(2, 2),
      R: new Matrix([[1]]),
    });
    expect(unseen.method).not.toBe("doubling");
    // Least effort mirrors the unstable pole: k = 2 on its state.
    expect(unseen.K.to2DArray()).toEqual([[2, 0]]);
  });
});

describe("a wrong start is thrown out, never refined into a wrong answer", () => {
  const problem = {
    A: new Matrix([
      [1, 1],
      [0, 2],
    ]),
    B: new Matrix([[0], [1]]),
    Q: Matrix.eye(2),
    R: Matrix.eye(1),
  };

  test("the zero solution of an unstable plant", () => {
    expect(() => refinedFrom(problem, () => ({ x: new Float64Array(4) }))).toThrow(
      expect.objectContaining({ code: "not-stabilising" }),
    );
  });

  test("the negative solution", () => {
    const { X } = solveRiccati(problem);
    const negative = Float64Array.from(X.to1DArray(), (x) => -x);
    expect(() => refinedFrom(problem, () => ({ x: negative }))).toThrow(expect.objectContaining({ code: "not-stabilising" }));
  });

  test("a start full of NaN", () => {
    expect(() => refinedFrom(problem, () => ({ x: new Float64Array(4).fill(Number.NaN) }))).toThrow(
      expect.objectContaining({ name: "NumericalError" }),
    );
  });
});

test("scaling by powers of two is exact: X and K do not depend on units of states, inputs, time or cost", () => {
  const random = seededUniform(42);
  const power = () => 2 ** Math.round(24 * (random() - 0.5));
  for (let trial = 0; trial < 60; trial++) {
    const { A, B, Q, R, S, sampled } = randomProblem(random, trial);
    const [n, m] = [A.rows, B.columns];
    const d = Array.from({ length: n }, power);
    const e = Array.from({ length: m }, power);
    const [time, cost] = [sampled ? 1 : power(), power()];
    const map = (M: Matrix, factor: (i: number, j: number) => number) =>
      new Matrix(
        Array.from({ length: M.rows }, (_, i) => Array.from({ length: M.columns }, (_, j) => M.get(i, j) * factor(i, j))),
      );
    const plain = solveRiccati({ A, B, Q, R, S, sampled });
    const other = solveRiccati({
      A: map(A, (i, j) => (d[j] / d[i]) * time),
      B: map(B, (i, j) => (e[j] / d[i]) * time),
      Q: map(Q, (i, j) => d[i] * d[j] * cost),
      R: map(R, (i, j) => e[i] * e[j] * cost),
      S: S && map(S, (i, j) => d[i] * e[j] * cost),
      sampled,
    });
    expect(other.X.to2DArray()).toEqual(map(plain.X, (i, j) => (d[i] * d[j] * cost) / time).to2DArray());
    expect(other.K.to2DArray()).toEqual(map(plain.K, (i, j) => d[j] / e[i]).to2DArray());
  }
});
