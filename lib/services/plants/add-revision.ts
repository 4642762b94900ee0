import "server-only";
import { insertPlantRevision } from "@/db/queries/plant-revisions";
import { advancePlantAt } from "@/db/queries/plants";
import { allow } from "@/lib/permissions/allow";
import type { AddPlantRevision, Plant } from "@/lib/schemas/plant";
import type { Context } from "../context";
import { changePlantAt } from "./change-at-version";
import { evaluateOrRefuse } from "./evaluate-or-refuse";

/** `version` is the plant's version that the edit started from; designs pinned to older revisions are outdated from now on. */
export async function addPlantRevision(
  ctx: Context,
  plantId: string,
  version: number,
  { content, note }: AddPlantRevision,
  signal?: AbortSignal,
): Promise<Plant> {
  allow(ctx, "plant:write");
  const model = await evaluateOrRefuse(ctx, content, { signal });
  return changePlantAt(ctx, plantId, version, "plant.revised", async (tx, key) => {
    const saved = await advancePlantAt(tx, key, version);
    if (saved) {
      await insertPlantRevision(tx, { ...key, number: saved.currentRevision, content, model, note, createdBy: ctx.userId });
    }
    return saved;
  });
}
