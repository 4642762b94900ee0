import "server-only";
import { isNotNull, isNull, type SQL } from "drizzle-orm";
import type { PgColumn } from "drizzle-orm/pg-core";

/** Which rows a list shows: those in use, those put away, or all. */
export type Archived = "no" | "yes" | "all";

export function whereArchived(archivedAt: PgColumn, archived: Archived): SQL | undefined {
  if (archived === "all") return undefined;
  return archived === "yes" ? isNotNull(archivedAt) : isNull(archivedAt);
}
