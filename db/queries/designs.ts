import "server-only";
import { and, eq, inArray, isNull, lt, type SQL, sql } from "drizzle-orm";
import type { Db } from "../client";
import { designRevisions, designs } from "../schema/designs";
import { evidence } from "../schema/evidence";
import { plantRevisions, plants } from "../schema/plants";
import { type Archived, whereArchived } from "./archived";
import { after, type Keyset, type Order, ordered, sortValue } from "./keyset";
import type { PlantKey } from "./plants";

export type DesignKey = { readonly teamId: string; readonly designId: string };
const owned = ({ teamId, designId }: DesignKey) => and(eq(designs.teamId, teamId), eq(designs.id, designId));

const row = {
  id: designs.id,
  plantId: designs.plantId,
  name: designs.name,
  version: designs.version,
  revisionId: designRevisions.id,
  revisionNumber: designRevisions.number,
  plantRevisionId: plantRevisions.id,
  plantRevisionNumber: plantRevisions.number,
  newestPlantRevision: plants.currentRevision,
  method: designRevisions.method,
  observer: designRevisions.observerKind,
  summary: evidence.summary,
  archivedAt: designs.archivedAt,
  createdAt: designs.createdAt,
  updatedAt: designs.updatedAt,
};
const withCurrent = and(
  eq(designRevisions.teamId, designs.teamId),
  eq(designRevisions.designId, designs.id),
  eq(designRevisions.number, designs.currentRevision),
);
const withPlantRevision = and(eq(plantRevisions.teamId, designs.teamId), eq(plantRevisions.id, designRevisions.plantRevisionId));
const withPlant = and(eq(plants.teamId, designs.teamId), eq(plants.id, designs.plantId));
const withResponses = and(
  eq(evidence.teamId, designs.teamId),
  eq(evidence.designRevisionId, designRevisions.id),
  eq(evidence.part, "responses"),
);
const byUpdate = { by: designs.updatedAt, id: designs.id, type: "timestamptz", descending: true } as const satisfies Order;

function selectDesigns(db: Db) {
  return db
    .select({ ...row, sortValue: sortValue(byUpdate) })
    .from(designs)
    .innerJoin(designRevisions, withCurrent)
    .innerJoin(plantRevisions, withPlantRevision)
    .innerJoin(plants, withPlant)
    .leftJoin(evidence, withResponses);
}
export type DesignRow = Awaited<ReturnType<typeof selectDesigns>>[number];

export async function findDesign(db: Db, key: DesignKey): Promise<DesignRow | undefined> {
  const [found] = await selectDesigns(db).where(owned(key));
  return found;
}

export async function listDesigns(db: Db, key: PlantKey, query: { archived: Archived; limit: number; place: Keyset | null }) {
  const shown = whereArchived(designs.archivedAt, query.archived);
  return selectDesigns(db)
    .where(and(eq(designs.teamId, key.teamId), eq(designs.plantId, key.plantId), shown, after(byUpdate, query.place)))
    .orderBy(...ordered(byUpdate))
    .limit(query.limit);
}

/** Designs whose newest revision is pinned to a plant revision older than `number`, at most 100; archived ones left out. */
export async function designsOnOlderRevisions(db: Db, key: PlantKey, number: number) {
  return db
    .select({ id: designs.id, name: designs.name, onRevision: plantRevisions.number })
    .from(designs)
    .innerJoin(designRevisions, withCurrent)
    .innerJoin(plantRevisions, withPlantRevision)
    .where(
      and(
        eq(designs.teamId, key.teamId),
        eq(designs.plantId, key.plantId),
        isNull(designs.archivedAt),
        lt(plantRevisions.number, number),
      ),
    )
    .orderBy(designs.name, designs.id)
    .limit(100);
}

export async function insertDesign(db: Db, values: { teamId: string; plantId: string; name: string; createdBy: string }) {
  const [made] = await db.insert(designs).values(values).returning({ id: designs.id });
  return made;
}

/** One statement, so of two writers only one wins. Undefined: absent, another team's, or no longer at `version`. */
async function changeAt(
  db: Db,
  key: DesignKey,
  version: number,
  change: { name?: string; archivedAt?: SQL | null; currentRevision?: SQL },
) {
  const [saved] = await db
    .update(designs)
    .set({ ...change, version: sql`${designs.version} + 1`, updatedAt: sql`now()` })
    .where(and(owned(key), eq(designs.version, version)))
    .returning({ plantId: designs.plantId, currentRevision: designs.currentRevision });
  return saved;
}

export const renameDesignAt = (db: Db, key: DesignKey, version: number, name: string) => changeAt(db, key, version, { name });
export const archiveDesignAt = (db: Db, key: DesignKey, version: number, archived: boolean) =>
  changeAt(db, key, version, { archivedAt: archived ? sql`now()` : null });
export const advanceDesignAt = (db: Db, key: DesignKey, version: number) =>
  changeAt(db, key, version, { currentRevision: sql`${designs.currentRevision} + 1` });

/** Which of these revisions are this plant's, of this team. */
export async function designRevisionsOfPlant(db: Db, key: PlantKey, revisionIds: readonly string[]) {
  return db
    .select({ id: designRevisions.id })
    .from(designRevisions)
    .where(
      and(
        eq(designRevisions.teamId, key.teamId),
        eq(designRevisions.plantId, key.plantId),
        inArray(designRevisions.id, [...revisionIds]),
      ),
    );
}
