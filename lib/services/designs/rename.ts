import "server-only";
import { renameDesignAt } from "@/db/queries/designs";
import type { Context } from "../context";
import { changeDesignAt } from "./change-at-version";

export function renameDesign(ctx: Context, designId: string, version: number, name: string) {
  return changeDesignAt(ctx, designId, version, "design.renamed", (tx, key) => renameDesignAt(tx, key, version, name));
}
