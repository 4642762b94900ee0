import "server-only";
import { setCriteriaAt } from "@/db/queries/plants";
import type { Criteria } from "@/lib/schemas/criteria";
import type { Context } from "../context";
import { changePlantAt } from "./change-at-version";

/** A name that the plant does not have is kept: a later revision may, and until then the verdict says so. */
export function setCriteria(ctx: Context, plantId: string, version: number, criteria: Criteria) {
  return changePlantAt(ctx, plantId, version, "plant.criteria-set", (tx, key) => setCriteriaAt(tx, key, version, criteria));
}
