import "server-only";
import { archivePlantAt } from "@/db/queries/plants";
import type { Context } from "../context";
import { changePlantAt } from "./change-at-version";

/** An archived plant leaves the lists and keeps everything; the same verb brings it back. */
export function archivePlant(ctx: Context, plantId: string, version: number, archived: boolean) {
  const kind = archived ? "plant.archived" : "plant.restored";
  return changePlantAt(ctx, plantId, version, kind, (tx, key) => archivePlantAt(tx, key, version, archived));
}
