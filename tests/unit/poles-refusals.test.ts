import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import type { NumericalError } from "../../control/errors";
import type { Complex } from "../../control/plant/model";
import { placePoles } from "../../control/poles/place-poles";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const real = (...values: number[]): Complex[] => values.map((re) => ({ re, im: 0 }));
const spread = (n: number) => real(...Array.from({ length: n }, (_, i) => -0.5 - i / 4));

function refusal(run: () => unknown): NumericalError {
  try {
    run();
  } catch (error) {
    return error as NumericalError;
  }
  throw new Error("expected a refusal");
}

/** One state that only the first input reaches, with the given strength; the other two belong together. */
const weak = (strength: number) => ({
  A: new Matrix([
    [0.5, 0, 0],
    [0, -1, 1],
    [0, -0.5, -2],
  ]),
  B: new Matrix([
    [strength, 0],
    [1, 0],
    [0, 1],
  ]),
});

describe("placePoles refuses", () => {
  const { A, B } = weak(1);

  test("a wrong number of poles", () => {
    const error = refusal(() => placePoles({ A, B, poles: real(-1, -2) }));
    expect([error.code, error.data]).toEqual(["pole-count", { expected: 3, given: 2 }]);
  });

  test("complex poles without their exact partner, named by place", () => {
    const poles = [
      { re: -1, im: 0 },
      { re: -2, im: 1 },
      { re: -2, im: -1.0000000001 },
    ];
    const error = refusal(() => placePoles({ A, B, poles }));
    expect([error.code, error.data]).toEqual(["poles-not-conjugate", { index: 1, pole: poles[1] }]);
  });

  test("shapes that do not fit, and entries or poles that are not finite", () => {
    expect(refusal(() => placePoles({ A, B: new Matrix([[1]]), poles: real(-1, -2, -3) })).code).toBe("shape-mismatch");
    const spoiled = A.clone().set(1, 2, Number.NaN);
    expect(refusal(() => placePoles({ A: spoiled, B, poles: real(-1, -2, -3) })).data).toEqual({
      matrix: "A",
      row: 1,
      column: 2,
    });
    expect(refusal(() => placePoles({ A, B, poles: real(-1, Number.NaN, -3) })).code).toBe("not-finite");
  });

  test("a pole repeated more often than rank B, naming pole, multiplicity and rank", () => {
    const redundant = new Matrix([
      [1, 2, 0],
      [1, 2, 0],
      [0, 0, 0],
    ]);
    const error = refusal(() =>
      placePoles({
        A: new Matrix([
          [0, 1, 0],
          [0, 0, 1],
          [1, 0, 0],
        ]),
        B: redundant,
        poles: real(-2, -1, -1),
      }),
    );
    expect([error.code, error.data]).toEqual(["pole-multiplicity", { pole: { re: -1, im: 0 }, multiplicity: 2, rank: 1 }]);
  });

  test("two poles repeated twice where the second input has only one state to itself", () => {
    const chain = {
      A: new Matrix([
        [0, 1, 0, 0],
        [0, 0, 1, 0],
        [1, 0, 0, 0],
        [0, 0, 0, 3],
      ]),
      B: new Matrix([
        [0, 0],
        [0, 0],
        [1, 0],
        [0, 1],
      ]),
    };
    expect(placePoles({ ...chain, poles: real(-1, -1, -2, -3) }).poleError).toBeLessThan(1e-12);
    const error = refusal(() => placePoles({ ...chain, poles: real(-1, -1, -2, -2) }));
    expect([error.code, error.data]).toEqual(["pole-multiplicity", { pole: { re: -2, im: 0 }, multiplicity: 2, rank: 1 }]);
  });

  test("a mode that no input moves, naming its pole, its state and its distance", () => {
    const plant = weak(0);
    const error = refusal(() => placePoles({ ...plant, poles: real(-1, -2, -3) }));
    expect(error.code).toBe("not-controllable");
    expect(error.data.pole).toEqual({ re: 0.5, im: 0 });
    expect(error.data.state).toBe(0);
    expect(error.data.distance).toBeLessThan(1e-15);
  });

  test("the same mode when a change of coordinates hides it", () => {
    const random = seededUniform(11);
    const T = seededMatrix(random, 3, 3);
    const inverse = inverseOf(T);
    const { A: plain, B: inputs } = weak(0);
    const error = refusal(() => placePoles({ A: T.mmul(plain).mmul(inverse), B: T.mmul(inputs), poles: real(-1, -2, -3) }));
    expect(error.code).toBe("not-controllable");
    expect((error.data.pole as Complex).re).toBeCloseTo(0.5, 13);
  });

  test("inputs that do nothing at all", () => {
    expect(refusal(() => placePoles({ A, B: Matrix.zeros(3, 2), poles: real(-1, -2, -3) })).code).toBe("not-controllable");
  });

  test("poles so sensitive that no gain of doubles holds them, with how far they stray", () => {
    const random = seededUniform(1);
    const n = 40;
    const error = refusal(() => placePoles({ A: seededMatrix(random, n, n), B: seededMatrix(random, n, 1), poles: spread(n) }));
    expect(error.code).toBe("too-sensitive");
    expect(error.data.poleError).toBeGreaterThan(error.data.limit as number);
    expect(spread(n)).toContainEqual(error.data.pole);
  });

  test("a loop that rounding alone pushes over the stability boundary that every wanted pole respects", () => {
    const A = new Matrix([
      [0.1, 1],
      [-1, 0.4],
    ]);
    const poles = [
      { re: -1e-18, im: 1 },
      { re: -1e-18, im: -1 },
    ];
    const error = refusal(() => placePoles({ A, B: new Matrix([[0.7], [0.9]]), poles }));
    expect(error.code).toBe("not-stabilising");
    expect((error.data.pole as Complex).re).toBeGreaterThanOrEqual(0);
  });
});

function inverseOf(T: Matrix): Matrix {
  const [[a, b, c], [d, e, f], [g, h, i]] = T.to2DArray();
  const determinant = a * (e * i - f * h) - b * (d * i - f * g) + c * (d * h - e * g);
  return new Matrix([
    [e * i - f * h, c * h - b * i, b * f - c * e],
    [f * g - d * i, a * i - c * g, c * d - a * f],
    [d * h - e * g, b * g - a * h, a * e - b * d],
  ]).div(determinant);
}
