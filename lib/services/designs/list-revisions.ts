import "server-only";
import { inTransaction } from "@/db/client";
import { listDesignRevisions as selectRevisions } from "@/db/queries/design-revisions";
import { findDesign } from "@/db/queries/designs";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Context } from "../context";
import { fromCursor, toPage } from "../cursor";
import { toDesignRevisionEntry } from "./to-design";

/** Newest first; the number of a revision is its place. */
export async function listDesignRevisions(ctx: Context, designId: string, { cursor, limit }: { cursor?: string; limit: number }) {
  allow(ctx, "design:read");
  const place = fromCursor(cursor, "number");
  return inTransaction(ctx, async (tx) => {
    const key = { teamId: ctx.teamId, designId };
    if (!(await findDesign(tx, key))) throw new NotFound("Design");
    const rows = await selectRevisions(tx, key, limit + 1, place ? Number(place.value) : null);
    return toPage(rows, limit, ({ number, id }) => ({ value: String(number), id }), toDesignRevisionEntry);
  });
}
