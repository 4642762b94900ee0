import type { z } from "zod";
import type { Compute } from "@/lib/schemas/design";

/** Two tanks that share a pipe, each with a pump: small enough to read, coupled enough to mean something. */
export const twoTanks: z.input<typeof Compute> = {
  plant: {
    content: {
      version: 1,
      timeBase: { kind: "continuous" },
      axes: [
        { name: "left tank", tag: "L" },
        { name: "right tank", tag: "R" },
      ],
      parameters: [{ name: "pipe", expression: "0.02", unit: "1/s", note: "exchange through the pipe" }],
      states: [
        { name: "left level", unit: "cm", axis: 0, scale: 2 },
        { name: "right level", unit: "cm", axis: 1, scale: 2 },
      ],
      inputs: [
        { name: "left pump", unit: "V", axis: 0, scale: 5, lower: 0, upper: 10 },
        { name: "right pump", unit: "V", axis: 1, scale: 5, lower: 0, upper: 10 },
      ],
      outputs: [
        { name: "left level", unit: "cm", axis: 0, scale: 2 },
        { name: "right level", unit: "cm", axis: 1, scale: 2 },
      ],
      disturbances: [],
      commanded: null,
      A: [
        ["-0.05-pipe", "pipe"],
        ["pipe", "-0.03-pipe"],
      ],
      B: [
        ["0.4", "0"],
        ["0", "0.3"],
      ],
      C: [
        ["1", "0"],
        ["0", "1"],
      ],
      D: null,
      E: null,
      H: null,
      J: null,
      operatingPoint: { states: [12, 9], inputs: [4, 3], outputs: [12, 9] },
      source: "",
    },
  },
  recipe: {
    version: 1,
    method: "weights",
    weights: { form: "deviations", states: [2, 2], inputs: [5, 5] },
    crossWeight: null,
    degreeOfStability: null,
    observer: { kind: "none" },
    reference: { kind: "feed-through" },
    test: { horizon: null, initialState: [1, 0], inputDisturbance: [0, 0] },
    reasons: { weights: "A level may stray as far as its gauge can be read from the walkway." },
  },
  criteria: [
    { kind: "settling", signal: null, limit: 60 },
    { kind: "cross-peak", signal: "left level", limit: 10 },
  ],
};
