import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { solveLinear } from "../../control/linalg/solve-linear";
import { referenceGain } from "../../control/lqr/reference-gain";
import { observerByPoles } from "../../control/observer/observer-by-poles";
import { observerFromNoise } from "../../control/observer/observer-from-noise";
import { reducedObserver } from "../../control/observer/reduced-observer";
import { placePoles } from "../../control/poles/place-poles";

describe("observers by poles", () => {
  // K. Ogata, Modern Control Engineering, full-order observer of the magnetic-levitation-like plant (from memory).
  test("Ogata's full-order example gives [29.6; 3.6]", () => {
    const poles = [
      { re: -1.8, im: 2.4 },
      { re: -1.8, im: -2.4 },
    ];
    const { L } = observerByPoles({
      A: new Matrix([
        [0, 20.6],
        [1, 0],
      ]),
      C: new Matrix([[0, 1]]),
      poles,
    });
    expect(L.get(0, 0)).toBeCloseTo(29.6, 13);
    expect(L.get(1, 0)).toBeCloseTo(3.6, 14);
  });

  // T. Bretl, AE353, days 28-29; C. P. Jobling, EGLM03, section 8.3; Franklin, Powell & Workman (from memory): satellite estimator.
  test("three course examples agree exactly", () => {
    const separation = observerByPoles({
      A: new Matrix([
        [0, 1],
        [0, 0],
      ]),
      C: new Matrix([[1, 0]]),
      poles: [
        { re: -1, im: 0 },
        { re: -2, im: 0 },
      ],
    });
    expect(separation.L.to2DArray()).toEqual([[3], [2]]);
    const canonical = observerByPoles({
      A: new Matrix([
        [-15, 1],
        [-44, 0],
      ]),
      C: new Matrix([[1, 0]]),
      poles: [
        { re: -20, im: 0 },
        { re: -20, im: 0 },
      ],
      allowDefective: true,
    });
    expect(canonical.L.to2DArray()).toEqual([[25], [356]]);
    const satellite = observerByPoles({
      A: new Matrix([
        [1, 0.1],
        [0, 1],
      ]),
      C: new Matrix([[1, 0]]),
      poles: [
        { re: 0.4, im: 0.4 },
        { re: 0.4, im: -0.4 },
      ],
    });
    expect(satellite.L.get(0, 0)).toBeCloseTo(1.2, 14);
    expect(satellite.L.get(1, 0)).toBeCloseTo(5.2, 13);
  });
});

describe("steady-state Kalman filters", () => {
  // H. Kwakernaak & R. Sivan, Linear Optimal Control Systems, 1972, position servo (from memory: 40.36, 814.3; -22.48 ± j22.24).
  test("Kwakernaak and Sivan's position servo agrees in the published digits", () => {
    const { L, covariance, achieved, residual, bound } = observerFromNoise({
      A: new Matrix([
        [0, 1],
        [0, -4.6],
      ]),
      C: new Matrix([[1, 0]]),
      processNoise: new Matrix([
        [0, 0],
        [0, 0.1],
      ]),
      measurementNoise: new Matrix([[1e-7]]),
    });
    expect(L.get(0, 0)).toBeCloseTo(40.36, 2);
    expect(L.get(1, 0)).toBeCloseTo(814.36, 2);
    expect(covariance.get(1, 1)).toBeCloseTo(0.003661, 6);
    expect(achieved[0].re).toBeCloseTo(-22.48, 2);
    expect(Math.abs(achieved[0].im)).toBeCloseTo(22.24, 2);
    expect(residual).toBeLessThanOrEqual(bound);
  });

  // J. C. Doyle & G. Stein, IEEE Trans. Autom. Control 24 (1979) 607-611 (from memory): filter gain [30; -50].
  test("Doyle and Stein's filter has gain [30; -50] in the published digits", () => {
    const noise = new Matrix([[35], [-61]]);
    const { L } = observerFromNoise({
      A: new Matrix([
        [0, 1],
        [-3, -4],
      ]),
      C: new Matrix([[2, 1]]),
      processNoise: noise.mmul(noise.transpose()),
      measurementNoise: new Matrix([[1]]),
    });
    expect(L.get(0, 0)).toBeCloseTo(30.0014, 4);
    expect(L.get(1, 0)).toBeCloseTo(-49.9611, 4);
  });

  // By hand: P² = P + 1 for a random walk with unit variances, so P is the golden ratio and the predictor gain P / (P + 1) = 1 / P.
  test("a random walk with unit variances has the golden ratio as covariance and its inverse as predictor gain", () => {
    const one = new Matrix([[1]]);
    const { L, covariance } = observerFromNoise({ A: one, C: one, processNoise: one, measurementNoise: one, sampled: true });
    expect(covariance.get(0, 0)).toBeCloseTo((1 + Math.sqrt(5)) / 2, 15);
    expect(L.get(0, 0)).toBeCloseTo((Math.sqrt(5) - 1) / 2, 15);
  });
});

describe("reduced-order observers", () => {
  // K. Ogata, Modern Control Engineering, minimum-order observer (from memory): Ke = [-2; 17], error matrix [2 1; -28 -6].
  test("Ogata's minimum-order example has the same map from output and input to estimate", () => {
    const A = new Matrix([
      [0, 1, 0],
      [0, 0, 1],
      [-6, -11, -6],
    ]);
    const B = new Matrix([[0], [0], [1]]);
    const C = new Matrix([[1, 0, 0]]);
    const poles = [
      { re: -2, im: 2 * Math.sqrt(3) },
      { re: -2, im: -2 * Math.sqrt(3) },
    ];
    const found = reducedObserver({ A, B, C, poles });
    expect(found.order).toBe(2);
    const error = new Matrix([
      [2, 1],
      [-28, -6],
    ]);
    const Ke = new Matrix([[-2], [17]]);
    // eta' = Ahat eta + Bhat y + Fhat u with xhat = [0; I] eta + [1; Ke] y
    const Fy = Matrix.add(error.mmul(Ke), new Matrix([[0], [-6]]));
    const Gw = new Matrix([
      [0, 0],
      [1, 0],
      [0, 1],
    ]);
    const Gy = new Matrix([[1], [-2], [17]]);
    for (const s of [0, 1, 7]) {
      const ours = (input: Matrix) => found.Gw.mmul(solveLinear(Matrix.sub(Matrix.eye(2).mul(s), found.Fw), input).X);
      const theirs = (input: Matrix) => Gw.mmul(solveLinear(Matrix.sub(Matrix.eye(2).mul(s), error), input).X);
      const fromOutput = Matrix.sub(Matrix.add(ours(found.Fy), found.Gy), Matrix.add(theirs(Fy), Gy));
      const fromInput = Matrix.sub(ours(found.Fu), theirs(new Matrix([[0], [1]])));
      for (const difference of [...fromOutput.to1DArray(), ...fromInput.to1DArray()])
        expect(Math.abs(difference)).toBeLessThan(1e-12);
    }
  });
});

describe("reference gain", () => {
  // K. J. Åström & R. M. Murray, Feedback Systems, predator-prey (from memory): kr = 0.002.
  test("the predator-prey example needs 0.002 from set point to input", () => {
    const A = new Matrix([
      [0.13, -0.93],
      [0.57, 0],
    ]);
    const B = new Matrix([[17.2], [0]]);
    const { K } = placePoles({
      A,
      B,
      poles: [
        { re: -0.1, im: 0 },
        { re: -0.2, im: 0 },
      ],
    });
    const { F, reached } = referenceGain({ A, B, H: new Matrix([[0, 1]]), J: new Matrix([[0]]), K });
    expect(F.get(0, 0)).toBeCloseTo(0.00203998, 8);
    expect(reached).toEqual([true]);
  });

  // Franklin, Powell & Workman (from memory): for a double integrator Nx = [1; 0], Nu = 0, so F = K Nx.
  test("a double integrator is led to rest by the position gain alone, although A is singular", () => {
    const A = new Matrix([
      [0, 1],
      [0, 0],
    ]);
    const B = new Matrix([[0], [1]]);
    const K = new Matrix([[5, 2]]);
    const { F, steadyState, reached, obstacle } = referenceGain({ A, B, H: new Matrix([[1, 0]]), J: new Matrix([[0]]), K });
    expect(F.to2DArray()).toEqual([[5]]);
    expect(steadyState.to2DArray()).toEqual([[1]]);
    expect([reached, obstacle]).toEqual([[true], null]);
  });
});
