import "server-only";
import { inTransaction } from "@/db/client";
import { findComparison } from "@/db/queries/comparisons";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Comparison } from "@/lib/schemas/comparison";
import type { Context } from "../context";
import { toComparison } from "./to-comparison";

export async function readComparison(ctx: Context, comparisonId: string): Promise<Comparison> {
  allow(ctx, "comparison:read");
  const found = await inTransaction(ctx, (tx) => findComparison(tx, { teamId: ctx.teamId, comparisonId }));
  if (!found) throw new NotFound("Comparison");
  return toComparison(found);
}
