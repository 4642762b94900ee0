import { z } from "zod";
import type { Criterion as Judged } from "@/control/design/criteria";
import { Finite, inUnit, SignalName } from "./common";
import { MOST_CRITERIA } from "./criteria-count";

const MOST_LIMIT = 1e9;
/** Without overshoot or coupling at all is a wish that can be met; at rest or without effort at once is not. */
const MAY_BE_ZERO: readonly Judged["kind"][] = ["overshoot", "cross-peak"];
const LIMIT_UNIT =
  "`settling` in seconds; `overshoot` in percent of the final value; `cross-peak` in percent of the disturbed quantity's own test amplitude; `effort` in percent of the input's nearest limit";

export const Criterion = z
  .strictObject({
    kind: z.enum(["settling", "overshoot", "cross-peak", "effort"]),
    signal: SignalName.nullable().meta({
      description: "Name of a commanded quantity, of an input for `effort`; null for the worst over all",
    }),
    limit: inUnit(Finite.min(0, "A limit is not below zero").max(MOST_LIMIT, "At most 1e9"), LIMIT_UNIT),
  })
  .superRefine(({ kind, limit }, ctx) => {
    if (limit === 0 && !MAY_BE_ZERO.includes(kind))
      ctx.addIssue({ code: "custom", path: ["limit"], message: "A limit above zero is needed here" });
  }) satisfies z.ZodType<Judged>;

type Line = { readonly kind?: unknown; readonly signal?: unknown } | null | undefined;
const isSame = (a: Line, b: Line) => a?.kind !== undefined && a.kind === b?.kind && a.signal === b?.signal;

/** What a plant's designs are held against, each line about something of its own. */
export const Criteria = z
  .array(Criterion)
  .max(MOST_CRITERIA, `At most ${MOST_CRITERIA} criteria`)
  .superRefine((criteria, ctx) => {
    for (const [place, criterion] of criteria.entries()) {
      const earlier = criteria.findIndex((other) => isSame(other, criterion));
      if (earlier === place || earlier < 0) continue;
      ctx.addIssue({ code: "custom", path: [place, "signal"], message: `Line ${earlier + 1} already limits this` });
    }
  });
export type Criteria = z.infer<typeof Criteria>;

export const SetCriteria = z.strictObject({ criteria: Criteria });

const VALUE_UNIT = "in the unit of the criterion's limit; null where there is nothing to judge";
export const Verdict = z.strictObject({
  criterion: Criterion,
  value: inUnit(Finite.nullable(), VALUE_UNIT),
  met: z.boolean(),
  reason: z
    .enum(["no-signal", "no-response", "never"])
    .nullable()
    .meta({ description: "Why there is no value: no signal of that name, no such response, or it never settles" }),
  sentence: z.string(),
});

/** Verdicts belong to the criteria they were judged by, which a plant may change after a design was stored. */
export const Acceptance = z.strictObject({
  judgedBy: z.enum(["plant", "request"]).meta({
    description: "`plant`: its criteria as they stand now, whenever the design was stored; `request`: those sent along",
  }),
  met: z.int(),
  of: z.int(),
  verdicts: z.array(Verdict),
});
export type Acceptance = z.infer<typeof Acceptance>;
