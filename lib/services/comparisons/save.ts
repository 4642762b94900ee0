import "server-only";
import { inTransaction } from "@/db/client";
import { findComparison, insertComparison } from "@/db/queries/comparisons";
import { designRevisionsOfPlant } from "@/db/queries/designs";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Comparison, SaveComparison } from "@/lib/schemas/comparison";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { toComparison } from "./to-comparison";

export async function saveComparison(
  ctx: Context,
  { plantId, title, note, designRevisionIds }: SaveComparison,
): Promise<Comparison> {
  allow(ctx, "comparison:write");
  const { teamId, userId: createdBy } = ctx;
  return inTransaction(ctx, async (tx) => {
    const known = await designRevisionsOfPlant(tx, { teamId, plantId }, designRevisionIds);
    if (known.length !== designRevisionIds.length) throw new NotFound("Design revision");
    const { id } = await insertComparison(tx, { teamId, plantId, title, note, designRevisionIds, createdBy });
    await recordEvent(tx, ctx, "comparison.saved", { type: "comparison", id });
    const made = await findComparison(tx, { teamId, comparisonId: id });
    if (!made) throw new NotFound("Comparison");
    return toComparison(made);
  });
}
