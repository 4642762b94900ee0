import "server-only";
import type { ComparisonRow } from "@/db/queries/comparisons";
import type { Comparison } from "@/lib/schemas/comparison";

/** Only the fields we mean to show. */
export function toComparison(row: ComparisonRow): Comparison {
  const { id, plantId, title, note, designRevisionIds, version, createdBy } = row;
  return { id, plantId, title, note, designRevisionIds, version, createdBy, createdAt: row.createdAt.toISOString() };
}
