import { z } from "zod";
import { Id, Name, Remark, Timestamp, Version } from "./common";
import { FEWEST, MOST } from "./compared-count";

/** Design revision ids, as in `designs=` of a side-by-side address. */
export const ComparedRevisions = z
  .array(Id)
  .min(FEWEST, "Choose at least two designs")
  .max(MOST, "At most six designs stand side by side")
  .refine((ids) => new Set(ids).size === ids.length, "Each design revision can stand here once");

export const SaveComparison = z.strictObject({
  plantId: Id,
  title: Name,
  note: Remark.default(""),
  designRevisionIds: ComparedRevisions,
});
export type SaveComparison = z.infer<typeof SaveComparison>;

export const Comparison = SaveComparison.extend({
  id: Id,
  version: Version,
  note: Remark,
  createdBy: z.string().nullable(),
  createdAt: Timestamp,
});
export type Comparison = z.infer<typeof Comparison>;
