import "server-only";
import { renamePlantAt } from "@/db/queries/plants";
import type { Context } from "../context";
import { changePlantAt } from "./change-at-version";

export function renamePlant(ctx: Context, plantId: string, version: number, name: string) {
  return changePlantAt(ctx, plantId, version, "plant.renamed", (tx, key) => renamePlantAt(tx, key, version, name));
}
