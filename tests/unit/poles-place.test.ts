import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { eigenvalues } from "../../control/linalg/eigenvalues";
import { frobeniusNorm } from "../../control/linalg/norms";
import type { Complex } from "../../control/plant/model";
import { matchPoles } from "../../control/poles/match-poles";
import { placePoles } from "../../control/poles/place-poles";
import { processorMs } from "../helpers/processor-time";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const real = (...values: number[]): Complex[] => values.map((re) => ({ re, im: 0 }));
const spread = (n: number) => real(...Array.from({ length: n }, (_, i) => -0.5 - i / 4));

/** Of A - B K, worked out here and not taken from the result. */
function relativePoleError(A: Matrix, B: Matrix, K: Matrix, poles: readonly Complex[]): number {
  const achieved = matchPoles(poles, eigenvalues(Matrix.sub(A, B.mmul(K))));
  return Math.max(...poles.map((p, k) => Math.hypot(p.re - achieved[k].re, p.im - achieved[k].im) / Math.hypot(p.re, p.im)));
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

describe("placePoles keeps a mode that no input moves when it is wanted", () => {
  test("with one and with several inputs, and says so", () => {
    const single = {
      A: new Matrix([
        [1, 1, 0.5],
        [0, -2, 0],
        [0.3, 0, 0.7],
      ]),
      B: new Matrix([[1], [0], [0.4]]),
    };
    const placed = placePoles({ ...single, poles: real(-2, -1, -3) });
    expect(placed.method).toContain("kept");
    expect(placed.fixedModes).toEqual([{ re: -2, im: 0 }]);
    expect(relativePoleError(single.A, single.B, placed.K, real(-2, -1, -3))).toBeLessThan(1e-12);
    const several = placePoles({ ...weak(0), poles: real(0.5, -2, -3) });
    expect(several.achieved).toEqual(expect.arrayContaining([{ re: 0.5, im: 0 }]));
    expect(several.poleError).toBeLessThan(1e-14);
  });

  test("when it was typed with nine digits only", () => {
    const A = new Matrix([
      [-1 / 3, 0],
      [0, 1],
    ]);
    const placed = placePoles({ A, B: new Matrix([[0], [1]]), poles: real(-0.333333333, -2) });
    expect(placed.achieved[0].re).toBeCloseTo(-1 / 3, 15);
    expect(placed.K.to2DArray()).toEqual([[0, 3]]);
  });

  test("and a pair of such modes", () => {
    const A = new Matrix([
      [-1, 2, 0],
      [-2, -1, 0],
      [1, 1, 3],
    ]);
    const poles = [
      { re: -1, im: -2 },
      { re: -4, im: 0 },
      { re: -1, im: 2 },
    ];
    const placed = placePoles({ A, B: new Matrix([[0], [0], [2]]), poles });
    expect(placed.achieved.map(({ re }) => Math.round(re * 1e9) / 1e9)).toEqual([-1, -4, -1]);
    expect(Math.sign(placed.achieved[0].im)).toBe(-1);
  });
});

describe("placePoles copes with", () => {
  test("inputs that repeat others, sharing the work with the least gain, and inputs that do nothing", () => {
    const A = new Matrix([
      [0, 1],
      [2, -1],
    ]);
    const { K } = placePoles({
      A,
      B: new Matrix([
        [0, 0, 0],
        [1, 0, 2],
      ]),
      poles: real(-1, -3),
    });
    // Together [5 3]; the least-norm split over effects 1 and 2 is in proportion 1 : 2.
    for (const [row, gain] of [
      [0, 1],
      [1, 0],
      [2, 2],
    ]) {
      expect(K.get(row, 0)).toBeCloseTo(gain, 13);
      expect(K.get(row, 1)).toBeCloseTo((gain * 3) / 5, 13);
    }
  });

  test("a defective loop where that is allowed, and then gives no condition", () => {
    const h = 0.1;
    const axis = [
      [1, h],
      [0, 1],
    ];
    const A = new Matrix([
      [...axis[0], 0.01, 0],
      [...axis[1], 0, 0],
      [0, 0, ...axis[0]],
      [0, 0, ...axis[1]],
    ]);
    const B = new Matrix([
      [0.005, 0],
      [h, 0],
      [0, 0.005],
      [0, h],
    ]);
    const { K, conditioning, poleShiftPerGainDigit } = placePoles({ A, B, poles: real(0, 0, 0, 0), allowDefective: true });
    expect([conditioning, poleShiftPerGainDigit]).toEqual([null, null]);
    const closed = Matrix.sub(A, B.mmul(K));
    const fourth = closed.mmul(closed).mmul(closed).mmul(closed);
    expect(frobeniusNorm(fourth)).toBeLessThan(4 * Number.EPSILON * frobeniusNorm(closed) ** 4);
  });

  test("a double pole beside simple ones that are sensitive in their own right", () => {
    const n = 8;
    const A = Matrix.zeros(n, n);
    for (let i = 0; i + 1 < n; i++) A.set(i, i + 1, 1);
    const B = Matrix.zeros(n, 1).set(n - 1, 0, 1);
    const { K, achieved } = placePoles({ A, B, poles: real(-6, -6, -13, -4, -10, -7, -0.5, -3), allowDefective: true });
    // The constant coefficient is the product of the poles, the last one their sum.
    expect(K.get(0, 0)).toBe(6 * 6 * 13 * 4 * 10 * 7 * 0.5 * 3);
    expect(K.get(0, 7)).toBe(49.5);
    expect(achieved.every(({ re }) => re < 0)).toBe(true);
  });

  test("two equal uncoupled plants whose poles no single input direction could place", () => {
    const A = new Matrix([
      [0, 1, 0, 0],
      [0, 0, 0, 0],
      [0, 0, 0, 1],
      [0, 0, 0, 0],
    ]);
    const B = new Matrix([
      [0, 0],
      [1, 0],
      [0, 0],
      [0, 1],
    ]);
    const placed = placePoles({ A, B, poles: real(-1, -1, -1, -2), allowDefective: true });
    for (const { re, im } of placed.achieved.slice(0, 3)) expect(Math.hypot(re + 1, im)).toBeLessThan(1e-3);
    expect(placed.residual).toBeLessThanOrEqual(placed.bound);
  });

  test("states and inputs in units from 1e-6 to 1e6", () => {
    const random = seededUniform(77);
    for (const [n, m] of [
      [6, 1],
      [8, 2],
      [12, 4],
    ]) {
      const A = seededMatrix(random, n, n);
      const B = seededMatrix(random, n, m);
      const units = Array.from({ length: n }, () => 10 ** (12 * random() - 6));
      units.forEach((unit, i) => {
        A.mulRow(i, 1 / unit);
        A.mulColumn(i, unit);
        B.mulRow(i, 1 / unit);
      });
      for (let j = 0; j < m; j++) B.mulColumn(j, 10 ** (12 * random() - 6));
      const placed = placePoles({ A, B, poles: spread(n) });
      expect(placed.poleError).toBeLessThan(1e-10);
      expect(placed.poleError).toBeLessThanOrEqual(placed.poleBound);
    }
  });

  test("a mode that is hardly reached, at the price of a gain in proportion", () => {
    for (const strength of [1e-6, 1e-10, 1e-13]) {
      const { K, gainNorm } = placePoles({ ...weak(strength), poles: real(-1, -2, -3) });
      const { A, B } = weak(strength);
      expect(relativePoleError(A, B, K, real(-1, -2, -3))).toBeLessThan(1e-8);
      expect(gainNorm * strength).toBeLessThan(10);
    }
  });

  test("entries and poles near the ends of the range of numbers", () => {
    const tiny = placePoles({
      A: new Matrix([
        [1e-200, 1e-200],
        [2e-200, 1e-200],
      ]),
      B: new Matrix([[1], [0]]),
      poles: real(-1e-200, -2e-200),
    });
    expect(tiny.poleError).toBeLessThan(1e-14);
    const huge = placePoles({
      A: new Matrix([
        [1e150, 1e150],
        [2e150, 1e150],
      ]),
      B: new Matrix([
        [1, 0],
        [0, 1e-150],
      ]),
      poles: real(-1e150, -2e150),
    });
    expect(huge.poleError).toBeLessThan(1e-14);
  });

  test("60 states and 12 inputs, within a few seconds", () => {
    const random = seededUniform(60);
    const n = 60;
    const A = seededMatrix(random, n, n);
    const B = seededMatrix(random, n, 12);
    const started = processorMs();
    const placed = placePoles({ A, B, poles: spread(n) });
    expect(processorMs() - started).toBeLessThan(10_000);
    expect(placed.poleError).toBeLessThan(1e-12 * (placed.conditioning ?? 0));
  });
});

describe("what placePoles says about its result", () => {
  test("the shift per gain digit bounds what rounding the gain to four digits does to the poles", () => {
    const random = seededUniform(4);
    const A = seededMatrix(random, 6, 6);
    const B = seededMatrix(random, 6, 2);
    const poles = spread(6);
    const { K, poleShiftPerGainDigit } = placePoles({ A, B, poles });
    const rounded = Matrix.zeros(2, 6);
    for (let i = 0; i < 2; i++) for (let j = 0; j < 6; j++) rounded.set(i, j, Number(K.get(i, j).toPrecision(6)));
    const relative = Math.max(...rounded.to1DArray().map((entry, k) => Math.abs(entry / K.to1DArray()[k] - 1)));
    const moved = relativePoleError(A, B, rounded, poles);
    expect(moved).toBeGreaterThan(0);
    expect(moved).toBeLessThan(1.1 * relative * (poleShiftPerGainDigit ?? 0));
  });

  test("the condition is that of the unit eigenvectors, and the gain norm the largest singular value", () => {
    const { conditioning, gainNorm, K } = placePoles({
      A: new Matrix([
        [0, 1],
        [0, 0],
      ]),
      B: new Matrix([[0], [1]]),
      poles: real(-1, -2),
    });
    // Eigenvectors [1 -1]/√2 and [1 -2]/√5 meet at cosine 3/√10: condition √((1 + c) / (1 - c)).
    const cosine = 3 / Math.sqrt(10);
    expect(conditioning).toBeCloseTo(Math.sqrt((1 + cosine) / (1 - cosine)), 11);
    expect(gainNorm).toBeCloseTo(Math.sqrt(13), 14);
    expect(K.to2DArray()).toEqual([[2, 3]]);
  });

  test("the achieved poles come in the order asked for", () => {
    const poles = [
      { re: -3, im: -1 },
      { re: -1, im: 0 },
      { re: -3, im: 1 },
    ];
    const { achieved } = placePoles({ A: weak(1).A, B: weak(1).B, poles });
    achieved.forEach(({ re, im }, k) => {
      expect(Math.hypot(re - poles[k].re, im - poles[k].im)).toBeLessThan(1e-13);
    });
  });

  test("two runs give the same bits", () => {
    const random = seededUniform(9);
    const problem = { A: seededMatrix(random, 10, 10), B: seededMatrix(random, 10, 3), poles: spread(10) };
    expect(placePoles(problem).K.to1DArray()).toEqual(placePoles(problem).K.to1DArray());
  });
});
