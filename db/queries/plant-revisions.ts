import "server-only";
import { and, desc, eq, inArray, lt } from "drizzle-orm";
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

/** Of one team, in no order; ids that are not there, or another team's, are missing in what comes back. */
export async function findPlantRevisions(db: Db, key: { readonly teamId: string; readonly revisionIds: readonly string[] }) {
  return db
    .select({ ...entry, content: plantRevisions.content, model: plantRevisions.model, criteria: plants.criteria })
    .from(plantRevisions)
    .innerJoin(plants, ofPlant)
    .leftJoin(users, eq(users.id, plantRevisions.createdBy))
    .where(and(eq(plantRevisions.teamId, key.teamId), inArray(plantRevisions.id, [...key.revisionIds])));
}
export type PlantRevisionRow = Awaited<ReturnType<typeof findPlantRevisions>>[number];

export async function findPlantRevision(
  db: Db,
  { teamId, revisionId }: { readonly teamId: string; readonly revisionId: string },
): Promise<PlantRevisionRow | undefined> {
  return (await findPlantRevisions(db, { teamId, revisionIds: [revisionId] })).at(0);
}

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
