import "server-only";
import { and, eq, ilike, type SQL, sql } from "drizzle-orm";
import type { Criterion } from "@/control/design/criteria";
import type { Db } from "../client";
import { designs } from "../schema/designs";
import { plantRevisions, plants } from "../schema/plants";
import { type Archived, whereArchived } from "./archived";
import { after, type Keyset, literalLike, type Order, ordered, sortValue } from "./keyset";

export type PlantKey = { readonly teamId: string; readonly plantId: string };
const owned = ({ teamId, plantId }: PlantKey) => and(eq(plants.teamId, teamId), eq(plants.id, plantId));

const ORDERS = {
  name: { by: plants.name, id: plants.id, type: "text", descending: false },
  "-name": { by: plants.name, id: plants.id, type: "text", descending: true },
  updated: { by: plants.updatedAt, id: plants.id, type: "timestamptz", descending: false },
  "-updated": { by: plants.updatedAt, id: plants.id, type: "timestamptz", descending: true },
} as const satisfies Record<string, Order>;
export type PlantSort = keyof typeof ORDERS;

const row = {
  id: plants.id,
  name: plants.name,
  version: plants.version,
  revisionId: plantRevisions.id,
  revisionNumber: plantRevisions.number,
  axes: plantRevisions.axes,
  timeBase: plantRevisions.timeBase,
  order: plantRevisions.stateCount,
  inputCount: plantRevisions.inputCount,
  outputCount: plantRevisions.outputCount,
  designCount: sql<number>`(select count(*)::int from ${designs} where ${designs.teamId} = ${plants.teamId}
    and ${designs.plantId} = ${plants.id} and ${designs.archivedAt} is null)`,
  archivedAt: plants.archivedAt,
  createdAt: plants.createdAt,
  updatedAt: plants.updatedAt,
};
const withCurrent = and(
  eq(plantRevisions.teamId, plants.teamId),
  eq(plantRevisions.plantId, plants.id),
  eq(plantRevisions.number, plants.currentRevision),
);

export async function findPlant(db: Db, key: PlantKey) {
  const [found] = await db
    .select({ ...row, criteria: plants.criteria })
    .from(plants)
    .innerJoin(plantRevisions, withCurrent)
    .where(owned(key));
  return found;
}
export type PlantRow = NonNullable<Awaited<ReturnType<typeof findPlant>>>;
export type PlantSummaryRow = Omit<PlantRow, "criteria">;

export async function listPlants(
  db: Db,
  teamId: string,
  query: { search: string; sort: PlantSort; archived: Archived; limit: number; place: Keyset | null },
) {
  const order = ORDERS[query.sort];
  const conditions: (SQL | undefined)[] = [
    eq(plants.teamId, teamId),
    query.search === "" ? undefined : ilike(plants.name, literalLike(query.search)),
    whereArchived(plants.archivedAt, query.archived),
    after(order, query.place),
  ];
  return db
    .select({ ...row, sortValue: sortValue(order) })
    .from(plants)
    .innerJoin(plantRevisions, withCurrent)
    .where(and(...conditions))
    .orderBy(...ordered(order))
    .limit(query.limit);
}

export async function insertPlant(db: Db, values: { teamId: string; name: string; createdBy: string; criteria?: Criterion[] }) {
  const [made] = await db.insert(plants).values(values).returning({ id: plants.id });
  return made;
}

/** One statement, so of two writers only one wins. Undefined: absent, another team's, or no longer at `version`. */
async function changeAt(
  db: Db,
  key: PlantKey,
  version: number,
  change: { name?: string; archivedAt?: SQL | null; currentRevision?: SQL; criteria?: Criterion[] },
) {
  const [saved] = await db
    .update(plants)
    .set({ ...change, version: sql`${plants.version} + 1`, updatedAt: sql`now()` })
    .where(and(owned(key), eq(plants.version, version)))
    .returning({ currentRevision: plants.currentRevision });
  return saved;
}

export const renamePlantAt = (db: Db, key: PlantKey, version: number, name: string) => changeAt(db, key, version, { name });
export const setCriteriaAt = (db: Db, key: PlantKey, version: number, criteria: Criterion[]) =>
  changeAt(db, key, version, { criteria });
export const archivePlantAt = (db: Db, key: PlantKey, version: number, archived: boolean) =>
  changeAt(db, key, version, { archivedAt: archived ? sql`now()` : null });
export const advancePlantAt = (db: Db, key: PlantKey, version: number) =>
  changeAt(db, key, version, { currentRevision: sql`${plants.currentRevision} + 1` });
