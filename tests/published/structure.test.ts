import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { checkPlant } from "@/control/plant/check-plant";
import type { Complex, Rows } from "@/control/plant/model";
import { controllabilityReport, observabilityReport } from "@/control/structure/controllability-report";
import { gainAtRest } from "@/control/structure/gain-at-rest";
import { modes } from "@/control/structure/modes";
import { relativeGainArray } from "@/control/structure/relative-gain-array";
import { transmissionZeros } from "@/control/structure/transmission-zeros";
import { smallPlant } from "../helpers/small-plant";

function system(A: Rows, B: Rows, C: Rows) {
  const rows = (M: Rows) => new Matrix(M.map((row) => [...row]));
  return { A: rows(A), B: rows(B), C: rows(C), D: Matrix.zeros(C.length, B[0].length) };
}

function polesOf({ A, B, C }: ReturnType<typeof system>): Complex[] {
  return modes({ A, B, C }, { kind: "continuous" })
    .map(({ pole }) => pole)
    .sort((x, y) => x.re - y.re);
}

// K. H. Johansson, The quadruple-tank process, IEEE Trans. Control Systems Technology 8 (2000) 456-465: parameters on
// page 457, time constants on page 458, zeros and relative gains on page 460. The paper rounds its parameters, and its
// zeros differ by 2 to 5 % from those of the printed figures: hence 5 %.
const CONTINUOUS = { kind: "continuous" } as const;
function quadrupleTank(levels: number[], k: number[], gamma: number[]) {
  const area = [28, 32, 28, 32];
  const outlet = [0.071, 0.057, 0.071, 0.057];
  const T = levels.map((level, i) => (area[i] / outlet[i]) * Math.sqrt((2 * level) / 981));
  const A = [
    [-1 / T[0], 0, area[2] / (area[0] * T[2]), 0],
    [0, -1 / T[1], 0, area[3] / (area[1] * T[3])],
    [0, 0, -1 / T[2], 0],
    [0, 0, 0, -1 / T[3]],
  ];
  const B = [
    [(gamma[0] * k[0]) / area[0], 0],
    [0, (gamma[1] * k[1]) / area[1]],
    [0, ((1 - gamma[1]) * k[1]) / area[2]],
    [((1 - gamma[0]) * k[0]) / area[3], 0],
  ];
  const C = [
    [0.5, 0, 0, 0],
    [0, 0.5, 0, 0],
  ];
  return { T, ...system(A, B, C) };
}
const minimumPhase = quadrupleTank([12.4, 12.7, 1.8, 1.4], [3.33, 3.35], [0.7, 0.6]);

test("the quadruple tank in its minimum-phase setting has the time constants and zeros of Johansson (2000)", () => {
  // Printed as 62, 90, 23 and 30: 62.7 and 23.9 were cut off, 29.99 was rounded.
  for (const [i, printed] of [62, 90, 23, 30].entries()) expect(Math.abs(minimumPhase.T[i] - printed)).toBeLessThan(1);
  const zeros = transmissionZeros(minimumPhase);
  expect(zeros.map(({ im }) => im)).toEqual([0, 0]);
  expect(Math.abs(zeros[0].re / -0.06 - 1)).toBeLessThan(0.05);
  expect(Math.abs(zeros[1].re / -0.018 - 1)).toBeLessThan(0.05);
});

test("the quadruple tank in its minimum-phase setting has the gains at rest and the relative gain of Johansson (2000)", () => {
  const G = gainAtRest(minimumPhase.A, minimumPhase.B, minimumPhase.C, minimumPhase.D, CONTINUOUS);
  for (const [i, printed] of [2.6, 1.5, 1.4, 2.8].entries()) expect(Math.abs(G.to1DArray()[i] - printed)).toBeLessThan(0.05);
  expect(relativeGainArray(G).get(0, 0)).toBeCloseTo(1.4, 1);
});

// The nonminimum-phase setting (levels, pump gains, valve settings and results) is from memory.
test("the quadruple tank in its nonminimum-phase setting has one zero on each side, as in Johansson (2000)", () => {
  const tank = quadrupleTank([12.6, 13.0, 4.8, 4.9], [3.14, 3.29], [0.43, 0.34]);
  const zeros = transmissionZeros(tank);
  expect(Math.abs(zeros[0].re / -0.057 - 1)).toBeLessThan(0.05);
  expect(Math.abs(zeros[1].re / 0.013 - 1)).toBeLessThan(0.05);
  const gain = relativeGainArray(gainAtRest(tank.A, tank.B, tank.C, tank.D, CONTINUOUS));
  expect(gain.get(0, 0)).toBeCloseTo(-0.64, 1);
});

// H. H. Rosenbrock, State-space and Multivariable Theory, 1970: a 2×2 plant [1/(s+1), 2/(s+3); 1/(s+1), 1/(s+1)] whose
// zero at +1 shows in no element. From memory.
test("a zero at +1 that no single element shows is found (Rosenbrock 1970)", () => {
  const plant = system(
    [
      [-1, 0, 0],
      [0, -1, 0],
      [0, 0, -3],
    ],
    [
      [1, 0],
      [0, 1],
      [0, 1],
    ],
    [
      [1, 0, 2],
      [1, 1, 0],
    ],
  );
  const zeros = transmissionZeros(plant);
  expect(zeros).toHaveLength(1);
  expect(zeros[0].re).toBeCloseTo(1, 13);
});

// J. C. Doyle & G. Stein, Multivariable feedback design, IEEE Trans. Automatic Control 26 (1981) 4-16: tandem helicopter
// in vertical-plane motion. From memory; the zero was computed in higher precision.
test("the tandem helicopter has the unstable poles of Doyle & Stein (1981) and one zero on the left", () => {
  const plant = system(
    [
      [-0.02, 0.005, 2.4, -32],
      [-0.14, 0.44, -1.3, -30],
      [0, 0.018, -1.6, 1.2],
      [0, 0, 1, 0],
    ],
    [
      [0.14, -0.12],
      [0.36, -8.6],
      [0.35, 0.009],
      [0, 0],
    ],
    [
      [0, 1, 0, 0],
      [0, 0, 0, 57.3],
    ],
  );
  const [fast, slow, pair] = polesOf(plant);
  expect(fast.re).toBeCloseTo(-2.2279, 4);
  expect(slow.re).toBeCloseTo(0.0652, 4);
  expect(pair.re).toBeCloseTo(0.4913, 4);
  expect(pair.im).toBeCloseTo(0.4151, 4);
  const zeros = transmissionZeros(plant);
  expect(zeros).toHaveLength(1);
  expect(zeros[0].re).toBeCloseTo(-0.0179901, 7);
});

// Y. S. Hung & A. G. J. MacFarlane, Multivariable Feedback: a Quasi-classical Approach, 1982 (aircraft in the vertical
// plane; also J. M. Maciejowski, Multivariable Feedback Design, 1989). From memory.
test("the vertical-plane aircraft has its published poles, no finite zero, and is wholly reachable and visible", () => {
  const plant = system(
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
    [
      [1, 0, 0, 0, 0],
      [0, 1, 0, 0, 0],
      [0, 0, 1, 0, 0],
    ],
  );
  const [fast, slow, rest] = polesOf(plant);
  expect(fast.re).toBeCloseTo(-0.78, 2);
  expect(fast.im).toBeCloseTo(1.0296, 4);
  expect(slow.re).toBeCloseTo(-0.0176, 4);
  expect(slow.im).toBeCloseTo(0.1826, 4);
  expect(rest).toEqual({ re: 0, im: 0 });
  expect(transmissionZeros(plant)).toEqual([]);
  expect(controllabilityReport(plant.A, plant.B).rank).toBe(5);
  expect(observabilityReport(plant.A, plant.C).rank).toBe(5);
});

// B. Wie & D. S. Bernstein, Benchmark problems for robust control design, J. Guidance 15 (1992) 1057-1059. From memory.
test("two masses and a spring have zeros at ±i from the driven mass and none from the other (Wie & Bernstein 1992)", () => {
  const A = [
    [0, 0, 1, 0],
    [0, 0, 0, 1],
    [-1, 1, 0, 0],
    [1, -1, 0, 0],
  ];
  const B = [[0], [0], [1], [0]];
  const collocated = transmissionZeros(system(A, B, [[1, 0, 0, 0]]));
  expect(collocated.map(({ im }) => im)).toEqual([collocated[0].im, -collocated[0].im]);
  expect(collocated[0].im).toBeCloseTo(1, 14);
  expect(Math.abs(collocated[0].re)).toBeLessThan(1e-15);
  expect(transmissionZeros(system(A, B, [[0, 1, 0, 0]]))).toEqual([]);
  const checks = checkPlant(smallPlant({ A, B, C: [[0, 1, 0, 0]] }));
  expect(checks.modes.state === "computed" && checks.modes.value.every(({ marginal }) => marginal)).toBe(true);
  expect(checks.stabilizable).toEqual({ state: "computed", value: true });
});

// R. K. Wood & M. W. Berry, Terminal composition control of a binary distillation column, Chem. Eng. Sci. 28 (1973)
// 1707-1717; the relative gain 2.01 is quoted throughout the literature. From memory.
test("the distillation column of Wood & Berry (1973) has the relative gain 2.01", () => {
  const gain = relativeGainArray(
    new Matrix([
      [12.8, -18.9],
      [6.6, -19.4],
    ]),
  );
  expect(gain.get(0, 0)).toBeCloseTo(2.01, 2);
  expect(gain.get(0, 1)).toBeCloseTo(-1.01, 2);
  expect(gain.get(1, 0) + gain.get(1, 1)).toBeCloseTo(1, 14);
});

// P. Benner, A. J. Laub & V. Mehrmann, A collection of benchmark examples for the numerical solution of algebraic Riccati
// equations I, report SPC 95_22, TU Chemnitz-Zwickau 1995, example 2: stabilizable, not controllable.
test("example 2 of SPC 95_22 keeps its mode at -0.5 out of reach and can still be stabilised", () => {
  const checks = checkPlant(
    smallPlant({
      A: [
        [4, 3],
        [-4.5, -3.5],
      ],
      B: [[1], [-1]],
      C: [[1, 0]],
    }),
  );
  if (checks.modes.state !== "computed" || checks.controllability.state !== "computed") throw new Error("refused");
  const hidden = checks.modes.value.filter(({ controllable }) => !controllable);
  expect(hidden).toHaveLength(1);
  expect(hidden[0].pole.re).toBeCloseTo(-0.5, 13);
  expect(checks.controllability.value.rank).toBe(1);
  expect(checks.stabilizable).toEqual({ state: "computed", value: true });
});

// C. C. Paige, Properties of numerical algorithms related to computing controllability, IEEE Trans. Automatic Control 26
// (1981) 130-138: A = diag(1, 1/2, …, 2⁻⁹), b of ones. The pair is reachable; the powers of A hide it. From memory.
test("Paige's diagonal example (1981) is wholly reachable although the powers of A lose rank", () => {
  const A = Matrix.diag(Array.from({ length: 10 }, (_, i) => 2 ** -i));
  const report = controllabilityReport(A, Matrix.ones(10, 1));
  expect(report.rank).toBe(10);
  expect(report.singularValues[report.singularValues.length - 1]).toBeGreaterThan(1e6 * report.tolerance);
});
