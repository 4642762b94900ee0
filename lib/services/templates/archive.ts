import "server-only";
import { inTransaction } from "@/db/client";
import { archiveTemplateAt, findTemplate } from "@/db/queries/templates";
import { NotFound, StaleVersion } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Template } from "@/lib/schemas/template";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { toTemplate } from "./to-template";

/** An archived template cannot be started from; plants made from it stay as they are. The same verb brings it back. */
export async function archiveTemplate(ctx: Context, templateId: string, version: number, archived: boolean): Promise<Template> {
  allow(ctx, "template:publish");
  return inTransaction(ctx, async (tx) => {
    const key = { teamId: ctx.teamId, templateId };
    const saved = await archiveTemplateAt(tx, key, version, archived);
    const current = await findTemplate(tx, key);
    if (!current) throw new NotFound("Template");
    if (!saved) throw new StaleVersion(version, current.version);
    await recordEvent(tx, ctx, archived ? "template.archived" : "template.restored", { type: "template", id: templateId });
    return toTemplate(current);
  });
}
