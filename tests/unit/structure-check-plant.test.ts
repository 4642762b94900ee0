import { expect, test } from "vitest";
import { checkPlant } from "@/control/plant/check-plant";
import type { PlantModel } from "@/control/plant/model";
import type { Part, PlantChecks } from "@/control/plant/report";
import { scalePlant } from "@/control/plant/scale-plant";
import { seededUniform } from "../helpers/seeded";
import { smallPlant } from "../helpers/small-plant";

function computed<T>(part: Part<T>): T {
  if (part.state !== "computed") throw new Error(`refused: ${part.code}`);
  return part.value;
}

const wheelOnPlatform = {
  A: [
    [0, 1, 0],
    [0, -0.1, 0.1],
    [0, 0.1, -3.3],
  ],
  B: [[0], [1], [-33]],
  C: [[1, 0, 0]],
};

test("a drift that the only motor cannot move is named, and the plant called not stabilizable", () => {
  const checks = checkPlant(smallPlant(wheelOnPlatform));
  expect(computed(checks.controllability)).toMatchObject({ rank: 2, full: 3 });
  const hidden = computed(checks.modes).filter(({ controllable }) => !controllable);
  expect(hidden).toHaveLength(1);
  expect(hidden[0]).toMatchObject({ marginal: true, naturalFrequency: 0 });
  expect(computed(checks.stabilizable)).toBe(false);
  expect(computed(checks.detectable)).toBe(true);
});

test("the dual plant swaps what is steered and what is seen", () => {
  const transposed = (rows: readonly (readonly number[])[]) => rows[0].map((_, j) => rows.map((row) => row[j]));
  const { A, B, C } = wheelOnPlatform;
  const checks = checkPlant(smallPlant({ A: transposed(A), B: transposed(C), C: transposed(B) }));
  expect(computed(checks.observability).rank).toBe(2);
  expect(computed(checks.controllability).rank).toBe(3);
  expect(computed(checks.stabilizable)).toBe(true);
  expect(computed(checks.detectable)).toBe(false);
});

test("a hidden mode that decays leaves the plant stabilizable", () => {
  const checks = checkPlant(
    smallPlant({
      A: [
        [1, 1],
        [0, -2],
      ],
      B: [[1], [0]],
      C: [[1, 0]],
    }),
  );
  expect(computed(checks.controllability).rank).toBe(1);
  expect(computed(checks.stabilizable)).toBe(true);
});

test("scaling takes declared deviations, then the way to the nearest limit, then what is assumed, and lists the last", () => {
  const plain = smallPlant({
    A: [
      [-1, 200],
      [0, -2],
    ],
    B: [[0], [4]],
    C: [
      [3, 0],
      [0, 5],
    ],
  });
  const model: PlantModel = {
    ...plain,
    states: [
      { ...plain.states[0], scale: 0.5 },
      { ...plain.states[1], scale: null },
    ],
    inputs: [{ ...plain.inputs[0], lower: -8, upper: 24 }],
    outputs: [{ ...plain.outputs[0], scale: 2 }, plain.outputs[1]],
    operatingPoint: { ...plain.operatingPoint, inputs: [4] },
  };
  const scaled = scalePlant(model);
  expect([...scaled.stateScale, ...scaled.inputScale, ...scaled.outputScale]).toEqual([0.5, 1, 12, 2, 5]);
  expect(scaled.A.to2DArray()).toEqual([
    [-1, 400],
    [0, -2],
  ]);
  expect(scaled.B.to2DArray()).toEqual([[0], [48]]);
  expect(scaled.C.to2DArray()).toEqual([
    [0.75, 0],
    [0, 1],
  ]);
  const { scaling } = checkPlant(model);
  expect(scaling).toMatchObject({
    spreadAsGiven: 200,
    assumedStates: [1],
    assumedInputs: [],
    assumedOutputs: [1],
    caution: false,
  });
});

test("entries that differ by more than half of the digits after scaling raise the scaling caution", () => {
  const wide = smallPlant({
    A: [
      [-1e-6, 1],
      [0, -1e6],
    ],
    B: [[0], [1]],
    C: [[1, 0]],
  });
  expect(checkPlant(wide).scaling).toMatchObject({ spreadAsGiven: 1e12, caution: true });
});

test("coupling between axes is the share of each block, the last for signals of no axis", () => {
  const plain = smallPlant({
    A: [
      [3, 0, 0],
      [4, 0, 0],
      [0, 0, 12],
    ],
    B: [[1], [0], [0]],
    C: [[1, 0, 0]],
  });
  const model = {
    ...plain,
    axes: [
      { name: "travel", tag: "T" },
      { name: "yaw", tag: "Y" },
    ],
    states: plain.states.map((state, i) => ({ ...state, axis: [0, 1, null][i] })),
  };
  expect(computed(checkPlant(model).coupling).blocks).toEqual([
    [3 / 13, 0, 0],
    [4 / 13, 0, 0],
    [0, 0, 12 / 13],
  ]);
});

test("the relative gain at rest needs as many commanded quantities as inputs", () => {
  const tanks = {
    A: [
      [-1, 0.5],
      [0.5, -1],
    ],
    B: [
      [1, 0],
      [0, 1],
    ],
    C: [
      [1, 0],
      [0, 1],
    ],
  };
  const gain = computed(checkPlant(smallPlant(tanks)).coupling).relativeGain;
  // The inverse gain is -A: 1 over 1 - 0.5² on the diagonal, rows sum to one.
  expect(gain?.[0][0]).toBeCloseTo(4 / 3, 14);
  expect(gain?.[0][1]).toBeCloseTo(-1 / 3, 14);
  const sampled = smallPlant(
    {
      ...tanks,
      A: [
        [0, 0.5],
        [0.5, 0],
      ],
    },
    { timeBase: { kind: "sampled", period: 1 } },
  );
  expect(computed(checkPlant(sampled).coupling).relativeGain?.[0][0]).toBeCloseTo(4 / 3, 14);
  const oneOutput = computed(checkPlant(smallPlant({ ...tanks, C: [[1, 0]] })).coupling);
  expect(oneOutput).toMatchObject({ relativeGain: null, relativeGainBasis: "not-square" });
});

test("zeros are told apart by the boundary of their own plane", () => {
  const minimumPhase = (model: PlantModel) => computed(checkPlant(model).zeros).map((zero) => zero.minimumPhase);
  const A = [
    [0, 1],
    [0, 0],
  ];
  expect(minimumPhase(smallPlant({ A, B: [[0], [1]], C: [[0.5, 1]] }))).toEqual([true]);
  expect(minimumPhase(smallPlant({ A, B: [[0], [1]], C: [[-0.5, 1]] }))).toEqual([false]);
  expect(minimumPhase(smallPlant({ A, B: [[0], [1]], C: [[0, 1]] }))).toEqual([false]);
  const sampled = { timeBase: { kind: "sampled", period: 0.1 } } as const;
  expect(minimumPhase(smallPlant({ A, B: [[0], [1]], C: [[-0.5, 1]] }, sampled))).toEqual([true]);
  expect(minimumPhase(smallPlant({ A, B: [[0], [1]], C: [[1.5, 1]] }, sampled))).toEqual([false]);
});

test("a sampled model declared continuous is questioned, and the reverse; honest ones are not", () => {
  const suspicion = (A: number[][], timeBase: PlantModel["timeBase"]) =>
    checkPlant(smallPlant({ A, B: A.map(() => [1]), C: [A.map(() => 1)] }, { timeBase })).timeBaseSuspicion;
  const continuous = { kind: "continuous" } as const;
  const sampled = { kind: "sampled", period: 0.01 } as const;
  const tanks = [
    [-0.016, 0, 0.04],
    [0, -0.011, 0.01],
    [0, 0, -0.042],
  ];
  const sampledServo = [
    [1, 0.01, 0],
    [0, 0.98, 0.02],
    [0, 0, 0.9],
  ];
  const frame = [
    [0, 1],
    [-9807, -1.8],
  ];
  expect(suspicion(sampledServo, continuous)).toEqual({ looks: "sampled" });
  expect(suspicion(sampledServo, sampled)).toBeNull();
  expect(suspicion(tanks, continuous)).toBeNull();
  expect(suspicion(frame, continuous)).toBeNull();
  expect(suspicion(frame, sampled)).toEqual({ looks: "continuous" });
});

function everyNumberIn(checks: unknown, visit: (x: number) => void): void {
  if (typeof checks === "number") visit(checks);
  else if (typeof checks === "object" && checks !== null) for (const entry of Object.values(checks)) everyNumberIn(entry, visit);
}

test("400 hostile plants (sparse, empty, huge, tiny, mixed) give finite numbers or typed refusals", () => {
  const random = seededUniform(2024);
  const kinds: (() => number)[] = [
    () => (random() < 0.5 ? 0 : random() < 0.5 ? 1 : -1),
    () => 0,
    () => (random() - 0.5) * 1e300,
    () => (random() - 0.5) * 1e-300,
    () => (random() - 0.5) * 10 ** (24 * random() - 12),
    () => (random() < 0.3 ? 0 : (random() - 0.5) * 10 ** Math.floor(600 * random() - 300)),
  ];
  for (let round = 0; round < 400; round++) {
    const entry = kinds[round % kinds.length];
    const rows = (height: number, width: number) => Array.from({ length: height }, () => Array.from({ length: width }, entry));
    const n = 1 + (round % 7);
    const model = smallPlant(
      { A: rows(n, n), B: rows(n, 1 + (round % 3)), C: rows(round % 4, n) },
      round % 5 === 0 ? { timeBase: { kind: "sampled", period: 0.01 } } : {},
    );
    const checks: PlantChecks = checkPlant(model);
    everyNumberIn(checks, (x) => expect(Number.isFinite(x), `round ${round}`).toBe(true));
    expect(checks.zeros.state === "computed" || checks.zeros.code === "no-convergence", `round ${round}`).toBe(true);
  }
});

test("a matrix that is not finite or has the wrong shape is refused as a whole, with its place", () => {
  const plain = smallPlant(wheelOnPlatform);
  expect(() => checkPlant({ ...plain, B: [[0], [Number.NaN], [1]] })).toThrow(
    expect.objectContaining({ code: "not-finite", data: { matrix: "B", row: 1, column: 0 } }),
  );
  expect(() => checkPlant({ ...plain, C: [[1, 0]] })).toThrow(expect.objectContaining({ code: "shape-mismatch" }));
});
