import { z } from "zod";
import { Id, Timestamp, Version } from "./common";

/** Bytes of a draft as it is sent: the largest plant with both full matrices typed at 17 digits takes two thirds of it. */
export const DRAFT_LIMIT = 524_288;
const MOST_VALUES = 60_000;
const MOST_MARKS = 16;

/** Only what JSON brings, level by level, so that no depth exhausts the stack. */
function isPlain(root: unknown): boolean {
  let level: unknown[] = [root];
  for (let seen = 0; level.length > 0; ) {
    seen += level.length;
    if (seen > MOST_VALUES) return false;
    const below: unknown[] = [];
    for (const value of level) {
      if (value === null || typeof value === "string" || typeof value === "boolean") continue;
      if (typeof value === "number" ? !Number.isFinite(value) : typeof value !== "object") return false;
      if (typeof value === "object") for (const inner of Object.values(value)) below.push(inner);
    }
    level = below;
  }
  return true;
}

/** The form of the bench as it was typed. The service keeps it and never reads it: what is typed may be half a number. */
const Form = z
  .record(z.string().max(40), z.unknown())
  .refine(isPlain, `Only finite numbers, texts, lists and the like can stand here, at most ${MOST_VALUES} of them`);

const fields = {
  /** Chosen anew by the sender for every write. */
  mark: Id,
  plantRevisionId: Id,
  /** Version and newest revision of the design when the edit began; null for a new design. */
  base: z.strictObject({ version: Version, revisionId: Id }).nullable(),
  form: Form,
};

/** `replaces`: marks of the drafts that the sender knows of. A draft with any other mark stays, and the write is refused. */
export const KeepDraft = z.strictObject({ ...fields, replaces: z.array(Id).max(MOST_MARKS).default([]) });
export type KeepDraft = z.input<typeof KeepDraft>;

export const KeptDraft = z.strictObject({ mark: Id, updatedAt: Timestamp });
export type KeptDraft = z.infer<typeof KeptDraft>;

export const Draft = z.strictObject({ ...fields, updatedAt: Timestamp });
export type Draft = z.infer<typeof Draft>;

export const FoundDraft = z.strictObject({ draft: Draft.nullable() });
export type FoundDraft = z.infer<typeof FoundDraft>;

const ID_LENGTH = 36;
/** `marks` as ids with commas between: of the draft to remove, whichever of them it has. */
export const DraftMarks = z.strictObject({
  marks: z
    .string()
    .max(MOST_MARKS * (ID_LENGTH + 1))
    .transform((text) => text.toLowerCase().split(","))
    .pipe(z.array(Id).min(1).max(MOST_MARKS)),
});
