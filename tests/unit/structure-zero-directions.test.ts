import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import type { Complex, Rows } from "@/control/plant/model";
import { transmissionZeros } from "@/control/structure/transmission-zeros";
import type { TransmissionZero } from "@/control/structure/zero-directions";
import { seededMatrix, seededUniform } from "../helpers/seeded";

type Plant = { A: Matrix; B: Matrix; C: Matrix; D: Matrix };
const matrix = (rows: Rows) => new Matrix(rows.map((row) => [...row]));
const plant = (A: Rows, B: Rows, C: Rows): Plant => ({
  A: matrix(A),
  B: matrix(B),
  C: matrix(C),
  D: Matrix.zeros(C.length, B[0].length),
});

const size = ({ re, im }: Complex) => Math.sqrt(re * re + im * im);
const plus = (x: Complex, y: Complex, by: number) => ({ re: x.re + by * y.re, im: x.im + by * y.im });
const product = (M: Matrix, x: readonly Complex[]) =>
  M.to2DArray().map((row) => row.reduce((sum, entry, j) => plus(sum, x[j], entry), { re: 0, im: 0 }));

/** Largest entry of [A - s I, B; C, D] [x; u]. */
function left({ A, B, C, D }: Plant, zero: TransmissionZero): number {
  const x = zero.stateDirection ?? [];
  const u = zero.inputDirection ?? [];
  const moved = product(A, x).map((entry, i) => ({
    re: entry.re - (zero.re * x[i].re - zero.im * x[i].im),
    im: entry.im - (zero.re * x[i].im + zero.im * x[i].re),
  }));
  const states = moved.map((entry, i) => plus(entry, product(B, u)[i], 1));
  const outputs = product(C, x).map((entry, k) => plus(entry, product(D, u)[k], 1));
  return Math.max(...[...states, ...outputs].map(size));
}

test("the motion that a zero blocks leaves states and outputs in balance: random square plants", () => {
  const random = seededUniform(77);
  for (let round = 0; round < 20; round++) {
    const [n, m] = [3 + (round % 6), 1 + (round % 3)];
    const system = { A: seededMatrix(random, n, n), B: seededMatrix(random, n, m), C: seededMatrix(random, m, n) };
    const whole = { ...system, D: round % 2 === 0 ? Matrix.zeros(m, m) : seededMatrix(random, m, m) };
    const dual = { A: system.A.transpose(), B: system.C.transpose(), C: system.B.transpose(), D: whole.D.transpose() };
    const zeros = transmissionZeros(whole);
    expect(zeros.length).toBeGreaterThan(0);
    for (const zero of zeros) {
      const largest = Math.max(1, ...(zero.stateDirection ?? []).map(size)) * (1 + size(zero));
      expect(left(whole, zero)).toBeLessThan(1e-12 * largest);
      expect(Math.sqrt((zero.inputDirection ?? []).reduce((sum, entry) => sum + size(entry) ** 2, 0))).toBeCloseTo(1, 12);
      // The output direction is the input direction of the dual plant, up to a phase.
      const other = transmissionZeros(dual).reduce((best, one) =>
        size(plus(one, zero, -1)) < size(plus(best, zero, -1)) ? one : best,
      );
      for (let k = 0; k < m; k++) {
        expect(size((zero.outputDirection ?? [])[k])).toBeCloseTo(size((other.inputDirection ?? [])[k]), 9);
      }
    }
  }
});

test("a zero of one channel alone is blocked in that channel", () => {
  // (s - 3) / s² from u1 to y1, 1 / s from u2 to y2.
  const A = [
    [0, 1, 0],
    [0, 0, 0],
    [0, 0, 0],
  ];
  const B = [
    [0, 0],
    [1, 0],
    [0, 1],
  ];
  const C = [
    [-3, 1, 0],
    [0, 0, 1],
  ];
  const [zero] = transmissionZeros(plant(A, B, C));
  expect(zero).toMatchObject({ re: 3, im: 0 });
  expect(zero.inputDirection?.map(({ re }) => re)).toEqual([1, 0]);
  expect(zero.outputDirection?.map(({ re }) => re)).toEqual([1, 0]);
});

/** numerator / s^(n), as a chain measured by the numerator. */
function chain(numerator: readonly number[], n: number): Plant {
  const A = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => (j === i + 1 ? 1 : 0)));
  const B = Array.from({ length: n }, (_, i) => [i === n - 1 ? 1 : 0]);
  return plant(A, B, [Array.from({ length: n }, (_, j) => numerator[j] ?? 0)]);
}

test("double, triple and fourfold zeros come out to the last digit, at rest exactly zero", () => {
  const values = (numerator: readonly number[], n: number) =>
    transmissionZeros(chain(numerator, n)).map(({ re, im }) => [re, im]);
  expect(values([1, 2, 1], 3)).toEqual([
    [-1, 0],
    [-1, 0],
  ]);
  expect(values([-8, 12, -6, 1], 5)).toEqual([
    [2, 0],
    [2, 0],
    [2, 0],
  ]);
  expect(values([1, 4, 6, 4, 1], 6)).toEqual(Array.from({ length: 4 }, () => [-1, 0]));
  expect(values([0, 0, 1], 4)).toEqual([
    [0, 0],
    [0, 0],
  ]);
  // (s² + 2 s + 5)²
  const pairs = values([25, 20, 14, 4, 1], 6);
  for (const [re, im] of pairs) {
    expect(re).toBeCloseTo(-1, 13);
    expect(Math.abs(im)).toBeCloseTo(2, 13);
  }
  // (s + 1)² (s + 1.01)
  const near = values([1.01, 3.02, 3.01, 1], 5).map(([re]) => re);
  expect(near[0]).toBeCloseTo(-1.01, 9);
  expect(near[2]).toBeCloseTo(-1, 6);
});

test("more outputs than inputs: the zero that they share and its input direction; more inputs: the output direction", () => {
  // Two channels (s + 2) / s² and (s - 1) / s, heard by three mixtures.
  const A = [
    [0, 1, 0],
    [0, 0, 0],
    [0, 0, 0],
  ];
  const B = [
    [0, 0],
    [1, 0],
    [0, 1],
  ];
  const direct = plant(A, B, [
    [2, 1, 0],
    [0, 0, -1],
  ]);
  const mix = matrix([
    [1, 2],
    [3, -1],
    [1, 1],
  ]);
  const tall = {
    ...direct,
    C: mix.mmul(direct.C),
    D: mix.mmul(
      matrix([
        [0, 0],
        [0, 1],
      ]),
    ),
  };
  const zeros = transmissionZeros(tall);
  expect(zeros.map(({ re, im }) => [re, im])).toEqual([
    [-2, 0],
    [1, 0],
  ]);
  expect(zeros[0].inputDirection?.map(({ re }) => re)).toEqual([1, 0]);
  expect(zeros[0].outputDirection).toBeNull();
  for (const zero of zeros) expect(left(tall, zero)).toBeLessThan(1e-13);
  const wide = { A: tall.A.transpose(), B: tall.C.transpose(), C: tall.B.transpose(), D: tall.D.transpose() };
  const dual = transmissionZeros(wide);
  expect(dual.map(({ re }) => re)).toEqual([-2, 1]);
  expect(dual[0].inputDirection).toBeNull();
  expect(dual[0].outputDirection?.map(({ re }) => re)).toEqual([1, 0]);
});

test("a random plant with one output more than inputs has no zero", () => {
  const random = seededUniform(5);
  const A = seededMatrix(random, 6, 6);
  expect(transmissionZeros({ A, B: seededMatrix(random, 6, 2), C: seededMatrix(random, 3, 6), D: Matrix.zeros(3, 2) })).toEqual(
    [],
  );
});

test("powers of two in the units of all signals and of time change zeros by exactly the unit of time", () => {
  const random = seededUniform(19);
  for (let round = 0; round < 10; round++) {
    const [n, m] = [4 + (round % 5), 1 + (round % 2)];
    const A = seededMatrix(random, n, n);
    const B = seededMatrix(random, n, m);
    const C = seededMatrix(random, m, n);
    const unit = () => 2 ** Math.floor(17 * random() - 8);
    const [states, inputs, outputs] = [n, m, m].map((count) => Matrix.diag(Array.from({ length: count }, unit)));
    const inverse = Matrix.diag(states.diagonal().map((x) => 1 / x));
    const scaled = {
      A: inverse.mmul(A).mmul(states).mul(32),
      B: inverse.mmul(B).mmul(inputs).mul(32),
      C: outputs.mmul(C).mmul(states),
      D: Matrix.zeros(m, m),
    };
    const plain = transmissionZeros({ A, B, C, D: Matrix.zeros(m, m) }).map(({ re, im }) => [32 * re, 32 * im]);
    expect(transmissionZeros(scaled).map(({ re, im }) => [re, im])).toEqual(plain);
  }
});
