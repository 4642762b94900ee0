import "server-only";
import { inTransaction } from "@/db/client";
import { listComparisons as selectComparisons } from "@/db/queries/comparisons";
import { allow } from "@/lib/permissions/allow";
import type { Context } from "../context";
import { fromCursor, toPage } from "../cursor";
import { toComparison } from "./to-comparison";

export async function listComparisons(
  ctx: Context,
  { plantId, cursor, limit }: { plantId?: string; cursor?: string; limit: number },
) {
  allow(ctx, "comparison:read");
  const place = fromCursor(cursor, "time");
  const query = { plantId: plantId ?? null, limit: limit + 1, place };
  const rows = await inTransaction(ctx, (tx) => selectComparisons(tx, ctx.teamId, query));
  return toPage(rows, limit, ({ sortValue, id }) => ({ value: sortValue, id }), toComparison);
}
