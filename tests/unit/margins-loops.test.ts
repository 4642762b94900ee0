import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import { designLqr } from "@/control/lqr/design-lqr";
import { loopRobustness } from "@/control/margins/loop-robustness";
import { type LoopCut, openLoop } from "@/control/margins/open-loop";
import { observerFromNoise } from "@/control/observer/observer-from-noise";
import { reducedObserver } from "@/control/observer/reduced-observer";
import type { System } from "@/control/plant/scale-plant";
import type { ObserverInLoop } from "@/control/response/close-loop";
import { closeLoop } from "@/control/response/close-loop";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const CONTINUOUS = { kind: "continuous" } as const;

function codeOf(action: () => unknown): string {
  try {
    action();
  } catch (error) {
    if (error instanceof NumericalError) return error.code;
    throw error;
  }
  return "no error";
}

function gainOf(plant: System): Matrix {
  const { A, B } = plant;
  return designLqr({ A, B, stateWeight: Matrix.eye(A.rows), inputWeight: Matrix.eye(B.columns), timeBase: CONTINUOUS }).K;
}

function randomPlant(seed: number, n: number, m: number, p: number, through: number): System {
  const random = seededUniform(seed);
  return {
    A: seededMatrix(random, n, n),
    B: seededMatrix(random, n, m),
    C: seededMatrix(random, p, n),
    D: seededMatrix(random, p, m).mul(through),
  };
}

function reduced(plant: System): ObserverInLoop {
  const poles = Array.from({ length: plant.A.rows - plant.C.rows }, (_, k) => ({ re: -2 - k, im: 0 }));
  return { kind: "reduced", ...reducedObserver({ ...plant, poles }) };
}

function full(plant: System): ObserverInLoop {
  const { L } = observerFromNoise({
    ...plant,
    processNoise: Matrix.eye(plant.A.rows),
    measurementNoise: Matrix.eye(plant.C.rows),
  });
  return { kind: "full", L };
}

/** Poles of the loop with each cut signal multiplied by its own factor on the way. */
function polesWith({ A, B, C, D }: System, factors: readonly number[]) {
  const F = Matrix.diag([...factors]);
  const k = factors.length;
  const inverse = new Matrix(k, k);
  const whole = Matrix.add(Matrix.eye(k), F.mmul(D));
  if (k === 1) inverse.set(0, 0, 1 / whole.get(0, 0));
  else {
    const determinant = whole.get(0, 0) * whole.get(1, 1) - whole.get(0, 1) * whole.get(1, 0);
    inverse.set(0, 0, whole.get(1, 1) / determinant);
    inverse.set(1, 1, whole.get(0, 0) / determinant);
    inverse.set(0, 1, -whole.get(0, 1) / determinant);
    inverse.set(1, 0, -whole.get(1, 0) / determinant);
  }
  return eigenvalues(Matrix.sub(A, B.mmul(inverse).mmul(F).mmul(C)));
}

const closest = (poles: readonly { re: number; im: number }[]) => Math.min(...poles.map(({ re }) => Math.abs(re)));

test.each<[string, (plant: System) => ObserverInLoop | null, LoopCut]>([
  ["the state fed back, cut at the inputs", () => null, "inputs"],
  ["a full observer, cut at the inputs", full, "inputs"],
  ["a full observer, cut at the outputs", full, "outputs"],
  ["a reduced observer, cut at the inputs", reduced, "inputs"],
  ["a reduced observer, cut at the outputs", reduced, "outputs"],
])(
  "with %s, closing what was cut gives the closed loop's poles, and every gain margin stands on the boundary",
  (_, observe, cut) => {
    let margins = 0;
    for (let seed = 1; seed <= 8; seed++) {
      const plant = randomPlant(seed, 5, 2, 2, seed % 2 === 0 ? 0.2 : 0);
      const K = gainOf(plant);
      const observer = observe(plant);
      const loop = openLoop(plant, K, observer, cut);
      const expected = eigenvalues(closeLoop({ ...plant, H: plant.C, J: plant.D }, K, null, observer).A);
      const closed = polesWith(loop, [1, 1]);
      expect(closed).toHaveLength(expected.length);
      for (const { re, im } of expected)
        expect(Math.min(...closed.map((pole) => Math.abs(pole.re - re) + Math.abs(pole.im - im)))).toBeLessThan(1e-7);
      for (const { channel, gainUp, gainDown } of loopRobustness(loop).channels) {
        for (const { value, frequency } of [gainUp, gainDown]) {
          if (value === null || frequency === null) continue;
          margins++;
          expect(closest(polesWith(loop, channel === 0 ? [value, 1] : [1, value]))).toBeLessThan(1e-8);
        }
      }
    }
    if (cut === "outputs" || observe !== reduced) expect(margins).toBeGreaterThan(cut === "outputs" ? 3 : 0);
  },
);

test("with the state fed back and cut at the sensors, every state is a channel", () => {
  const plant = randomPlant(3, 4, 2, 2, 0);
  const loop = openLoop(plant, gainOf(plant), null, "outputs");
  expect(loopRobustness(loop).channels).toHaveLength(4);
});

test("a closed loop that does not decay is refused with the pole that stays", () => {
  const loop = openLoop(
    { A: new Matrix([[1]]), B: new Matrix([[1]]), C: new Matrix([[1]]), D: new Matrix([[0]]) },
    new Matrix([[0.5]]),
    null,
    "inputs",
  );
  expect(() => loopRobustness(loop)).toThrow(
    expect.objectContaining({ code: "not-stabilising", data: { pole: { re: 0.5, im: 0 } } }),
  );
});

test("a mode that no channel touches still counts: an unstable one is refused", () => {
  const loop = {
    A: new Matrix([
      [-1, 0],
      [0, 2],
    ]),
    B: new Matrix([[1], [0]]),
    C: new Matrix([[1, 0]]),
    D: new Matrix([[0]]),
  };
  expect(codeOf(() => loopRobustness(loop))).toBe("not-stabilising");
});

test("a loop without a solution at once, wrong shapes and numbers that are none are refused by name", () => {
  const one = new Matrix([[1]]);
  const loop = (D: number): System => ({ A: new Matrix([[-1]]), B: one, C: one, D: new Matrix([[D]]) });
  expect(codeOf(() => loopRobustness(loop(-1)))).toBe("singular");
  expect(codeOf(() => loopRobustness(loop(Number.NaN)))).toBe("not-finite");
  expect(codeOf(() => loopRobustness({ ...loop(0), C: Matrix.zeros(2, 1) }))).toBe("shape-mismatch");
  expect(codeOf(() => loopRobustness(loop(0), 0))).toBe("bad-option");
  expect(codeOf(() => openLoop(loop(0), Matrix.zeros(2, 2), null, "inputs"))).toBe("shape-mismatch");
});

test("a loop with more gain than 1 at the highest frequencies bears no delay", () => {
  const { delay } = loopRobustness({
    A: new Matrix([[-1]]),
    B: new Matrix([[1]]),
    C: new Matrix([[1]]),
    D: new Matrix([[2]]),
  }).channels[0];
  expect(delay).toMatchObject({ value: 0, frequency: null, reason: null });
});

test("a delay of the margin's length turns the loop to -1 at its frequency: an integrator of gain k bears π / (2 k)", () => {
  for (const k of [0.1, 1, 30]) {
    const { delay, phase, gainUp } = loopRobustness({
      A: new Matrix([[0]]),
      B: new Matrix([[1]]),
      C: new Matrix([[k]]),
      D: new Matrix([[0]]),
    }).channels[0];
    expect(delay.value).toBeCloseTo(Math.PI / (2 * k), 12);
    expect(phase.value).toBeCloseTo(Math.PI / 2, 12);
    expect(gainUp).toMatchObject({ value: null, reason: "no-phase-crossover" });
  }
});

test("a sampled integrator k / (z - 1) bears gain up to 2 / k, at half the sampling rate", () => {
  const period = 0.01;
  const { gainUp, phase } = loopRobustness(
    { A: new Matrix([[1]]), B: new Matrix([[1]]), C: new Matrix([[0.5]]), D: new Matrix([[0]]) },
    period,
  ).channels[0];
  expect(gainUp.value).toBeCloseTo(4, 12);
  expect(gainUp.frequency).toBeCloseTo(Math.PI / period, 9);
  // |e^{iθ} - 1| = k at θ = 2 asin(k / 2), where the phase is -π/2 - θ/2
  expect(phase.value).toBeCloseTo(Math.PI / 2 - Math.asin(0.25), 12);
});

test("loops that do not touch each other bear together what the weakest bears alone; one-way ties change nothing", () => {
  const loop = (tie: number): System => ({
    A: Matrix.diag([-1, -2, -3]),
    B: Matrix.eye(3),
    C: new Matrix([
      [4, tie, 0],
      [0, 2, tie],
      [0, 0, 1],
    ]),
    D: Matrix.zeros(3, 3),
  });
  const alone = loopRobustness(loop(0));
  const least = Math.min(...alone.channels.map(({ disk }) => disk?.size ?? 2));
  expect(alone.together?.size).toBeCloseTo(least, 8);
  expect(loopRobustness(loop(7)).together?.size).toBeCloseTo(least, 6);
});
