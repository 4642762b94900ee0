import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import type { TimeBase } from "@/control/plant/model";
import type { ModeReport } from "@/control/plant/report";
import { modes } from "@/control/structure/modes";

const CONTINUOUS: TimeBase = { kind: "continuous" };

function modesOf(A: number[][], B: number[][], C: number[][], timeBase = CONTINUOUS): ModeReport[] {
  return modes({ A: new Matrix(A), B: new Matrix(B), C: new Matrix(C) }, timeBase);
}

const oscillator = (frequency: number, damping: number) => [
  [0, 1],
  [-frequency * frequency, -2 * damping * frequency],
];

test("an oscillator shows its frequency, damping and time constant, once for the pair, shared by both states", () => {
  const [mode, ...others] = modesOf(oscillator(10, 0.05), [[0], [1]], [[1, 0]]);
  expect(others).toEqual([]);
  expect(mode.naturalFrequency).toBeCloseTo(10, 12);
  expect(mode.damping).toBeCloseTo(0.05, 12);
  expect(mode.timeConstant).toBeCloseTo(2, 12);
  expect(mode.pole.im).toBeGreaterThan(0);
  expect(mode).toMatchObject({ stable: true, marginal: false, controllable: true, observable: true });
  for (const share of mode.participation) expect(share).toBeCloseTo(0.5, 12);
});

test("the same oscillator sampled every 20 ms shows the same figures", () => {
  const h = 0.02;
  const [frequency, damping] = [10, 0.05];
  const real = Math.exp(-damping * frequency * h);
  const angle = frequency * Math.sqrt(1 - damping * damping) * h;
  const sampled = [
    [real * Math.cos(angle), real * Math.sin(angle)],
    [-real * Math.sin(angle), real * Math.cos(angle)],
  ];
  const [mode] = modesOf(sampled, [[0], [1]], [[1, 0]], { kind: "sampled", period: h });
  expect(mode.naturalFrequency).toBeCloseTo(frequency, 10);
  expect(mode.damping).toBeCloseTo(damping, 10);
  expect(mode.timeConstant).toBeCloseTo(2, 10);
  expect(mode.stable).toBe(true);
});

test("an integrator is marginal with frequency zero, without damping or time constant; an unstable mode comes first", () => {
  const all = modesOf(
    [
      [0, 0, 0],
      [0, 2, 0],
      [0, 0, -3],
    ],
    [[1], [1], [1]],
    [[1, 1, 1]],
  );
  expect(all.map(({ pole }) => pole.re)).toEqual([2, 0, -3]);
  expect(all[0]).toMatchObject({ stable: false, marginal: false, damping: -1, timeConstant: -0.5 });
  expect(all[1]).toMatchObject({ stable: false, marginal: true, naturalFrequency: 0, damping: null, timeConstant: null });
});

test("a double integrator in turned coordinates is marginal although its poles come out near 1e-8", () => {
  const [c, s] = [0.6, 0.8];
  const A = [
    [-c * s, c * c],
    [-s * s, c * s],
  ];
  for (const mode of modesOf(A, [[s], [c]], [[c, -s]])) expect(mode).toMatchObject({ marginal: true, timeConstant: null });
});

test("a slow pole of a stiff plant is not taken for one at rest", () => {
  const all = modesOf(
    [
      [-1e-6, 1],
      [0, -1e6],
    ],
    [[0], [1]],
    [[1, 0]],
  );
  expect(all[0]).toMatchObject({ stable: true, marginal: false });
  expect(all[0].timeConstant).toBeCloseTo(1e6, 4);
});

test("a sampled mode at zero has no continuous figures, and a defective one no NaN", () => {
  const [delay] = modesOf(
    [
      [0, 1],
      [0, 0],
    ],
    [[0], [1]],
    [[1, 0]],
    { kind: "sampled", period: 0.1 },
  );
  expect(delay).toMatchObject({ naturalFrequency: null, damping: null, timeConstant: null, stable: true });
  expect(delay.participation.reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 14);
});

test("modal measures tell which input reaches a mode and which output sees it", () => {
  const [left, right] = modesOf(
    [
      [-1, 0],
      [0, -2],
    ],
    [
      [5, 1],
      [0, 1],
    ],
    [
      [0, 3],
      [1, 0],
      [0, 0],
    ],
  );
  expect(left.inputShare).toEqual([1, Math.SQRT1_2]);
  expect(left.outputShare).toEqual([0, 1, 0]);
  expect(right.inputShare[0]).toBe(0);
  expect(right.outputShare).toEqual([1, 0, 0]);
});

test("a mode that no input reaches is named by its own line and the others are not touched", () => {
  const all = modesOf(
    [
      [1, 1, 0.5],
      [0, -2, 0],
      [0.3, 0, 0.7],
    ],
    [[1], [0], [0.4]],
    [[1, 0, 0]],
  );
  const hidden = all.filter(({ controllable }) => !controllable);
  expect(hidden.map(({ pole }) => pole.re)).toEqual([-2]);
  expect(hidden[0].controlDistance).toBeLessThan(1e-15);
  expect(all.every(({ observable }) => observable)).toBe(true);
});

test("60 states are answered within a second", () => {
  const n = 60;
  const A = Matrix.zeros(n, n);
  for (let i = 0; i < n; i++) {
    A.set(i, i, -0.1 * (i + 1));
    if (i + 1 < n) A.set(i, i + 1, 1 + (i % 3));
    if (i >= 2) A.set(i, i - 2, -1.5);
  }
  const plant = { A, B: Matrix.eye(n, 12), C: Matrix.eye(12, n) };
  modes(plant, CONTINUOUS);
  // Processor time, which other work on the machine does not lengthen much.
  const before = process.cpuUsage();
  expect(modes(plant, CONTINUOUS).length).toBeGreaterThanOrEqual(n / 2);
  const { user } = process.cpuUsage(before);
  expect(user / 1e6).toBeLessThan(1);
});
