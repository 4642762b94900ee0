import "server-only";
import { and, desc, eq, lt } from "drizzle-orm";
import type { PlantContent } from "@/control/plant/content";
import type { PlantModel } from "@/control/plant/model";
import type { Db } from "../client";
import { users } from "../schema/people";
import { plantRevisions, plants } from "../schema/plants";
import type { PlantKey } from "./plants";

const entry = {
  id: plantRevisions.id,
  plantId: plantRevisions.plantId,
  plantName: plants.name,
  number: plantRevisions.number,
  note: plantRevisions.note,
  createdBy: users.name,
  createdAt: plantRevisions.createdAt,
};
const ofPlant = and(eq(plants.teamId, plantRevisions.teamId), eq(plants.id, plantRevisions.plantId));

/** `before`: only revisions with a lower number, newest first. */
export async function listPlantRevisions(db: Db, { teamId, plantId }: PlantKey, limit: number, before: number | null) {
  return db
    .select(entry)
    .from(plantRevisions)
    .innerJoin(plants, ofPlant)
    .leftJoin(users, eq(users.id, plantRevisions.createdBy))
    .where(
      and(
        eq(plantRevisions.teamId, teamId),
        eq(plantRevisions.plantId, plantId),
        before === null ? undefined : lt(plantRevisions.number, before),
      ),
    )
    .orderBy(desc(plantRevisions.number))
    .limit(limit);
}
export type PlantRevisionEntryRow = Awaited<ReturnType<typeof listPlantRevisions>>[number];

export async function findPlantRevision(db: Db, key: { readonly teamId: string; readonly revisionId: string }) {
  const [found] = await db
    .select({
      ...entry,
      content: plantRevisions.content,
      model: plantRevisions.model,
      plantArchivedAt: plants.archivedAt,
      plantVersion: plants.version,
      newestNumber: plants.currentRevision,
    })
    .from(plantRevisions)
    .innerJoin(plants, ofPlant)
    .leftJoin(users, eq(users.id, plantRevisions.createdBy))
    .where(and(eq(plantRevisions.teamId, key.teamId), eq(plantRevisions.id, key.revisionId)));
  return found;
}
export type PlantRevisionRow = NonNullable<Awaited<ReturnType<typeof findPlantRevision>>>;

export async function insertPlantRevision(
  db: Db,
  values: {
    readonly teamId: string;
    readonly plantId: string;
    readonly number: number;
    readonly content: PlantContent;
    readonly model: PlantModel;
    readonly note: string;
    readonly createdBy: string;
  },
) {
  const [made] = await db
    .insert(plantRevisions)
    .values(values as typeof plantRevisions.$inferInsert)
    .returning({ id: plantRevisions.id, number: plantRevisions.number });
  return made;
}
