import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import type { NumericalError } from "../../control/errors";
import { referenceGain } from "../../control/lqr/reference-gain";
import { placePoles } from "../../control/poles/place-poles";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const doubleIntegrator = {
  A: new Matrix([
    [0, 1],
    [0, 0],
  ]),
  B: new Matrix([[0], [1]]),
  K: new Matrix([[5, 2]]),
};

function identityDefect(steadyState: Matrix): number {
  return Math.max(...Matrix.sub(steadyState, Matrix.eye(steadyState.rows)).to1DArray().map(Math.abs));
}

describe("referenceGain", () => {
  test("reaches every set point of random plants, continuous and sampled, with feed-through to z", () => {
    const random = seededUniform(15);
    for (const [n, m, q] of [
      [3, 1, 1],
      [5, 2, 2],
      [6, 3, 2],
      [8, 4, 4],
    ]) {
      const [A, B, H, J] = [
        seededMatrix(random, n, n),
        seededMatrix(random, n, m),
        seededMatrix(random, q, n),
        seededMatrix(random, q, m),
      ];
      const continuous = placePoles({ A, B, poles: Array.from({ length: n }, (_, i) => ({ re: -1 - i / 2, im: 0 })) });
      const { F, steadyState, reached, obstacle } = referenceGain({ A, B, H, J, K: continuous.K });
      expect([reached.every(Boolean), obstacle]).toEqual([true, null]);
      expect(identityDefect(steadyState)).toBeLessThan(1e-11);
      expect([F.rows, F.columns]).toEqual([m, q]);
      const sampled = placePoles({ A, B, poles: Array.from({ length: n }, (_, i) => ({ re: 0.1 + i / 20, im: 0 })) });
      const digital = referenceGain({ A, B, H, J, K: sampled.K, sampled: true });
      // Run the loop to rest: z must have reached r.
      const closed = Matrix.sub(A, B.mmul(sampled.K));
      let x = Matrix.zeros(n, q);
      for (let k = 0; k < 400; k++) x = Matrix.add(closed.mmul(x), B.mmul(digital.F));
      const u = Matrix.sub(digital.F, sampled.K.mmul(x));
      expect(identityDefect(Matrix.add(H.mmul(x), J.mmul(u)))).toBeLessThan(1e-9);
    }
  });

  test("tells a quantity that is always zero at rest from one that is reached", () => {
    const rate = referenceGain({ ...doubleIntegrator, H: new Matrix([[0, 1]]), J: new Matrix([[0]]) });
    expect([rate.F.to2DArray(), rate.steadyState.to2DArray(), rate.reached, rate.obstacle]).toEqual([
      [[0]],
      [[0]],
      [false],
      "zero-at-rest",
    ]);
    const two = {
      A: new Matrix([
        [0, 1, 0],
        [0, 0, 0],
        [0, 0, -1],
      ]),
      B: new Matrix([
        [0, 0],
        [1, 0],
        [0, 1],
      ]),
    };
    const { K } = placePoles({ ...two, poles: [-1, -2, -3].map((re) => ({ re, im: 0 })) });
    const both = referenceGain({
      ...two,
      H: new Matrix([
        [0, 1, 0],
        [0, 0, 1],
      ]),
      J: Matrix.zeros(2, 2),
      K,
    });
    expect([both.reached, both.obstacle]).toEqual([[false, true], "zero-at-rest"]);
    expect(both.steadyState.get(0, 0)).toBe(0);
  });

  test("says that there are too few inputs, and still reaches what does not compete", () => {
    const apart = referenceGain({ ...doubleIntegrator, H: Matrix.eye(2), J: Matrix.zeros(2, 1) });
    expect([apart.reached, apart.obstacle]).toEqual([[true, false], "too-few-inputs"]);
    const rival = {
      A: new Matrix([
        [-1, 0],
        [0, -2],
      ]),
      B: new Matrix([[1], [1]]),
      K: new Matrix([[0, 0]]),
    };
    const torn = referenceGain({ ...rival, H: Matrix.eye(2), J: Matrix.zeros(2, 1) });
    expect([torn.reached, torn.obstacle]).toEqual([[false, false], "too-few-inputs"]);
  });

  test("says that quantities depend on each other when they do at every frequency", () => {
    const A = new Matrix([
      [0, 1],
      [0, 0],
    ]);
    const B = new Matrix([
      [0, 0],
      [1, 2],
    ]);
    const H = new Matrix([
      [1, 0],
      [2, 0],
    ]);
    const { reached, obstacle } = referenceGain({
      A,
      B,
      H,
      J: Matrix.zeros(2, 2),
      K: new Matrix([
        [2, 3],
        [0, 0],
      ]),
    });
    expect([reached, obstacle]).toEqual([[false, false], "rank"]);
  });

  test("gives the same verdicts and the same loop in other units", () => {
    const H = new Matrix([
      [1e-6, 0],
      [0, 1e5],
    ]);
    const A = new Matrix([
      [0, 1e9],
      [0, 0],
    ]);
    const B = new Matrix([
      [0, 0],
      [1e-3, 0],
    ]);
    const K = new Matrix([
      [5e-6, 2e3],
      [0, 0],
    ]);
    const { F, reached, obstacle } = referenceGain({
      A,
      B,
      H,
      J: new Matrix([
        [0, 1e-9],
        [0, 0],
      ]),
      K,
    });
    expect([reached, obstacle]).toEqual([[true, false], "zero-at-rest"]);
    expect(F.get(0, 0) + F.get(1, 0)).toBeGreaterThan(0);
    expect(F.getColumn(1)).toEqual([0, 0]);
  });

  test("has nothing to do without commanded quantities", () => {
    const { F, reached, obstacle } = referenceGain({ ...doubleIntegrator, H: new Matrix(0, 2), J: new Matrix(0, 1) });
    expect([F.rows, F.columns, reached, obstacle]).toEqual([1, 0, [], null]);
  });

  test("refuses shapes that do not fit and a loop that is not at rest anywhere", () => {
    const code = (run: () => unknown) => {
      try {
        run();
      } catch (error) {
        return (error as NumericalError).code;
      }
      return "none";
    };
    const H = new Matrix([[1, 0]]);
    const J = new Matrix([[0]]);
    expect(code(() => referenceGain({ ...doubleIntegrator, H, J: new Matrix([[0, 1]]) }))).toBe("shape-mismatch");
    expect(code(() => referenceGain({ ...doubleIntegrator, H, J, K: new Matrix([[0, 2]]) }))).toBe("singular");
  });
});
