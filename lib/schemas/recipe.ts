import { z } from "zod";
import type { Recipe as RecipeDocument } from "@/control/design/recipe";
import { Finite, Positive, Rows } from "./common";

const NotNegative = Finite.min(0, "A number of zero or more is needed here");

export const PoleEntry = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("real"), value: Finite }),
  z.strictObject({ kind: z.literal("pair"), re: Finite, im: Positive }),
  z.strictObject({ kind: z.literal("damping"), frequency: Positive, damping: Positive }),
  z.strictObject({ kind: z.literal("time-constant"), seconds: Positive }),
]);
export type PoleEntry = z.infer<typeof PoleEntry>;

const Poles = z.array(PoleEntry).max(60);

export const Weights = z.discriminatedUnion("form", [
  z.strictObject({
    form: z.literal("deviations"),
    states: z.array(Positive.nullable()).max(60),
    inputs: z.array(Positive).max(12),
  }),
  z.strictObject({ form: z.literal("matrices"), state: Rows, input: Rows }),
]);

export const ObserverRecipe = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("none") }),
  z.strictObject({ kind: z.literal("poles"), poles: Poles }),
  z.strictObject({ kind: z.literal("noise"), process: Rows, measurement: Rows }),
  z.strictObject({ kind: z.literal("reduced"), poles: Poles }),
]);

const base = {
  version: z.literal(1),
  observer: ObserverRecipe,
  reference: z.discriminatedUnion("kind", [
    z.strictObject({ kind: z.literal("feed-through") }),
    z.strictObject({ kind: z.literal("none") }),
  ]),
  test: z.strictObject({
    horizon: Positive.nullable(),
    initialState: z.array(Finite).max(60),
    inputDisturbance: z.array(Finite).max(12),
  }),
  /** Keys such as `weights`, `observer`, `state:2`: what the reason stands beside. */
  reasons: z.record(z.string().regex(/^[a-z]{1,20}(:\d{1,2})?$/), z.string().trim().max(1000, "At most 1000 characters")),
};

export const Recipe = z.discriminatedUnion("method", [
  z.strictObject({
    ...base,
    method: z.literal("weights"),
    weights: Weights,
    crossWeight: Rows.nullable(),
    degreeOfStability: NotNegative.nullable(),
  }),
  z.strictObject({ ...base, method: z.literal("poles"), poles: Poles }),
]) satisfies z.ZodType<RecipeDocument>;
export type Recipe = z.infer<typeof Recipe>;
