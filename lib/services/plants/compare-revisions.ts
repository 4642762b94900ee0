import "server-only";
import { inTransaction } from "@/db/client";
import { designsOnOlderRevisions } from "@/db/queries/designs";
import { findPlantRevisions } from "@/db/queries/plant-revisions";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { PlantDifference } from "@/lib/schemas/plant";
import type { Context } from "../context";
import { contentDifferences } from "./content-differences";
import { toRevision, toRevisionEntry } from "./to-plant";

/** What differs between two revisions of a plant, and which designs are pinned to one older than the later one. */
export async function comparePlantRevisions(
  ctx: Context,
  plantId: string,
  range: { from: string; to: string },
): Promise<PlantDifference> {
  allow(ctx, "plant:read");
  const { teamId } = ctx;
  return inTransaction(ctx, async (tx) => {
    const found = await findPlantRevisions(tx, { teamId, revisionIds: [range.from, range.to] });
    const [from, to] = [range.from, range.to].map((wanted) => found.find(({ id }) => id === wanted));
    if (from?.plantId !== plantId || to?.plantId !== plantId) throw new NotFound("Plant revision");
    return {
      from: toRevisionEntry(from),
      to: toRevisionEntry(to),
      changes: contentDifferences(toRevision(from).content, toRevision(to).content),
      outdates: await designsOnOlderRevisions(tx, { teamId, plantId }, Math.max(from.number, to.number)),
    };
  });
}
