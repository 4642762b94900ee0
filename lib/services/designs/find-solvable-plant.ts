import "server-only";
import { inTransaction } from "@/db/client";
import { findPlantRevision, type PlantRevisionRow } from "@/db/queries/plant-revisions";
import { NotFound } from "@/lib/errors";
import type { Context } from "../context";

/** The plant revision a design is to be computed on. @throws NotFound also when it is another plant's than the one named */
export async function findSolvablePlant(ctx: Context, plantId: string, revisionId: string): Promise<PlantRevisionRow> {
  const found = await inTransaction(ctx, (tx) => findPlantRevision(tx, { teamId: ctx.teamId, revisionId }));
  if (!found || found.plantId !== plantId) throw new NotFound("Plant revision");
  return found;
}
