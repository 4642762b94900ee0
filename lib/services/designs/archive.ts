import "server-only";
import { archiveDesignAt } from "@/db/queries/designs";
import type { Context } from "../context";
import { changeDesignAt } from "./change-at-version";

/** An archived design leaves the lists and keeps everything; the same verb brings it back. */
export function archiveDesign(ctx: Context, designId: string, version: number, archived: boolean) {
  const kind = archived ? "design.archived" : "design.restored";
  return changeDesignAt(ctx, designId, version, kind, (tx, key) => archiveDesignAt(tx, key, version, archived));
}
