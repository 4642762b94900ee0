import "server-only";
import type { PlantModel } from "@/control/plant/model";
import { type Db, inTransaction } from "@/db/client";
import { insertPlantRevision } from "@/db/queries/plant-revisions";
import { findPlant, insertPlant } from "@/db/queries/plants";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { CreatePlant, PlantContent, PlantSummary } from "@/lib/schemas/plant";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { evaluateOrRefuse } from "./evaluate-or-refuse";
import { toPlantSummary } from "./to-plant";

/** A plant and its first revision, within a transaction of the caller's. */
export async function insertWithFirstRevision(
  tx: Db,
  ctx: Context,
  { name, content, model, note }: { name: string; content: PlantContent; model: PlantModel; note: string },
) {
  const { teamId, userId: createdBy } = ctx;
  const plant = await insertPlant(tx, { teamId, name, createdBy });
  const revision = await insertPlantRevision(tx, { teamId, plantId: plant.id, number: 1, content, model, note, createdBy });
  await recordEvent(tx, ctx, "plant.created", { type: "plant", id: plant.id, revision: 1 });
  return { plantId: plant.id, revisionId: revision.id };
}

export async function createPlant(
  ctx: Context,
  { name, content, note }: CreatePlant,
  signal?: AbortSignal,
): Promise<PlantSummary> {
  allow(ctx, "plant:write");
  const model = await evaluateOrRefuse(ctx, content, { signal });
  return inTransaction(ctx, async (tx) => {
    const { plantId } = await insertWithFirstRevision(tx, ctx, { name, content, model, note });
    const made = await findPlant(tx, { teamId: ctx.teamId, plantId });
    if (!made) throw new NotFound("Plant");
    return toPlantSummary(made);
  });
}
