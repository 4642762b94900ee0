import "server-only";
import { inTransaction } from "@/db/client";
import { findTemplate } from "@/db/queries/templates";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Template } from "@/lib/schemas/template";
import type { Context } from "../context";
import { toTemplate } from "./to-template";

export async function readTemplate(ctx: Context, templateId: string): Promise<Template> {
  allow(ctx, "template:read");
  const found = await inTransaction(ctx, (tx) => findTemplate(tx, { teamId: ctx.teamId, templateId }));
  if (!found) throw new NotFound("Template");
  return toTemplate(found);
}
