import "server-only";
import { inTransaction } from "@/db/client";
import { findPlant } from "@/db/queries/plants";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Plant } from "@/lib/schemas/plant";
import type { Context } from "../context";
import { toPlant } from "./to-plant";

export async function readPlant(ctx: Context, plantId: string): Promise<Plant> {
  allow(ctx, "plant:read");
  const found = await inTransaction(ctx, (tx) => findPlant(tx, { teamId: ctx.teamId, plantId }));
  if (!found) throw new NotFound("Plant");
  return toPlant(found);
}
