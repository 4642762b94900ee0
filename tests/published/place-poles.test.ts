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

  // K. Ogata, Discrete-Time Control Systems, and G. Franklin, D. Powell & M. Workman, Digital Control of Dynamic Systems,
  // satellite attitude (both from memory; the second prints 10 and 3.5, rounded).
  test("two sampled textbook examples agree", () => {
    const ogata = placePoles({
      A: new Matrix([
        [0, 1],
        [-0.16, -1],
      ]),
      B: new Matrix([[0], [1]]),
      poles: pair(0.5, 0.5),
    });
    expectGain(ogata.K, [[0.34, -2]], 15);
    const satellite = placePoles({
      A: new Matrix([
        [1, 0.1],
        [0, 1],
      ]),
      B: new Matrix([[0.005], [0.1]]),
      poles: pair(0.8, 0.25),
    });
    expectGain(satellite.K, [[10.25, 3.4875]], 14);
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
});

describe("several inputs: the poles are unique, conditioning is what counts", () => {
  // J. Kautsky, N. K. Nichols & P. Van Dooren, Int. J. Control 41 (1985) 1129-1155, example 1: chemical reactor.
  // Their iterative methods reach a condition of about 3.3 (from memory); see also Tits & Yang 1996, table of examples.
  const reactor = {
    A: new Matrix([
      [1.38, -0.2077, 6.715, -5.676],
      [-0.5814, -4.29, 0, 0.675],
      [1.067, 4.273, -6.654, 5.893],
      [0.048, 4.273, 1.343, -2.104],
    ]),
    B: new Matrix([
      [0, 0],
      [5.679, 0],
      [1.136, -3.146],
      [1.136, 0],
    ]),
  };

  test("the chemical reactor is placed with condition 3.3", () => {
    const placed = placePoles({ ...reactor, poles: real(-0.2, -0.5, -5.0566, -8.6659) });
    expect(placed.conditioning).toBeLessThan(3.35);
    expect(placed.conditioning).toBeGreaterThan(3.28);
    expect(placed.poleError).toBeLessThan(1e-13);
  });

  test("the reactor with poles 2, 2, 3, 3, each as often as there are inputs, has the one gain that allows", () => {
    const { K, poleError, gainNorm } = placePoles({ ...reactor, poles: real(2, 2, 3, 3) });
    // Its norm, computed in extended precision.
    expect(gainNorm).toBeCloseTo(5.01334, 5);
    expect(poleError).toBeLessThan(1e-13);
    const closed = Matrix.sub(reactor.A, reactor.B.mmul(K));
    const shifted = Matrix.sub(closed, Matrix.eye(4).mul(2)).mmul(Matrix.sub(closed, Matrix.eye(4).mul(3)));
    expect(shifted.max() - shifted.min()).toBeLessThan(1e-10);
  });

  // The same paper, example 2: distillation column, from memory.
  test("the distillation column is placed with condition below 40", () => {
    const A = new Matrix([
      [-0.1094, 0.0628, 0, 0, 0],
      [1.306, -2.132, 0.9807, 0, 0],
      [0, 1.595, -3.149, 1.547, 0],
      [0, 0.0355, 2.632, -4.257, 1.855],
      [0, 0.00227, 0, 0.1636, -0.1625],
    ]);
    const B = new Matrix([
      [0, 0],
      [0.0638, 0],
      [0.0838, -0.1396],
      [0.1004, -0.206],
      [0.0063, -0.0128],
    ]);
    const placed = placePoles({ A, B, poles: [...real(-0.2, -0.5, -1), ...pair(-1, 1)] });
    expect(placed.conditioning).toBeLessThan(40);
    expect(placed.poleError).toBeLessThan(1e-12);
  });

  // R. Byers & S. G. Nash, Int. J. Control 49 (1989) 97-117, collected examples 3 and 6, typed from memory; the conditions are
  // the smallest seen in a multi-start search.
  test("two of Byers and Nash's collected examples come within a percent of the least condition known", () => {
    const third = placePoles({
      A: new Matrix([
        [-65, 65, -19.5, 19.5],
        [0.1, -0.1, 0, 0],
        [1, 0, -0.5, -1],
        [0, 0, 0.4, 0],
      ]),
      B: new Matrix([
        [65, 0],
        [0, 0],
        [0, 0],
        [0, 0.4],
      ]),
      poles: real(-1, -2, -3, -4),
    });
    expect(third.conditioning).toBeLessThan(35.6228 * 1.01);
    const sixth = placePoles({
      A: new Matrix([
        [5.8765, 9.3456, 4.5634, 9.352],
        [6.6526, 0.5867, 3.5829, 0.6534],
        [0, 9.6738, 7.4876, 4.7654],
        [0, 0, 6.6784, 2.5678],
      ]),
      B: new Matrix([
        [3.9878, 0.5432],
        [0, 2.765],
        [0, 0],
        [0, 0],
      ]),
      poles: [...real(-29.4986, -10.0922), ...pair(2.5201, 6.891)],
    });
    expect(sixth.conditioning).toBeLessThan(3.61968 * 1.01);
  });

  // Y. S. Hung & A. G. J. MacFarlane 1982, vertical-plane model of an aircraft, as in J. M. Maciejowski, Multivariable Feedback Design, 1989.
  test("the vertical-plane aircraft model with three inputs comes within a percent of the least condition known", () => {
    const A = new Matrix([
      [0, 0, 1.132, 0, -1],
      [0, -0.0538, -0.1712, 0, 0.0705],
      [0, 0, 0, 1, 0],
      [0, 0.0485, 0, -0.8556, -1.013],
      [0, -0.2909, 0, 1.0532, -0.6859],
    ]);
    const B = new Matrix([
      [0, 0, 0],
      [-0.12, 1, 0],
      [0, 0, 0],
      [4.419, 0, -1.665],
      [1.575, 0, -0.0732],
    ]);
    const placed = placePoles({ A, B, poles: [...real(-1, -2, -3), ...pair(-2, 2)] });
    expect(placed.conditioning).toBeLessThan(5.62878 * 1.01);
  });

  test("as many inputs as states reach perfect conditioning, with and without a pair", () => {
    const B = new Matrix([
      [0, 5.679, 1.136, 1.136],
      [0, 0, -3.146, 0],
      [1, 2, 3, 4],
      [5, 6, 7, 8],
    ]);
    expect(placePoles({ A: reactor.A, B, poles: real(-0.2, -0.5, -5.0566, -8.6659) }).conditioning).toBeCloseTo(1, 6);
    expect(placePoles({ A: reactor.A, B, poles: [...pair(-2, 1), ...real(-3, -2)] }).conditioning).toBeCloseTo(1, 4);
  });
});
