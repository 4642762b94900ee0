import type { PlantContent } from "@/lib/schemas/plant";

/** Two carriages on one beam, written for tests: coupled, two axes, entries in named parameters. */
export function twoCarriages(changes: Partial<PlantContent> = {}): PlantContent {
  return {
    version: 1,
    timeBase: { kind: "continuous" },
    axes: [
      { name: "left", tag: "L" },
      { name: "right", tag: "R" },
    ],
    parameters: [
      { name: "m", expression: "12", unit: "kg", note: "" },
      { name: "k", expression: "m*wn^2", unit: "N/m", note: "from the measured frequency" },
      { name: "wn", expression: "2*pi*3", unit: "rad/s", note: "" },
    ],
    states: [
      { name: "x1", unit: "m", axis: 0, scale: 0.001 },
      { name: "x2", unit: "m", axis: 1, scale: 0.001 },
      { name: "v1", unit: "m/s", axis: 0, scale: 0.05 },
      { name: "v2", unit: "m/s", axis: 1, scale: 0.05 },
    ],
    inputs: [
      { name: "F1", unit: "N", axis: 0, scale: 40, lower: -120, upper: 120 },
      { name: "F2", unit: "N", axis: 1, scale: 40, lower: -120, upper: 120 },
    ],
    outputs: [
      { name: "enc1", unit: "m", axis: 0, scale: 0.001 },
      { name: "enc2", unit: "m", axis: 1, scale: 0.001 },
    ],
    disturbances: [],
    commanded: null,
    A: [
      ["0", "0", "1", "0"],
      ["0", "0", "0", "1"],
      ["-k/m", "k/m", "-0.4", "0"],
      ["k/m", "-k/m", "0", "-0.4"],
    ],
    B: [
      ["0", "0"],
      ["0", "0"],
      ["1/m", "0"],
      ["0", "1/m"],
    ],
    C: [
      ["1", "0", "0", "0"],
      ["0", "1", "0", "0"],
    ],
    D: null,
    E: null,
    H: null,
    J: null,
    operatingPoint: null,
    source: "",
    ...changes,
  };
}
