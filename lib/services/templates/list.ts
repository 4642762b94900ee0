import "server-only";
import { inTransaction } from "@/db/client";
import { listTemplates as selectTemplates } from "@/db/queries/templates";
import { allow } from "@/lib/permissions/allow";
import type { DesignQuery } from "@/lib/schemas/design";
import type { Context } from "../context";
import { fromCursor, toPage } from "../cursor";
import { toTemplateSummary } from "./to-template";

export async function listTemplates(ctx: Context, { cursor, limit, archived }: DesignQuery) {
  allow(ctx, "template:read");
  const query = { archived, limit: limit + 1, place: fromCursor(cursor, "text") };
  const rows = await inTransaction(ctx, (tx) => selectTemplates(tx, ctx.teamId, query));
  return toPage(rows, limit, ({ sortValue, id }) => ({ value: sortValue, id }), toTemplateSummary);
}
