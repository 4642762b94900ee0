import "server-only";
import { inTransaction } from "@/db/client";
import { findPlantRevision } from "@/db/queries/plant-revisions";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { PlantRevision } from "@/lib/schemas/plant";
import type { Context } from "../context";
import { toRevision } from "./to-plant";

/** @throws NotFound also when the revision is another plant's than the one named */
export async function readPlantRevision(ctx: Context, plantId: string, revisionId: string): Promise<PlantRevision> {
  allow(ctx, "plant:read");
  const found = await inTransaction(ctx, (tx) => findPlantRevision(tx, { teamId: ctx.teamId, revisionId }));
  if (!found || found.plantId !== plantId) throw new NotFound("Plant revision");
  return toRevision(found);
}
