import "server-only";
import { inTransaction } from "@/db/client";
import { findPlantRevision } from "@/db/queries/plant-revisions";
import { findPlant } from "@/db/queries/plants";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Plant } from "@/lib/schemas/plant";
import type { Context } from "../context";
import { insertWithFirstRevision } from "./create";
import { toPlant, toRevision } from "./to-plant";

/** A plant of its own with the same criteria, starting from one revision (the newest when none is named). Designs stay with the original. */
export async function duplicatePlant(
  ctx: Context,
  plantId: string,
  { name, revisionId }: { name: string; revisionId?: string },
): Promise<Plant> {
  allow(ctx, "plant:write");
  const { teamId } = ctx;
  return inTransaction(ctx, async (tx) => {
    const original = await findPlant(tx, { teamId, plantId });
    if (!original) throw new NotFound("Plant");
    const found = await findPlantRevision(tx, { teamId, revisionId: revisionId ?? original.revisionId });
    if (!found || found.plantId !== plantId) throw new NotFound("Plant revision");
    const { content, model, number } = toRevision(found);
    const note = `From ${original.name}, revision ${number}`;
    const made = await insertWithFirstRevision(tx, ctx, { name, content, model, note, criteria: original.criteria });
    const copy = await findPlant(tx, { teamId, plantId: made.plantId });
    if (!copy) throw new NotFound("Plant");
    return toPlant(copy);
  });
}
