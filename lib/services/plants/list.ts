import "server-only";
import { inTransaction } from "@/db/client";
import { listPlants as selectPlants } from "@/db/queries/plants";
import { allow } from "@/lib/permissions/allow";
import type { PlantQuery } from "@/lib/schemas/plant";
import type { Context } from "../context";
import { fromCursor, toPage } from "../cursor";
import { toPlantSummary } from "./to-plant";

export async function listPlants(ctx: Context, { cursor, limit, ...query }: PlantQuery) {
  allow(ctx, "plant:read");
  const place = fromCursor(cursor, query.sort.endsWith("name") ? "text" : "time");
  const rows = await inTransaction(ctx, (tx) => selectPlants(tx, ctx.teamId, { ...query, limit: limit + 1, place }));
  return toPage(rows, limit, ({ sortValue, id }) => ({ value: sortValue, id }), toPlantSummary);
}
