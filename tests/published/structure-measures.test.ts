import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import type { Complex, Rows } from "@/control/plant/model";
import { controllabilityReport } from "@/control/structure/controllability-report";
import { distanceToUncontrollability } from "@/control/structure/distance-to-uncontrollability";
import { hankelValues } from "@/control/structure/hankel-values";
import { modes } from "@/control/structure/modes";
import { relativeGainArray } from "@/control/structure/relative-gain-array";
import { transmissionZeros } from "@/control/structure/transmission-zeros";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const matrix = (rows: Rows) => new Matrix(rows.map((row) => [...row]));
const system = (A: Rows, B: Rows, C: Rows, D: Rows = C.map(() => B[0].map(() => 0))) => ({
  A: matrix(A),
  B: matrix(B),
  C: matrix(C),
  D: matrix(D),
});
const diagonal = (...values: number[]) => values.map((value, i) => values.map((_, j) => (i === j ? value : 0)));
const values = (zeros: readonly Complex[]) => zeros.map(({ re, im }) => [re, im]);

/** Up to the sign that a direction is free in. */
function expectDirection(direction: readonly Complex[] | null, printed: readonly number[], digits: number): void {
  const sign = ((direction ?? [])[0]?.re ?? 0) * printed[0] < 0 ? -1 : 1;
  expect(direction).toHaveLength(printed.length);
  for (const [k, entry] of (direction ?? []).entries()) {
    expect(sign * entry.re).toBeCloseTo(printed[k], digits);
    expect(entry.im).toBe(0);
  }
}

// S. Skogestad & I. Postlethwaite, Multivariable Feedback Control, 2nd ed. 2005, chapter 4, on directions of zeros. From memory.
test("a plant with a zero at 0.5 blocks [0.71, -0.71] at the inputs and [0.89, -0.45] at the outputs (Skogestad & Postlethwaite)", () => {
  // [1, 1; 1 + 2 s, 2] / ((0.2 s + 1)(s + 1))
  const zeros = transmissionZeros(
    system(
      diagonal(-1, -1, -5, -5),
      [
        [1, 0],
        [0, 1],
        [1, 0],
        [0, 1],
      ],
      [
        [1.25, 1.25, -1.25, -1.25],
        [-1.25, 2.5, 11.25, -2.5],
      ],
    ),
  );
  expect(values(zeros)).toEqual([[0.5, 0]]);
  expectDirection(zeros[0].inputDirection, [0.71, -0.71], 2);
  expectDirection(zeros[0].outputDirection, [0.89, -0.45], 2);
});

// The same book, chapter 4: (s + 2)⁻¹ [s - 1, 4; 4.5, 2 (s - 1)]. From memory.
test("a plant with a pole at -2 has its zero at 4 with the directions [0.80, -0.60] and [0.83, -0.55]", () => {
  const zeros = transmissionZeros(system([[-2]], [[1, -4 / 3]], [[-3], [4.5]], diagonal(1, 2)));
  expect(zeros).toHaveLength(1);
  expect(zeros[0].re).toBeCloseTo(4, 14);
  expectDirection(zeros[0].inputDirection, [0.8, -0.6], 2);
  expectDirection(zeros[0].outputDirection, [0.83, -0.55], 2);
});

// The same book, chapter 4: [s - 1, s; -6, s - 2] / (1.25 (s + 1)(s + 2)). From memory.
test("two states with the poles -1 and -2 leave a two by two plant without zeros", () => {
  const C = [
    [0.8, 0.8],
    [2.4, 1.6],
  ];
  const B = [
    [-2, -1],
    [3, 2],
  ];
  expect(transmissionZeros(system(diagonal(-1, -2), B, C))).toEqual([]);
});

// The same book, chapter 4: three inputs, two outputs, poles -1, 1, -2, -2. From memory.
test("a plant with three inputs and two outputs has its zero at 1, where it has a pole too", () => {
  const B = [
    [1, 0, -2],
    [-1, 0, 0],
    [0, 0, 3],
    [0, 1, 1],
  ];
  const C = [
    [1, 0, 1, 0],
    [0, 1, 0, 1],
  ];
  const zeros = transmissionZeros(system(diagonal(-1, 1, -2, -2), B, C));
  expect(values(zeros)).toEqual([[1, 0]]);
  expect(zeros[0].inputDirection).toBeNull();
});

// J. M. Maciejowski, Multivariable Feedback Design, 1989, section 2.2: Smith-McMillan form with the zero 2 and the poles
// -1, -1, -2. From memory.
test("a plant with two inputs and three outputs has its one zero at 2 (Maciejowski 1989)", () => {
  const B = [
    [1, 0],
    [0, 1],
    [1, -1],
  ];
  const C = [
    [1, -1, -1],
    [-4, -5, 2],
    [-3, -6, 0],
  ];
  const D = [
    [0, 0],
    [1, 2],
    [1, 2],
  ];
  const zeros = transmissionZeros(system(diagonal(-1, -1, -2), B, C, D));
  expect(values(zeros)).toEqual([[2, 0]]);
});

// M. G. Safonov, A. J. Laub & G. L. Hartmann, IEEE Trans. Automatic Control 26 (1981) 47-65: longitudinal model of an
// experimental aircraft. Data from memory, the zero from higher precision.
test("the experimental aircraft of Safonov, Laub & Hartmann (1981) has one slow zero on the left", () => {
  const A = [
    [-0.022567, -36.617, -18.897, -32.09, 3.2509, -0.76257],
    [9.2572e-5, -1.8997, 0.98312, -7.2562e-4, -0.1708, -4.9652e-3],
    [0.012338, 11.72, -2.6316, 8.7582e-4, -31.604, 22.396],
    [0, 0, 1, 0, 0, 0],
    [0, 0, 0, 0, -30, 0],
    [0, 0, 0, 0, 0, -30],
  ];
  const B = [...Array.from({ length: 4 }, () => [0, 0]), [30, 0], [0, 30]];
  const C = [
    [0, 1, 0, 0, 0, 0],
    [0, 0, 0, 1, 0, 0],
  ];
  const zeros = transmissionZeros(system(A, B, C));
  expect(zeros).toHaveLength(1);
  expect(zeros[0].re).toBeCloseTo(-0.02098116755, 10);
});

// B. Kouvaritakis & A. G. J. MacFarlane, Int. J. Control 23 (1976) 149-166 and 167-181: with C B invertible there are n - m
// zeros, the eigenvalues of N A M with N B = 0, C M = 0, N M = I. From memory.
test("with C B invertible the zeros are the eigenvalues of N A M (Kouvaritakis & MacFarlane 1976)", () => {
  // B = [0; I], C = [L, I]: N = [I, 0], M = [I; -L], so that N A M = A11 - A12 L.
  const random = seededUniform(1976);
  const A = seededMatrix(random, 6, 6);
  const L = seededMatrix(random, 2, 4);
  const B = Matrix.zeros(6, 2);
  B.setSubMatrix(Matrix.eye(2), 4, 0);
  const C = Matrix.zeros(2, 6);
  C.setSubMatrix(L, 0, 0);
  C.setSubMatrix(Matrix.eye(2), 0, 4);
  const inner = Matrix.sub(A.subMatrix(0, 3, 0, 3), A.subMatrix(0, 3, 4, 5).mmul(L));
  const expected = modes({ A: inner, B: Matrix.ones(4, 1), C: Matrix.ones(1, 4) }, { kind: "continuous" }).map(
    ({ pole }) => pole,
  );
  const zeros = transmissionZeros({ A, B, C, D: Matrix.zeros(2, 2) });
  expect(zeros).toHaveLength(4);
  for (const pole of expected) {
    expect(Math.min(...zeros.map(({ re, im }) => Math.hypot(re - pole.re, im - pole.im)))).toBeLessThan(1e-13);
  }
});

// E. J. Davison & S. H. Wang, Automatica 10 (1974) 643-658: almost all systems with unlike numbers of inputs and outputs have
// no zeros, almost all square ones n, or n - m without feed-through. From memory.
test("almost every plant has the number of zeros of Davison & Wang (1974)", () => {
  const random = seededUniform(1974);
  const counts = [
    [2, 3],
    [3, 2],
    [2, 2],
  ].map(([m, p]) => {
    const parts = { A: seededMatrix(random, 7, 7), B: seededMatrix(random, 7, m), C: seededMatrix(random, p, 7) };
    const without = transmissionZeros({ ...parts, D: Matrix.zeros(p, m) }).length;
    return [without, transmissionZeros({ ...parts, D: seededMatrix(random, p, m) }).length];
  });
  expect(counts).toEqual([
    [0, 0],
    [0, 0],
    [5, 7],
  ]);
});

// B. C. Moore, IEEE Trans. Automatic Control 26 (1981) 17-32, section VI: (s + 4) / ((s + 1)(s + 3)(s + 5)(s + 10)). From memory.
test("the example of Moore (1981) has the Hankel values 0.0159, 0.00272, 0.000127 and 0.00000801", () => {
  const A = [
    [0, 0, 0, -150],
    [1, 0, 0, -245],
    [0, 1, 0, -113],
    [0, 0, 1, -19],
  ];
  const { D: _, ...plant } = system(A, [[4], [1], [0], [0]], [[0, 0, 0, 1]]);
  const found = hankelValues({ ...plant, timeBase: "continuous" }).values;
  for (const [k, printed] of [0.0159, 0.00272, 0.000127, 0.00000801].entries()) {
    expect(Math.abs(found[k] / printed - 1)).toBeLessThan(0.004);
  }
});

// K. Glover, Int. J. Control 39 (1984) 1115-1193: all Hankel values of a stable all-pass plant are equal. From memory.
test("all Hankel values of a stable all-pass plant are one (Glover 1984)", () => {
  // (1 - s)(2 - s) / ((1 + s)(2 + s)) = 1 - 6 s / (s² + 3 s + 2)
  const A = [
    [0, 1],
    [-2, -3],
  ];
  const { D: _, ...plant } = system(A, [[0], [1]], [[0, -6]]);
  for (const value of hankelValues({ ...plant, timeBase: "continuous" }).values) expect(value).toBeCloseTo(1, 14);
});

// A. J. Laub, M. T. Heath, C. C. Paige & R. C. Ward, IEEE Trans. Automatic Control 32 (1987) 115-122: for a symmetric plant,
// A = A' and B = C', both gramians are one matrix and the Hankel values its eigenvalues. From memory.
test("a symmetric plant has the eigenvalues of its gramian 1 / (i + j) as Hankel values, to the last", () => {
  // Determinant of the Cauchy matrix 1 / (i + j), i, j ≤ 5: the product of the values.
  const plant = { A: matrix(diagonal(-1, -2, -3, -4, -5)), B: Matrix.ones(5, 1), C: Matrix.ones(1, 5) };
  const found = hankelValues({ ...plant, timeBase: "continuous" }).values;
  let determinant = 1;
  for (let i = 1; i <= 5; i++) {
    for (let j = 1; j <= 5; j++) determinant *= (i < j ? (i - j) ** 2 : 1) / (i + j);
  }
  expect(found.reduce((product, value) => product * value, 1) / determinant).toBeCloseTo(1, 13);
  expect(found.reduce((sum, value) => sum + value, 0)).toBeCloseTo(1 / 2 + 1 / 4 + 1 / 6 + 1 / 8 + 1 / 10, 14);
});

// R. Eising, Systems & Control Letters 4 (1984) 263-264, for the distance; C. Kenney & A. J. Laub, IEEE Trans. Automatic Control
// 33 (1988) 535-546, for companion pairs: a chain of n integrators has sin(π / (n + 1)). From memory.
test.each([2, 3, 5, 10])("a chain of %i integrators is sin(π / (n + 1)) from being out of reach (Eising 1984)", (n) => {
  const A = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => (j === i + 1 ? 1 : 0)));
  const { lower, upper } = distanceToUncontrollability(matrix(A), matrix(A.map((_, i) => [i === n - 1 ? 1 : 0])));
  const exact = Math.sin(Math.PI / (n + 1));
  expect(upper / exact).toBeCloseTo(1, 12);
  expect(lower).toBeLessThanOrEqual(exact);
  expect(lower).toBeGreaterThan(0.98 * exact);
});

// E. G. Gilbert, J. SIAM Control 1 (1963) 128-151: equal modes side by side cannot be told apart by one input. From memory.
test("two equal modes side by side need two inputs (Gilbert 1963)", () => {
  const A = matrix(diagonal(-1, -1, -2));
  expect(controllabilityReport(A, Matrix.ones(3, 1)).rank).toBe(2);
  const two = matrix([
    [1, 0],
    [0, 1],
    [1, 1],
  ]);
  expect(controllabilityReport(A, two).rank).toBe(3);
});

// A. M. A. Hamdan & A. H. Nayfeh, J. Guidance 12 (1989) 421-428: the measure is the cosine between left vector and column. From memory.
test("an input at 60 degrees to a mode's left vector reaches it by one half (Hamdan & Nayfeh 1989)", () => {
  const plant = { A: matrix(diagonal(-1, -5)), B: matrix([[1], [Math.sqrt(3)]]), C: matrix([[3, 4]]) };
  const [slow, fast] = modes(plant, { kind: "continuous" });
  expect(slow.inputShare[0]).toBeCloseTo(1 / 2, 15);
  expect(fast.inputShare[0]).toBeCloseTo(Math.sqrt(3) / 2, 15);
  expect([slow.outputShare[0], fast.outputShare[0]]).toEqual([0.6, 0.8]);
});

// S. Skogestad, M. Morari & J. C. Doyle, IEEE Trans. Automatic Control 33 (1988) 1092-1105: high-purity distillation. From memory.
test("the high-purity distillation column has the relative gain 35.1 (Skogestad, Morari & Doyle 1988)", () => {
  const gain = relativeGainArray(
    matrix([
      [87.8, -86.4],
      [108.2, -109.6],
    ]),
  );
  expect(gain.get(0, 0)).toBeCloseTo(35.1, 1);
  expect(gain.get(0, 1)).toBeCloseTo(-34.1, 1);
});

// Skogestad & Postlethwaite, chapter 3, three by three: a catalytic cracker. From memory.
test("the catalytic cracker has the printed relative gain array (Skogestad & Postlethwaite)", () => {
  const gain = relativeGainArray(
    matrix([
      [16.8, 30.5, 4.3],
      [-16.7, 31.0, -1.41],
      [1.27, 54.1, 5.4],
    ]),
  );
  const printed = [
    [1.5, 0.99, -1.48],
    [-0.41, 0.97, 0.45],
    [-0.08, -0.95, 2.03],
  ];
  for (const [i, row] of printed.entries())
    for (const [j, x] of row.entries()) expect(Math.abs(gain.get(i, j) - x)).toBeLessThan(0.006);
});
