import "server-only";
import { inTransaction } from "@/db/client";
import { archiveComparisonAt, findComparison } from "@/db/queries/comparisons";
import { NotFound, StaleVersion } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Comparison } from "@/lib/schemas/comparison";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { toComparison } from "./to-comparison";

/** Leaves the lists; its address goes on showing what was compared. */
export async function archiveComparison(ctx: Context, comparisonId: string, version: number): Promise<Comparison> {
  allow(ctx, "comparison:write");
  return inTransaction(ctx, async (tx) => {
    const key = { teamId: ctx.teamId, comparisonId };
    const saved = await archiveComparisonAt(tx, key, version);
    const current = await findComparison(tx, key);
    if (!current) throw new NotFound("Comparison");
    if (!saved) throw new StaleVersion(version, current.version);
    await recordEvent(tx, ctx, "comparison.archived", { type: "comparison", id: comparisonId });
    return toComparison(current);
  });
}
