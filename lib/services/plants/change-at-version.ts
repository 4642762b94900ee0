import "server-only";
import { type Db, inTransaction } from "@/db/client";
import { findPlant, type PlantKey } from "@/db/queries/plants";
import { NotFound, StaleVersion } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Plant } from "@/lib/schemas/plant";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { toPlant } from "./to-plant";

type Saved = { readonly currentRevision: number } | undefined;

/** The frame of every change of a plant: right, one versioned write, the reason when it did not take, audit. */
export async function changePlantAt(
  ctx: Context,
  plantId: string,
  version: number,
  kind: string,
  write: (tx: Db, key: PlantKey) => Promise<Saved>,
): Promise<Plant> {
  allow(ctx, "plant:write");
  return inTransaction(ctx, async (tx) => {
    const key = { teamId: ctx.teamId, plantId };
    const saved = await write(tx, key);
    const current = await findPlant(tx, key);
    if (!current) throw new NotFound("Plant");
    if (!saved) throw new StaleVersion(version, current.version);
    await recordEvent(tx, ctx, kind, { type: "plant", id: plantId, revision: saved.currentRevision });
    return toPlant(current);
  });
}
