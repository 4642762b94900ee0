import { z } from "zod";
import type { Recipe as RecipeDocument } from "@/control/design/recipe";
import { Finite, inUnit, Positive, Rows } from "./common";

const PLANE = "in rad/s; of a sampled plant, in the z-plane, without a unit";
const NotNegative = Finite.min(0, "A number of zero or more is needed here");

export const PoleEntry = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("real"), value: inUnit(Finite, PLANE) }),
  z.strictObject({ kind: z.literal("pair"), re: inUnit(Finite, PLANE), im: inUnit(Positive, PLANE) }),
  z.strictObject({
    kind: z.literal("damping"),
    frequency: inUnit(Positive, "in rad/s"),
    damping: inUnit(Positive, "without a unit"),
  }),
  z.strictObject({ kind: z.literal("time-constant"), seconds: inUnit(Positive, "in seconds") }),
]);
export type PoleEntry = z.infer<typeof PoleEntry>;

/** `allowDefective` places poles that are repeated more often than inputs, or outputs, are independent. */
const wantedPoles = { poles: z.array(PoleEntry).max(60), allowDefective: z.literal(true).optional() };

export const Weights = z.discriminatedUnion("form", [
  z.strictObject({
    form: z.literal("deviations"),
    states: inUnit(z.array(Positive.nullable()).max(60), "each in the unit of its state"),
    inputs: inUnit(z.array(Positive).max(12), "each in the unit of its input"),
  }),
  z.strictObject({
    form: z.literal("matrices"),
    state: inUnit(Rows, "unit of the cost over the units of both states"),
    input: inUnit(Rows, "unit of the cost over the units of both inputs"),
  }),
]);

export const ObserverRecipe = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("none") }),
  z.strictObject({ kind: z.literal("poles"), ...wantedPoles }),
  z.strictObject({
    kind: z.literal("noise"),
    process: inUnit(Rows, "units of both states, per second; of a sampled plant per step"),
    measurement: inUnit(Rows, "units of both outputs, times seconds; of a sampled plant per sample"),
  }),
  z.strictObject({ kind: z.literal("reduced"), ...wantedPoles }),
]);

const base = {
  version: z.literal(1),
  observer: ObserverRecipe,
  reference: z.discriminatedUnion("kind", [
    z.strictObject({ kind: z.literal("feed-through") }),
    z.strictObject({ kind: z.literal("none") }),
  ]),
  test: z.strictObject({
    horizon: inUnit(Positive.nullable(), "in seconds"),
    initialState: inUnit(z.array(Finite).max(60), "each in the unit of its state"),
    inputDisturbance: inUnit(z.array(Finite).max(12), "each in the unit of its input"),
  }),
  /** Keys such as `weights`, `observer`, `state:2`: what the reason stands beside. */
  reasons: z.record(z.string().regex(/^[a-z]{1,20}(:\d{1,2})?$/), z.string().trim().max(1000, "At most 1000 characters")),
};

export const Recipe = z.discriminatedUnion("method", [
  z.strictObject({
    ...base,
    method: z.literal("weights"),
    weights: Weights,
    crossWeight: inUnit(Rows.nullable(), "unit of the cost over the units of state and input"),
    degreeOfStability: inUnit(NotNegative.nullable(), "per second"),
  }),
  z.strictObject({ ...base, method: z.literal("poles"), ...wantedPoles }),
]) satisfies z.ZodType<RecipeDocument>;
export type Recipe = z.infer<typeof Recipe>;
