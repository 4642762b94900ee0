import "server-only";
import { inTransaction } from "@/db/client";
import { findDesignRevision } from "@/db/queries/design-revisions";
import { findResponseRecords } from "@/db/queries/evidence";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { ResponseQuery } from "@/lib/schemas/evidence";
import type { Context } from "../context";
import { toCurves } from "./to-curves";

/** The stored curves of one kind, as they were computed when the revision was saved. */
export async function readResponses(ctx: Context, revisionId: string, { kind, loop, source, signals }: ResponseQuery) {
  allow(ctx, "design:read");
  const key = { teamId: ctx.teamId, revisionId };
  return inTransaction(ctx, async (tx) => {
    const found = await findDesignRevision(tx, key);
    if (!found) throw new NotFound("Design revision");
    const records = await findResponseRecords(tx, key, { kind, loop, source });
    return { items: records.map((record) => toCurves(record, found.model, signals)) };
  });
}
