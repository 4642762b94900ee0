import "server-only";
import { inTransaction } from "@/db/client";
import { listDesigns as selectDesigns } from "@/db/queries/designs";
import { findPlant } from "@/db/queries/plants";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { DesignQuery } from "@/lib/schemas/design";
import type { Context } from "../context";
import { fromCursor, toPage } from "../cursor";
import { toDesignSummary } from "./to-design";

export async function listDesigns(ctx: Context, plantId: string, { cursor, limit, archived }: DesignQuery) {
  allow(ctx, "design:read");
  const place = fromCursor(cursor, "time");
  const rows = await inTransaction(ctx, async (tx) => {
    const key = { teamId: ctx.teamId, plantId };
    if (!(await findPlant(tx, key))) throw new NotFound("Plant");
    return selectDesigns(tx, key, { archived, limit: limit + 1, place });
  });
  return toPage(rows, limit, ({ sortValue, id }) => ({ value: sortValue, id }), toDesignSummary);
}
