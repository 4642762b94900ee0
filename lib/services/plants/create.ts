import "server-only";
import type { PlantModel } from "@/control/plant/model";
import { type Db, inTransaction } from "@/db/client";
import { insertPlantRevision } from "@/db/queries/plant-revisions";
import { findPlant, insertPlant } from "@/db/queries/plants";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { CreatePlant, Plant, PlantContent } from "@/lib/schemas/plant";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { evaluateOrRefuse } from "./evaluate-or-refuse";
import { toPlant } from "./to-plant";

type NewPlant = {
  readonly name: string;
  readonly content: PlantContent;
  readonly model: PlantModel;
  readonly note: string;
  readonly criteria?: Plant["criteria"];
};

/** A plant and its first revision, within a transaction of the caller's. */
export async function insertWithFirstRevision(tx: Db, ctx: Context, { name, criteria, ...first }: NewPlant) {
  const { teamId, userId: createdBy } = ctx;
  const plant = await insertPlant(tx, { teamId, name, criteria, createdBy });
  const revision = await insertPlantRevision(tx, { teamId, plantId: plant.id, number: 1, ...first, createdBy });
  await recordEvent(tx, ctx, "plant.created", { type: "plant", id: plant.id, revision: 1 });
  return { plantId: plant.id, revisionId: revision.id };
}

export async function createPlant(ctx: Context, { name, content, note }: CreatePlant, signal?: AbortSignal): Promise<Plant> {
  allow(ctx, "plant:write");
  const model = await evaluateOrRefuse(ctx, content, { signal });
  return inTransaction(ctx, async (tx) => {
    const { plantId } = await insertWithFirstRevision(tx, ctx, { name, content, model, note });
    const made = await findPlant(tx, { teamId: ctx.teamId, plantId });
    if (!made) throw new NotFound("Plant");
    return toPlant(made);
  });
}
