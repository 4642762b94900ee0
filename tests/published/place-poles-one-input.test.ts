import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import type { Complex } from "../../control/plant/model";
import { placePoles } from "../../control/poles/place-poles";

const real = (...values: number[]): Complex[] => values.map((re) => ({ re, im: 0 }));
const pair = (re: number, im: number): Complex[] => [
  { re, im },
  { re, im: -im },
];

function expectGain(K: Matrix, published: number[][], digits: number): void {
  published.forEach((row, i) => {
    row.forEach((entry, j) => {
      expect(Math.abs(K.get(i, j) - entry)).toBeLessThanOrEqual(Math.abs(entry) * 10 ** -digits);
    });
  });
}

describe("one input: the gain is unique", () => {
  // J. Ackermann 1972, formula as taught; plant from student notes of Advanced and Multivariable Control, Politecnico di Milano, ch. 13.
  test("a two-state example of Ackermann's formula gives [2 3]", () => {
    const { K } = placePoles({
      A: new Matrix([
        [-1, 3],
        [0, 2],
      ]),
      B: new Matrix([[1], [2]]),
      poles: real(-3, -4),
    });
    expect(K.to2DArray()).toEqual([[2, 3]]);
  });

  // K. Ogata, Modern Control Engineering, example of pole placement with poles -2 ± j4, -10 (from memory).
  test("Ogata's third-order example gives [199 55 8]", () => {
    const A = new Matrix([
      [0, 1, 0],
      [0, 0, 1],
      [-1, -5, -6],
    ]);
    const { K } = placePoles({ A, B: new Matrix([[0], [0], [1]]), poles: [...pair(-2, 4), ...real(-10)] });
    expect(K.to2DArray()).toEqual([[199, 55, 8]]);
  });

  // K. Ogata, Modern Control Engineering, 4th ed., inverted pendulum on a cart (from memory); the double pole needs the defective loop.
  test("Ogata's pendulum on a cart agrees in all six published digits", () => {
    const A = new Matrix([
      [0, 1, 0, 0],
      [20.601, 0, 0, 0],
      [0, 0, 0, 1],
      [-0.4905, 0, 0, 0],
    ]);
    const B = new Matrix([[0], [-1], [0], [0.5]]);
    const poles = [...pair(-2, 2 * Math.sqrt(3)), ...real(-10, -10)];
    const { K, conditioning } = placePoles({ A, B, poles, allowDefective: true });
    expectGain(K, [[-298.15, -60.697, -163.099, -73.394]], 4.7);
    expect(conditioning).toBeNull();
  });

  // C. P. Jobling, EGLM03 Modern Control Systems, open textbook (Swansea University), section 8.2, examples 1 and 2.
  test("the Swansea textbook's diagonal and controller-form examples agree in all printed digits", () => {
    const diagonal = placePoles({
      A: new Matrix([
        [-4, 0],
        [0, -11],
      ]),
      B: new Matrix([[1], [-1]]),
      poles: pair(-10, 10),
    });
    expectGain(diagonal.K, [[19.429, 14.429]], 4.4);
    const controller = placePoles({
      A: new Matrix([
        [-15, -44],
        [1, 0],
      ]),
      B: new Matrix([[1], [0]]),
      poles: pair(-10, 10),
    });
    expect(controller.K.to2DArray()).toEqual([[5, 156]]);
  });

  // T. Bretl, AE353 Aerospace Control Systems, University of Illinois, course notebooks spring 2021, day 19.
  test("the wheel-platform example agrees in 15 digits, and its lost mode at zero is refused", () => {
    const B = new Matrix([[0], [1], [-33]]);
    const inverted = new Matrix([
      [0, 1, 0],
      [2.4525, 0, 0],
      [-2.4525, 0, 0],
    ]);
    const { K } = placePoles({ A: inverted, B, poles: real(-1, -2, -3) });
    expectGain(K, [[13.4525, 8.522935779816546, 0.07645259938837953]], 14);
    const flat = new Matrix([
      [0, 1, 0],
      [0, -0.1, 0.1],
      [0, 0.1, -3.3],
    ]);
    expect(() => placePoles({ A: flat, B, poles: real(-1, -2, -3) })).toThrowError(
      expect.objectContaining({ code: "not-controllable", data: expect.objectContaining({ distance: expect.closeTo(0, 12) }) }),
    );
  });

  // K. J. Åström & R. M. Murray, Feedback Systems, predator-prey example of state feedback (from memory).
  test("the predator-prey example agrees in the published digits", () => {
    const { K } = placePoles({
      A: new Matrix([
        [0.13, -0.93],
        [0.57, 0],
      ]),
      B: new Matrix([[17.2], [0]]),
      poles: real(-0.1, -0.2),
    });
    expect(K.get(0, 0)).toBeCloseTo(0.025, 12);
    expect(K.get(0, 1)).toBeCloseTo(-0.052, 3);
  });

  // K. Ogata, Discrete-Time Control Systems (from memory).
  test("Ogata's sampled second-order example gives [0.34 -2]", () => {
    const { K } = placePoles({
      A: new Matrix([
        [0, 1],
        [-0.16, -1],
      ]),
      B: new Matrix([[0], [1]]),
      poles: pair(0.5, 0.5),
    });
    expectGain(K, [[0.34, -2]], 15);
  });

  // G. Franklin, D. Powell & M. Workman, Digital Control of Dynamic Systems, satellite attitude (from memory; they print 10 and
  // 3.5, rounded).
  test("the sampled satellite of Franklin, Powell and Workman gets [10.25 3.4875]", () => {
    const { K } = placePoles({
      A: new Matrix([
        [1, 0.1],
        [0, 1],
      ]),
      B: new Matrix([[0.005], [0.1]]),
      poles: pair(0.8, 0.25),
    });
    expectGain(K, [[10.25, 3.4875]], 14);
  });

  // K. J. Åström & B. Wittenmark, Computer-Controlled Systems: deadbeat control of the double integrator is [1/h² 3/(2h)].
  test("deadbeat control of a double integrator sampled at 1/8 s is [64 12], exactly", () => {
    const h = 1 / 8;
    const problem = {
      A: new Matrix([
        [1, h],
        [0, 1],
      ]),
      B: new Matrix([[(h * h) / 2], [h]]),
      poles: real(0, 0),
      allowDefective: true,
    };
    expect(placePoles(problem).K.to2DArray()).toEqual([[64, 12]]);
  });

  test("a chain of n integrators with poles -1 to -n gets the Stirling numbers of n + 1, exactly", () => {
    // Coefficients of (s + 1)(s + 2)...(s + 8); unsigned Stirling numbers of the first kind, c(9, k).
    const n = 8;
    const A = Matrix.zeros(n, n);
    for (let i = 0; i + 1 < n; i++) A.set(i, i + 1, 1);
    const B = Matrix.zeros(n, 1);
    B.set(n - 1, 0, 1);
    const { K } = placePoles({ A, B, poles: real(-1, -2, -3, -4, -5, -6, -7, -8) });
    expect(K.to2DArray()).toEqual([[40320, 109584, 118124, 67284, 22449, 4536, 546, 36]]);
  });
  // N. S. Nise, Control Systems Engineering, example 12.1: 20 (s + 5) / (s (s + 1) (s + 4)) in phase variables (from memory).
  test("Nise's third-order example gives [413.1 132.08 10.9]", () => {
    const A = new Matrix([
      [0, 1, 0],
      [0, 0, 1],
      [0, -4, -5],
    ]);
    const { K } = placePoles({ A, B: new Matrix([[0], [0], [1]]), poles: [...pair(-5.4, 7.2), ...real(-5.1)] });
    expectGain(K, [[413.1, 132.08, 10.9]], 14);
  });

  // R. C. Dorf & R. H. Bishop, Modern Control Systems, third-order example with damping 0.8 and 6 rad/s (from memory).
  test("Dorf and Bishop's third-order example gives [170.8 79.1 9.4] in the printed digits", () => {
    const A = new Matrix([
      [0, 1, 0],
      [0, 0, 1],
      [-2, -3, -5],
    ]);
    const poles = [...pair(-4.8, 3.6), ...real(-4.8)];
    const { K } = placePoles({ A, B: new Matrix([[0], [0], [1]]), poles });
    expectGain(K, [[170.8, 79.1, 9.4]], 3.5);
  });

  // C.-T. Chen, Linear System Theory and Design, 3rd ed., inverted pendulum of chapter 8 (from memory).
  test("Chen's inverted pendulum gives [-5/3 -11/3 -103/12 -13/3]", () => {
    const A = new Matrix([
      [0, 1, 0, 0],
      [0, 0, -1, 0],
      [0, 0, 0, 1],
      [0, 0, 5, 0],
    ]);
    const { K } = placePoles({ A, B: new Matrix([[0], [1], [0], [-2]]), poles: [...pair(-1.5, 0.5), ...pair(-1, 1)] });
    expectGain(K, [[-5 / 3, -11 / 3, -103 / 12, -13 / 3]], 15);
  });

  // G. F. Franklin, J. D. Powell & A. Emami-Naeini, Feedback Control of Dynamic Systems, undamped pendulum (from memory).
  test("the undamped pendulum with both poles at twice its frequency gets [3 w² 4 w], exactly", () => {
    const w = 1.5;
    const A = new Matrix([
      [0, 1],
      [-w * w, 0],
    ]);
    const { K } = placePoles({ A, B: new Matrix([[0], [1]]), poles: real(-2 * w, -2 * w), allowDefective: true });
    expect(K.to2DArray()).toEqual([[3 * w * w, 4 * w]]);
  });

  // V. Mehrmann & H. Xu, Electron. Trans. Numer. Anal. 4 (1996) 89-105: diag(1 ... n) to -1 ... -n, their example of a problem
  // that is hard however it is solved; the gains are integers.
  test.each([5, 10, 14])("Mehrmann and Xu's diagonal problem of order %i gets its integer gain, exactly", (n) => {
    const A = Matrix.zeros(n, n);
    for (let i = 0; i < n; i++) A.set(i, i, i + 1);
    const { K, poleError } = placePoles({ A, B: Matrix.ones(n, 1), poles: real(...Array.from({ length: n }, (_, i) => -1 - i)) });
    const range = (from: number, to: number) => {
      let product = 1;
      for (let k = from; k <= to; k++) product *= k;
      return product;
    };
    const gain = Array.from({ length: n }, (_, k) => {
      const i = k + 1;
      const sign = (n - i) % 2 === 0 ? 1 : -1;
      return (sign * (range(i + 1, i + n) / range(1, i - 1))) / range(1, n - i);
    });
    expect(K.to2DArray()).toEqual([gain]);
    expect(poleError).toBeLessThan(1e-17);
  });
});
