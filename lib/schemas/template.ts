import { z } from "zod";
import { Finite, Id, inUnit, Name, OwnUnit, Remark, Timestamp, Unit, Version } from "./common";
import { Criteria } from "./criteria";
import { PlantContent } from "./plant";
import { Recipe } from "./recipe";

/** A parameter of the plant that whoever starts from the template fills in. */
export const OpenParameter = z
  .strictObject({
    name: z.string().trim().min(1).max(40),
    unit: Unit,
    lowest: inUnit(Finite, OwnUnit),
    highest: inUnit(Finite, OwnUnit),
    suggested: inUnit(Finite, OwnUnit),
    help: z.string().trim().max(400, "At most 400 characters"),
  })
  .refine(({ lowest, highest }) => lowest < highest, { path: ["highest"], error: "The highest value must lie above the lowest" })
  .refine(({ lowest, highest, suggested }) => lowest <= suggested && suggested <= highest, {
    path: ["suggested"],
    error: "The suggested value must lie in the allowed range",
  });
export type OpenParameter = z.infer<typeof OpenParameter>;

export const TemplateContent = z.strictObject({
  plant: PlantContent,
  recipe: Recipe,
  /** What designs of a plant started from it are held against; without it nothing. */
  criteria: Criteria.optional(),
  openParameters: z.array(OpenParameter).min(1, "A template needs at least one open parameter").max(64),
});
export type TemplateContent = z.infer<typeof TemplateContent>;

export const CreateTemplate = z.strictObject({ name: Name, description: Remark.default(""), content: TemplateContent });
export type CreateTemplate = z.infer<typeof CreateTemplate>;

export const TemplateSummary = z.strictObject({
  id: Id,
  name: Name,
  description: Remark,
  version: Version,
  openParameterCount: z.int(),
  order: z.int(),
  archivedAt: Timestamp.nullable(),
  createdAt: Timestamp,
});
export type TemplateSummary = z.infer<typeof TemplateSummary>;
export const Template = TemplateSummary.extend({ content: TemplateContent });
export type Template = z.infer<typeof Template>;

/** Makes a plant and its first design in one step. `values` by parameter name. */
export const StartFromTemplate = z.strictObject({
  plantName: Name,
  designName: Name,
  values: z.record(z.string().max(40), inUnit(Finite, "in the unit of the parameter")),
});
export type StartFromTemplate = z.infer<typeof StartFromTemplate>;
export const StartedFromTemplate = z.strictObject({ plantId: Id, designId: Id });
export const ArchiveTemplate = z.strictObject({ archived: z.boolean() });
