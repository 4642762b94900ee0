import "server-only";
import { and, desc, eq, inArray, lt } from "drizzle-orm";
import type { Recipe } from "@/control/design/recipe";
import type { Db } from "../client";
import { designRevisions, designs } from "../schema/designs";
import { users } from "../schema/people";
import { plantRevisions, plants } from "../schema/plants";
import type { DesignKey } from "./designs";
import type { PlantKey } from "./plants";

const entry = {
  id: designRevisions.id,
  designId: designRevisions.designId,
  number: designRevisions.number,
  note: designRevisions.note,
  createdBy: users.name,
  createdAt: designRevisions.createdAt,
};

export async function listDesignRevisions(db: Db, { teamId, designId }: DesignKey, limit: number, before: number | null) {
  return db
    .select(entry)
    .from(designRevisions)
    .leftJoin(users, eq(users.id, designRevisions.createdBy))
    .where(
      and(
        eq(designRevisions.teamId, teamId),
        eq(designRevisions.designId, designId),
        before === null ? undefined : lt(designRevisions.number, before),
      ),
    )
    .orderBy(desc(designRevisions.number))
    .limit(limit);
}
export type DesignRevisionEntryRow = Awaited<ReturnType<typeof listDesignRevisions>>[number];

export type DesignRevisionKey = { readonly teamId: string; readonly revisionId: string };

function selectDesignRevisions(db: Db) {
  return db
    .select({
      ...entry,
      designName: designs.name,
      plantId: designRevisions.plantId,
      plantName: plants.name,
      criteria: plants.criteria,
      plantRevisionId: plantRevisions.id,
      plantRevisionNumber: plantRevisions.number,
      newestPlantRevision: plants.currentRevision,
      recipe: designRevisions.recipe,
      methodVersion: designRevisions.methodVersion,
      model: plantRevisions.model,
    })
    .from(designRevisions)
    .innerJoin(designs, and(eq(designs.teamId, designRevisions.teamId), eq(designs.id, designRevisions.designId)))
    .innerJoin(plants, and(eq(plants.teamId, designRevisions.teamId), eq(plants.id, designRevisions.plantId)))
    .innerJoin(
      plantRevisions,
      and(eq(plantRevisions.teamId, designRevisions.teamId), eq(plantRevisions.id, designRevisions.plantRevisionId)),
    )
    .leftJoin(users, eq(users.id, designRevisions.createdBy));
}
export type DesignRevisionRow = Awaited<ReturnType<typeof selectDesignRevisions>>[number];

export async function findDesignRevision(
  db: Db,
  { teamId, revisionId }: DesignRevisionKey,
): Promise<DesignRevisionRow | undefined> {
  const [found] = await selectDesignRevisions(db).where(
    and(eq(designRevisions.teamId, teamId), eq(designRevisions.id, revisionId)),
  );
  return found;
}

/** Those of these revisions that are this plant's, of this team, in no order. */
export async function findDesignRevisions(
  db: Db,
  { teamId, plantId }: PlantKey,
  revisionIds: readonly string[],
): Promise<DesignRevisionRow[]> {
  return selectDesignRevisions(db).where(
    and(eq(designRevisions.teamId, teamId), eq(designRevisions.plantId, plantId), inArray(designRevisions.id, [...revisionIds])),
  );
}

export async function insertDesignRevision(
  db: Db,
  values: {
    readonly teamId: string;
    readonly plantId: string;
    readonly designId: string;
    readonly number: number;
    readonly plantRevisionId: string;
    readonly recipe: Recipe;
    readonly methodVersion: string;
    readonly note: string;
    readonly createdBy: string;
  },
) {
  const [made] = await db.insert(designRevisions).values(values).returning({ id: designRevisions.id });
  return made;
}
