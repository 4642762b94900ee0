import type { PlantModel } from "@/control/plant/model";

/** Two carriages on one beam as an evaluated plant: coupled, two axes, limits about an operating point that is not zero. */
export function coupledModel(changes: Partial<PlantModel> = {}): PlantModel {
  const signal = (name: string, unit: string, axis: number, scale: number) => ({ name, unit, axis, scale });
  const states = [
    signal("x1", "m", 0, 0.001),
    signal("x2", "m", 1, 0.002),
    signal("v1", "m/s", 0, 0.05),
    signal("v2", "m/s", 1, 0.05),
  ];
  const inputs = [signal("F1", "N", 0, 40), signal("F2", "N", 1, 40)].map((input) => ({ ...input, lower: -120, upper: 120 }));
  const outputs = [signal("enc1", "m", 0, 0.001), signal("enc2", "m", 1, 0.001)];
  return {
    timeBase: { kind: "continuous" },
    axes: [
      { name: "left", tag: "L" },
      { name: "right", tag: "R" },
    ],
    states,
    inputs,
    outputs,
    disturbances: [],
    commanded: [
      { name: "x1", unit: "m", axis: 0, amplitude: 0.001 },
      { name: "x2", unit: "m", axis: 1, amplitude: 0.002 },
    ],
    A: [
      [0, 0, 1, 0],
      [0, 0, 0, 1],
      [-355, 355, -0.4, 0],
      [355, -355, 0, -0.4],
    ],
    B: [
      [0, 0],
      [0, 0],
      [1 / 12, 0],
      [0, 1 / 12],
    ],
    C: [
      [1, 0, 0, 0],
      [0, 1, 0, 0],
    ],
    D: [
      [0, 0],
      [0, 0],
    ],
    E: [[], [], [], []],
    H: [
      [1, 0, 0, 0],
      [0, 1, 0, 0],
    ],
    J: [
      [0, 0],
      [0, 0],
    ],
    operatingPoint: { states: [0, 0, 0, 0], inputs: [20, 0], outputs: [0, 0] },
    ...changes,
  };
}
