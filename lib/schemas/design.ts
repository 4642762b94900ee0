import { z } from "zod";
import { Id, inUnit, Name, PageQuery, Remark, Rows, Timestamp, Version } from "./common";
import { Acceptance, Criteria } from "./criteria";
import { ChecksReply, EvidenceReply, ResponseCurves, SignalRole, Summary } from "./evidence";
import { PlantContent, PlantModel } from "./plant";
import { Recipe } from "./recipe";

export const DesignMethod = z.enum(["weights", "poles"]);

export const DesignSummary = z.strictObject({
  id: Id,
  plantId: Id,
  name: Name,
  version: Version,
  method: DesignMethod,
  observer: z.enum(["none", "poles", "noise", "reduced"]),
  currentRevision: z.strictObject({ id: Id, number: Version }),
  plantRevision: z.strictObject({ id: Id, number: Version }),
  /** The plant has a newer revision than the one this design was computed on. */
  outdated: z.boolean(),
  /** Worst figures with the observer where there is one, else with the full state; null when the responses were refused. */
  summary: Summary.nullable(),
  archivedAt: Timestamp.nullable(),
  createdAt: Timestamp,
  updatedAt: Timestamp,
});
export type DesignSummary = z.infer<typeof DesignSummary>;

export const DesignRevisionEntry = z.strictObject({
  id: Id,
  designId: Id,
  number: Version,
  note: Remark,
  createdBy: z.string().nullable(),
  createdAt: Timestamp,
});
export type DesignRevisionEntry = z.infer<typeof DesignRevisionEntry>;

/** A stored revision with everything needed to show it: its recipe, its plant and its evidence. */
export const DesignRevision = DesignRevisionEntry.extend({
  designName: Name,
  plantId: Id,
  plantName: Name,
  plantRevision: z.strictObject({ id: Id, number: Version }),
  outdated: z.boolean(),
  recipe: Recipe,
  model: PlantModel,
  evidence: EvidenceReply,
  acceptance: Acceptance,
  cautions: z.array(z.string()),
});
export type DesignRevision = z.infer<typeof DesignRevision>;

/** The gains that somebody looked at before storing: where the service's own differ, nothing is stored. */
export const ShownGains = z.strictObject({
  methodVersion: z.string().max(40),
  K: inUnit(Rows, "unit of the row's input over unit of the column's state"),
});
export type ShownGains = z.infer<typeof ShownGains>;

const Storing = { plantRevisionId: Id, recipe: Recipe, note: Remark.default(""), shown: ShownGains.optional() };
export const CreateDesign = z.strictObject({ name: Name, ...Storing });
export type CreateDesign = z.infer<typeof CreateDesign>;
/** `plantRevisionId` newer than the stored one carries the recipe over to it. */
export const AddDesignRevision = z.strictObject(Storing);
export type AddDesignRevision = z.infer<typeof AddDesignRevision>;
export const RenameDesign = z.strictObject({ name: Name });
export const DuplicateDesign = z.strictObject({ name: Name });
export const ArchiveDesign = z.strictObject({ archived: z.boolean() });
export const DesignQuery = PageQuery.extend({ archived: z.enum(["no", "yes", "all"]).default("no") });
export type DesignQuery = z.infer<typeof DesignQuery>;

/** Computes without storing. The plant is a stored revision of the team, or content sent along. */
export const Compute = z.strictObject({
  plant: z.union([z.strictObject({ revisionId: Id }), z.strictObject({ content: PlantContent })]),
  recipe: Recipe,
  /** Which signals the responses hold; without it: commanded, output and input. */
  signals: z.array(SignalRole).min(1).max(5).optional(),
  /** What the design is held against; without it the criteria of the stored plant, or none. */
  criteria: Criteria.optional(),
});
export type Compute = z.infer<typeof Compute>;

export const Computation = z.strictObject({
  model: PlantModel,
  checks: ChecksReply,
  evidence: EvidenceReply,
  acceptance: Acceptance,
  responses: z.array(ResponseCurves),
  cautions: z.array(z.string()),
});
export type Computation = z.infer<typeof Computation>;

export const CheckPlant = z.strictObject({ content: PlantContent });
