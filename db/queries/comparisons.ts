import "server-only";
import { and, eq, isNull, sql } from "drizzle-orm";
import type { Db } from "../client";
import { comparisons } from "../schema/comparisons";
import { users } from "../schema/people";
import { after, type Keyset, type Order, ordered, sortValue } from "./keyset";

const byTime = { by: comparisons.createdAt, id: comparisons.id, type: "timestamptz", descending: true } as const satisfies Order;
const row = {
  id: comparisons.id,
  plantId: comparisons.plantId,
  title: comparisons.title,
  note: comparisons.note,
  designRevisionIds: comparisons.designRevisionIds,
  version: comparisons.version,
  createdBy: users.name,
  createdAt: comparisons.createdAt,
};
export type ComparisonKey = { readonly teamId: string; readonly comparisonId: string };
const owned = ({ teamId, comparisonId }: ComparisonKey) => and(eq(comparisons.teamId, teamId), eq(comparisons.id, comparisonId));

function selectComparisons(db: Db) {
  return db
    .select({ ...row, sortValue: sortValue(byTime) })
    .from(comparisons)
    .leftJoin(users, eq(users.id, comparisons.createdBy));
}
export type ComparisonRow = Awaited<ReturnType<typeof selectComparisons>>[number];

export async function findComparison(db: Db, key: ComparisonKey): Promise<ComparisonRow | undefined> {
  const [found] = await selectComparisons(db).where(owned(key));
  return found;
}

export async function listComparisons(
  db: Db,
  teamId: string,
  query: { plantId: string | null; limit: number; place: Keyset | null },
) {
  const ofPlant = query.plantId === null ? undefined : eq(comparisons.plantId, query.plantId);
  return selectComparisons(db)
    .where(and(eq(comparisons.teamId, teamId), ofPlant, isNull(comparisons.archivedAt), after(byTime, query.place)))
    .orderBy(...ordered(byTime))
    .limit(query.limit);
}

export async function insertComparison(
  db: Db,
  values: { teamId: string; plantId: string; title: string; note: string; designRevisionIds: string[]; createdBy: string },
) {
  const [made] = await db.insert(comparisons).values(values).returning({ id: comparisons.id });
  return made;
}

/** Undefined: absent, another team's, or no longer at `version`. */
export async function archiveComparisonAt(db: Db, key: ComparisonKey, version: number) {
  const [saved] = await db
    .update(comparisons)
    .set({ archivedAt: sql`now()`, version: sql`${comparisons.version} + 1`, updatedAt: sql`now()` })
    .where(and(owned(key), eq(comparisons.version, version)))
    .returning({ id: comparisons.id });
  return saved;
}
