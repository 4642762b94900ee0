import "server-only";
import type { WeightsRecipe } from "@/control/design/recipe";
import type { PlantModel, Rows } from "@/control/plant/model";

/** An invented two-axis mirror head. Angles in mrad and torques in mN·m, so that the inertias below need no factor. */
const INERTIA = { tip: 2.1e-4, tilt: 1.4e-4, product: 0.9e-4 };
const STIFFNESS = { tip: 0.3, tilt: 0.6, cable: 0.25 };
const DAMPING = { tip: 1e-3, tilt: 8e-4 };
const TORQUE_LIMIT = 40;

type TwoByTwo = readonly [readonly [number, number], readonly [number, number]];

const times = (a: TwoByTwo, b: TwoByTwo): number[][] =>
  a.map((row) => [0, 1].map((j) => row[0] * b[0][j] + row[1] * b[1][j] + 0));

/** Inverse of the inertia matrix: the off-centre plate couples the two axes. */
function inverseInertia(): TwoByTwo {
  const { tip, tilt, product } = INERTIA;
  const determinant = tip * tilt - product * product;
  return [
    [tilt / determinant, -product / determinant],
    [-product / determinant, tip / determinant],
  ];
}

function stateMatrix(inverse: TwoByTwo): Rows {
  const { tip, tilt, cable } = STIFFNESS;
  const minus = (x: number) => 0 - x;
  const fromAngles = times(inverse, [
    [minus(tip + cable), cable],
    [cable, minus(tilt + cable)],
  ]);
  const fromRates = times(inverse, [
    [minus(DAMPING.tip), 0],
    [0, minus(DAMPING.tilt)],
  ]);
  return [[0, 0, 1, 0], [0, 0, 0, 1], ...fromAngles.map((row, i) => [...row, ...fromRates[i]])];
}

export function mirrorHead(): PlantModel {
  const inverse = inverseInertia();
  const angle = (name: string, axis: number) => ({ name, unit: "mrad", axis, scale: 0.2 });
  const rate = (name: string, axis: number) => ({ name, unit: "mrad/s", axis, scale: 40 });
  const torque = (name: string, axis: number) => ({
    ...{ name, unit: "mN·m", axis, scale: 12 },
    ...{ lower: -TORQUE_LIMIT, upper: TORQUE_LIMIT },
  });
  const measured: Rows = [
    [1, 0, 0, 0],
    [0, 1, 0, 0],
  ];
  const none: Rows = [
    [0, 0],
    [0, 0],
  ];
  return {
    timeBase: { kind: "continuous" },
    axes: [
      { name: "tip", tag: "P" },
      { name: "tilt", tag: "L" },
    ],
    states: [angle("tip", 0), angle("tilt", 1), rate("tip rate", 0), rate("tilt rate", 1)],
    inputs: [torque("T1", 0), torque("T2", 1)],
    outputs: [angle("tip", 0), angle("tilt", 1)],
    disturbances: [],
    commanded: [
      { name: "tip", unit: "mrad", axis: 0, amplitude: 2 },
      { name: "tilt", unit: "mrad", axis: 1, amplitude: 2 },
    ],
    A: stateMatrix(inverse),
    B: [...none, ...inverse],
    C: measured,
    D: none,
    E: [[], [], [], []],
    H: measured,
    J: none,
    operatingPoint: { states: [0, 0, 0, 0], inputs: [0, 0], outputs: [0, 0] },
  };
}

/** Bryson & Ho: the largest deviations accepted, and the effort accepted for them. */
export const MIRROR_RECIPE: WeightsRecipe = {
  version: 1,
  method: "weights",
  weights: { form: "deviations", states: [1, 0.5, null, null], inputs: [12, 8] },
  crossWeight: null,
  degreeOfStability: null,
  observer: { kind: "none" },
  reference: { kind: "feed-through" },
  test: { horizon: null, initialState: [0, 0, 0, 0], inputDisturbance: [0, 0] },
  reasons: { weights: "Tilt carries the longer lever arm, so half the deviation; effort inside the limits." },
};
