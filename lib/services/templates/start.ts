import "server-only";
import type { PlantProblem } from "@/control/plant/plant-problem";
import { inTransaction } from "@/db/client";
import { DomainError } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { StartFromTemplate } from "@/lib/schemas/template";
import type { Context } from "../context";
import { insertWithFirstDesignRevision } from "../designs/create";
import { solveOrRefuse } from "../designs/solve-or-refuse";
import { insertWithFirstRevision } from "../plants/create";
import { evaluateOrRefuse } from "../plants/evaluate-or-refuse";
import { fillIn } from "./fill-in";
import { readTemplate } from "./read";

/** A plant and its first design from a template: both or neither. */
export async function startFromTemplate(
  ctx: Context,
  templateId: string,
  { plantName, designName, values }: StartFromTemplate,
  signal?: AbortSignal,
) {
  allow(ctx, "template:use");
  const template = await readTemplate(ctx, templateId);
  if (template.archivedAt) throw new DomainError("conflict", "This template has been archived; ask a lead which one follows it.");
  const { content, issues } = fillIn(template.content, values);
  if (issues.length > 0) throw new DomainError("invalid", "Some values lie outside what the template allows", {}, issues);
  const toIssue = ({ pointer, message }: PlantProblem) => ({
    pointer: "/values",
    detail: `With these values, at ${pointer} of the template's plant: ${message}`,
  });
  const model = await evaluateOrRefuse(ctx, content, { toIssue, signal });
  const { recipe, criteria } = template.content;
  const evidence = await solveOrRefuse(ctx, model, recipe, { at: "/values", signal });
  const note = `From template ${template.name}`;
  return inTransaction(ctx, async (tx) => {
    const plant = { name: plantName, content, model, note, criteria };
    const { plantId, revisionId } = await insertWithFirstRevision(tx, ctx, plant);
    const revision = { plantId, plantRevisionId: revisionId, recipe, note, name: designName };
    return { plantId, designId: await insertWithFirstDesignRevision(tx, ctx, revision, evidence) };
  });
}
