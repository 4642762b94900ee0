import "server-only";
import { inTransaction } from "@/db/client";
import { findTemplate, insertTemplate } from "@/db/queries/templates";
import { DomainError, NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { CreateTemplate, Template } from "@/lib/schemas/template";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { solveOrRefuse } from "../designs/solve-or-refuse";
import { evaluateOrRefuse, issueBelow } from "../plants/evaluate-or-refuse";
import { fillIn, openParameterIssues } from "./fill-in";
import { toTemplate } from "./to-template";

/** A template is published only once its own suggested values give a design: a junior must never meet one that cannot work. */
export async function publishTemplate(
  ctx: Context,
  { name, description, content }: CreateTemplate,
  signal?: AbortSignal,
): Promise<Template> {
  allow(ctx, "template:publish");
  const issues = openParameterIssues(content);
  if (issues.length > 0) throw new DomainError("invalid", "The open parameters do not fit the plant", {}, issues);
  const suggested = fillIn(content, {}).content;
  const model = await evaluateOrRefuse(ctx, suggested, { toIssue: issueBelow("/content/plant"), signal });
  await solveOrRefuse(ctx, model, content.recipe, { at: "/content/recipe", signal });
  const { teamId, userId: createdBy } = ctx;
  return inTransaction(ctx, async (tx) => {
    const { id } = await insertTemplate(tx, { teamId, name, description, content, createdBy });
    await recordEvent(tx, ctx, "template.published", { type: "template", id });
    const made = await findTemplate(tx, { teamId, templateId: id });
    if (!made) throw new NotFound("Template");
    return toTemplate(made);
  });
}
