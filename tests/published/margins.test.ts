import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { designLqr } from "@/control/lqr/design-lqr";
import { frequencyResponse } from "@/control/margins/frequency-response";
import { loopRobustness } from "@/control/margins/loop-robustness";
import { openLoop } from "@/control/margins/open-loop";
import { peakGain } from "@/control/margins/peak-gain";
import type { Rows } from "@/control/plant/model";
import type { System } from "@/control/plant/scale-plant";

const DEGREE = Math.PI / 180;

function system(A: Rows, B: Rows, C: Rows, D?: Rows): System {
  const matrix = (rows: Rows) => new Matrix(rows.map((row) => [...row]));
  return { A: matrix(A), B: matrix(B), C: matrix(C), D: D ? matrix(D) : Matrix.zeros(C.length, B[0].length) };
}

/** gain / (sⁿ + a₁ sⁿ⁻¹ + ... + aₙ) */
function transfer(gain: number, coefficients: readonly number[]): System {
  const n = coefficients.length;
  const A = Array.from({ length: n }, (_, i) =>
    Array.from({ length: n }, (_, j) => (i === 0 ? -coefficients[j] : i - 1 === j ? 1 : 0)),
  );
  const B = Array.from({ length: n }, (_, i) => [i === 0 ? 1 : 0]);
  return system(A, B, [Array.from({ length: n }, (_, j) => (j === n - 1 ? gain : 0))]);
}

function regulator(A: Rows, B: Rows, stateWeight: Matrix, inputWeight: Matrix) {
  const plant = system(A, B, [A.map((_, j) => (j === 0 ? 1 : 0))]);
  const { K } = designLqr({ A: plant.A, B: plant.B, stateWeight, inputWeight, timeBase: { kind: "continuous" } });
  return { plant, K };
}

// P. Seiler, A. Packard, P. Gahinet, An introduction to disk margins, IEEE Control Systems Magazine 40 (2020) 78-95: the first
// example, L = 25/(s³ + 10 s² + 10 s + 10). From memory: disk margin 0.46, gain from 0.63 to 1.59, phase 25.8 degrees.
test("the disk margin of Seiler, Packard & Gahinet's first example is 0.46", () => {
  const { disk } = loopRobustness(transfer(25, [10, 10, 10])).channels[0];
  expect(disk?.size).toBeCloseTo(0.46, 2);
  expect(disk?.gain.low).toBeCloseTo(0.63, 2);
  expect(disk?.gain.high).toBeCloseTo(1.59, 2);
  expect((disk?.phase ?? 0) / DEGREE).toBeCloseTo(25.8, 1);
});

// The same paper and example, from memory: gain margin 3.6, phase margin 29.1 degrees. The gain margin is 90/25 by Routh.
test("the classical margins of Seiler, Packard & Gahinet's first example are 3.6 and 29.1 degrees", () => {
  const { gainUp, gainDown, phase } = loopRobustness(transfer(25, [10, 10, 10])).channels[0];
  expect(gainUp.value).toBeCloseTo(3.6, 12);
  expect(gainUp.frequency).toBeCloseTo(Math.sqrt(10), 12);
  expect(gainDown).toMatchObject({ value: null, reason: "no-phase-crossover" });
  expect((phase.value ?? 0) / DEGREE).toBeCloseTo(29.1, 1);
});

// The spinning satellite of J. C. Doyle, 1986, repeated in the paper above and in Skogestad & Postlethwaite,
// Multivariable Feedback Control, 2nd ed. 2005, section 3.7.1 (from memory): each loop alone has a phase margin of
// 90 degrees and any gain, while both together bear about 10 %.
test("the spinning satellite has perfect loops one at a time and next to no margin in both together", () => {
  const spin = system(
    [
      [0, 10],
      [-10, 0],
    ],
    [
      [1, 0],
      [0, 1],
    ],
    [
      [1, 10],
      [-10, 1],
    ],
  );
  const { channels, together, complementarySensitivity } = loopRobustness(spin);
  for (const { gainUp, gainDown, phase } of channels) {
    expect([gainUp.value, gainDown.value]).toEqual([null, null]);
    expect((phase.value ?? 0) / DEGREE).toBeCloseTo(90, 10);
  }
  expect(together?.gain.high).toBeCloseTo(1.1, 1);
  expect(together?.size).toBeCloseTo(2 / (10 + Math.sqrt(101)), 9);
  // T = [1 10; -10 1] / (s + 1)
  expect(complementarySensitivity.value).toBeCloseTo(Math.sqrt(101), 12);
});

// J. C. Doyle, Guaranteed margins for LQG regulators, IEEE Trans. Automatic Control 23 (1978) 756-757: gains
// (2 + √(4 + q)) [1 1] and its transpose; closed loops with q and σ above 1000 bear less and less gain either way (from memory).
test("Doyle's observer-based regulator has no guaranteed margin: it shrinks as weights and noise grow", () => {
  const reach = [10, 1e3, 1e5].map((q) => {
    const f = 2 + Math.sqrt(4 + q);
    const plant = system(
      [
        [1, 1],
        [0, 1],
      ],
      [[0], [1]],
      [[1, 0]],
    );
    const loop = openLoop(plant, new Matrix([[f, f]]), { kind: "full", L: new Matrix([[f], [f]]) }, "inputs");
    const { gainUp, gainDown } = loopRobustness(loop).channels[0];
    return { up: gainUp.value ?? Number.NaN, down: gainDown.value ?? Number.NaN, f };
  });
  // The last coefficient of the characteristic polynomial, 1 + (1 - gain) f², is zero at the upper limit.
  for (const { up, f } of reach) expect(up).toBeCloseTo(1 + 1 / (f * f), 10);
  expect(reach.map(({ up }) => up - 1)).toEqual([...reach.map(({ up }) => up - 1)].sort((x, y) => y - x));
  expect(1 - reach[2].down).toBeLessThan(0.02);
});

// M. G. Safonov, M. Athans, Gain and phase margin for multiloop LQG regulators, IEEE Trans. Automatic Control 22 (1977)
// 173-179 (from memory): a diagonal input weight gives each loop gains from 1/2 to infinity and 60 degrees. Plant: the
// vertical-plane aircraft of Y. S. Hung and A. G. J. MacFarlane, Multivariable Feedback, 1982 (typed from memory).
test("Safonov & Athans: every loop of the regulated aircraft bears gains from 1/2 to infinity and 60 degrees", () => {
  const { plant, K } = regulator(
    [
      [0, 0, 1.132, 0, -1],
      [0, -0.0538, -0.1712, 0, 0.0705],
      [0, 0, 0, 1, 0],
      [0, 0.0485, 0, -0.8556, -1.013],
      [0, -0.2909, 0, 1.0532, -0.6859],
    ],
    [
      [0, 0, 0],
      [-0.12, 1, 0],
      [0, 0, 0],
      [4.419, 0, -1.665],
      [1.575, 0, -0.0732],
    ],
    Matrix.eye(5),
    Matrix.diag([1, 10, 100]),
  );
  for (const { gainUp, gainDown, phase } of loopRobustness(openLoop(plant, K, null, "inputs")).channels) {
    expect(gainUp.value).toBeNull();
    expect(gainDown.value ?? 0).toBeLessThan(0.5);
    expect(phase.value ?? Math.PI).toBeGreaterThan(60 * DEGREE);
  }
});

// R. E. Kalman, When is a linear control system optimal?, J. Basic Engineering 86 (1964) 51-60 (from memory): the return
// difference of an optimal regulator is at least 1 at every frequency. Plant: K. S. Narendra, S. S. Tripathi, J. Aircraft 10
// (1973) 193-199, the helicopter in hover (typed from memory).
test("Kalman's inequality: the sensitivity of an optimal regulator with equal input weights peaks at exactly 1", () => {
  const { plant, K } = regulator(
    [
      [-0.0366, 0.0271, 0.0188, -0.4555],
      [0.0482, -1.01, 0.0024, -4.0208],
      [0.1002, 0.3681, -707 / 1000, 1.42],
      [0, 0, 1, 0],
    ],
    [
      [0.4422, 0.1761],
      [3.5446, -7.5922],
      [-5.52, 4.49],
      [0, 0],
    ],
    Matrix.eye(4),
    Matrix.eye(2).mul(0.5),
  );
  const { sensitivity } = loopRobustness(openLoop(plant, K, null, "inputs"));
  expect(sensitivity.value).toBe(1);
  expect(sensitivity.frequency).toBeNull();
});

// H. Kwakernaak, R. Sivan, Linear Optimal Control Systems, 1972, the position servo of examples 2.4 and 3.8 (from memory):
// A = [0 1; 0 -4.6], B = [0; 0.787], weight 1 on the angle and 0.00002 on the voltage give K = [223.6 18.69].
test("Kwakernaak & Sivan's position servo has the printed gain, and with it more than 60 degrees", () => {
  const { plant, K } = regulator(
    [
      [0, 1],
      [0, -4.6],
    ],
    [[0], [0.787]],
    Matrix.diag([1, 0]),
    new Matrix([[0.00002]]),
  );
  expect(K.get(0, 0)).toBeCloseTo(223.6, 1);
  expect(Math.abs(K.get(0, 1) - 18.69)).toBeLessThan(0.01);
  const { phase, gainUp } = loopRobustness(openLoop(plant, K, null, "inputs")).channels[0];
  expect((phase.value ?? 0) / DEGREE).toBeGreaterThan(60);
  expect(gainUp.value).toBeNull();
});

// K. J. Åström, R. M. Murray, Feedback Systems, 2008, example 9.2 and following (from memory): L = k/(s + 1)³ reaches -1/8 at
// ω = √3, so that k = 8 is the limit.
test("Åström & Murray's third-order loop k/(s + 1)³ has gain margin 8/k at √3 rad/s", () => {
  for (const k of [2, 3, 5]) {
    const { gainUp } = loopRobustness(transfer(k, [3, 3, 1])).channels[0];
    expect(gainUp.value).toBeCloseTo(8 / k, 12);
    expect(gainUp.frequency).toBeCloseTo(Math.sqrt(3), 12);
  }
});

// K. J. Åström, R. M. Murray, Feedback Systems, 2nd ed. 2021, chapter 10 (from memory): L = 0.38 (s² + 0.1 s + 0.55)
// / (s (s + 1)(s² + 0.06 s + 0.5)) has good classical margins, infinite and 70 degrees, but passes near -1.
test("Åström & Murray's deceptive loop has infinite gain margin and 70 degrees, and a sensitivity that gives it away", () => {
  const loop = system(
    [
      [-1.06, -0.56, -0.5, 0],
      [1, 0, 0, 0],
      [0, 1, 0, 0],
      [0, 0, 1, 0],
    ],
    [[1], [0], [0], [0]],
    [[0, 0.38, 0.038, 0.209]],
  );
  const { channels, sensitivity } = loopRobustness(loop);
  expect(channels[0].gainUp.value).toBeNull();
  expect((channels[0].phase.value ?? 0) / DEGREE).toBeCloseTo(70, -1);
  // The shortest distance to -1 is printed as 0.27.
  expect(1 / sensitivity.value).toBeCloseTo(0.27, 2);
});

// S. Skogestad, I. Postlethwaite, Multivariable Feedback Control, 2nd ed. 2005, section 2.4 (from memory): the process
// 3 (1 - 2 s)/((5 s + 1)(10 s + 1)) under proportional-integral control 1.136 (1 + 1/(12.7 s)) has gain margin 1.63,
// phase margin 19.4 degrees at 0.236 rad/s and peaks of S and T of 3.92 and 3.35; the gain is
// printed to few digits, hence 0.01.
test("Skogestad & Postlethwaite's inverse-response process has the printed margins, crossovers and peaks", () => {
  const gain = (3 * 1.136) / 12.7 / 50;
  const loop = system(
    [
      [-0.3, -0.02, 0],
      [1, 0, 0],
      [0, 1, 0],
    ],
    [[1], [0], [0]],
    [[-25.4 * gain, 10.7 * gain, gain]],
  );
  const { channels, sensitivity, complementarySensitivity } = loopRobustness(loop);
  expect(Math.abs((channels[0].gainUp.value ?? 0) - 1.63)).toBeLessThan(0.01);
  expect((channels[0].phase.value ?? 0) / DEGREE).toBeCloseTo(19.4, 1);
  expect(channels[0].phase.frequency).toBeCloseTo(0.236, 3);
  expect(Math.abs(sensitivity.value - 3.92)).toBeLessThan(0.01);
  expect(Math.abs(complementarySensitivity.value - 3.35)).toBeLessThan(0.01);
});

// The same book, example 3.3 (from memory): the distillation process G = [87.8 -86.4; 108.2 -109.6]/(75 s + 1) has singular
// values 197.2 and 1.39 at rest.
test("Skogestad & Postlethwaite's distillation process has peak gain 197.2 and least gain 1.39 at rest", () => {
  const column = system(
    [
      [-1 / 75, 0],
      [0, -1 / 75],
    ],
    [
      [87.8 / 75, -86.4 / 75],
      [108.2 / 75, -109.6 / 75],
    ],
    [
      [1, 0],
      [0, 1],
    ],
  );
  const peak = peakGain(column);
  expect(peak.value).toBeCloseTo(197.2, 1);
  expect(peak.frequency).toBe(0);
  const { re } = frequencyResponse(column, null, [0]);
  expect(Math.abs(re[0] * re[3] - re[1] * re[2]) / peak.value).toBeCloseTo(1.39, 2);
});

// N. A. Bruinsma, M. Steinbuch, A fast algorithm to compute the H∞-norm of a transfer function matrix, Systems & Control
// Letters 14 (1990) 287-293, speaks of lightly damped systems; 1/(s² + 2 ζ s + 1) peaks at 1/(2 ζ √(1 - ζ²)).
test("the peak of a second-order system with damping down to 1e-9 agrees with the closed form to 12 digits", () => {
  for (const damping of [0.5, 1e-2, 1e-6, 1e-9]) {
    const { value, upper } = peakGain(transfer(1, [2 * damping, 1]));
    const expected = 1 / (2 * damping * Math.sqrt(1 - damping * damping));
    expect(value / expected).toBeCloseTo(1, 12);
    expect(upper).toBeGreaterThanOrEqual(expected);
  }
});
