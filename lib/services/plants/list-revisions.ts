import "server-only";
import { inTransaction } from "@/db/client";
import { listPlantRevisions as selectRevisions } from "@/db/queries/plant-revisions";
import { findPlant } from "@/db/queries/plants";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Context } from "../context";
import { fromCursor, toPage } from "../cursor";
import { toRevisionEntry } from "./to-plant";

/** Newest first; the number of a revision is its place. */
export async function listPlantRevisions(ctx: Context, plantId: string, { cursor, limit }: { cursor?: string; limit: number }) {
  allow(ctx, "plant:read");
  const place = fromCursor(cursor, "number");
  return inTransaction(ctx, async (tx) => {
    const key = { teamId: ctx.teamId, plantId };
    if (!(await findPlant(tx, key))) throw new NotFound("Plant");
    const rows = await selectRevisions(tx, key, limit + 1, place ? Number(place.value) : null);
    return toPage(rows, limit, ({ number, id }) => ({ value: String(number), id }), toRevisionEntry);
  });
}
