import "server-only";
import { and, eq, inArray, isNotNull, or, type SQL, sql } from "drizzle-orm";
import { alias } from "drizzle-orm/pg-core";
import type { Db } from "../client";
import { designDrafts } from "../schema/design-drafts";
import { designRevisions, designs } from "../schema/designs";
import { plantRevisions, plants } from "../schema/plants";

export type DraftKey = {
  readonly teamId: string;
  readonly userId: string;
  readonly plantId: string;
  /** A design, an older revision of one, or the plant itself for a new design. */
  readonly subjectId: string;
};
const owned = ({ teamId, userId, plantId, subjectId }: DraftKey) =>
  and(
    eq(designDrafts.teamId, teamId),
    eq(designDrafts.userId, userId),
    eq(designDrafts.plantId, plantId),
    eq(designDrafts.subjectId, subjectId),
  );

const ofPlant = (table: typeof designs | typeof designRevisions, id: string | SQL) =>
  and(eq(table.teamId, plants.teamId), eq(table.plantId, plants.id), eq(table.id, id));
const isSubject = ({ teamId, plantId, subjectId }: DraftKey) =>
  and(
    eq(plants.teamId, teamId),
    eq(plants.id, plantId),
    or(eq(plants.id, subjectId), isNotNull(designs.id), isNotNull(designRevisions.id)),
  );

/** The draft, or null where the subject has none. Undefined: there is no such subject in this team. */
export async function findDraft(db: Db, key: DraftKey) {
  const [found] = await db
    .select({ draft: designDrafts })
    .from(plants)
    .leftJoin(designs, ofPlant(designs, key.subjectId))
    .leftJoin(designRevisions, ofPlant(designRevisions, key.subjectId))
    .leftJoin(designDrafts, owned(key))
    .where(isSubject(key));
  return found?.draft;
}
export type DraftRow = NonNullable<Awaited<ReturnType<typeof findDraft>>>;

const bases = alias(designRevisions, "bases");

/**
 * What a draft of it stands on. Undefined: no such subject in this team, no such plant revision of the plant, or a base that is no
 * revision of the design.
 */
export async function findDraftGround(db: Db, key: DraftKey, on: { plantRevisionId: string; baseRevisionId: string | null }) {
  const designId = sql<string | null>`coalesce(${designs.id}, ${designRevisions.designId})`;
  const itsBase = and(
    eq(bases.teamId, plants.teamId),
    eq(bases.designId, designId),
    eq(bases.id, on.baseRevisionId ?? key.subjectId),
  );
  const itsPlant = and(eq(plantRevisions.teamId, plants.teamId), eq(plantRevisions.plantId, plants.id));
  const [found] = await db
    .select({ designId, designRevisionId: designRevisions.id })
    .from(plants)
    .innerJoin(plantRevisions, and(itsPlant, eq(plantRevisions.id, on.plantRevisionId)))
    .leftJoin(designs, ofPlant(designs, key.subjectId))
    .leftJoin(designRevisions, ofPlant(designRevisions, key.subjectId))
    .leftJoin(bases, itsBase)
    .where(and(isSubject(key), on.baseRevisionId === null ? undefined : isNotNull(bases.id)));
  return found;
}

export type DraftValues = Pick<
  DraftRow,
  "designId" | "designRevisionId" | "plantRevisionId" | "baseRevisionId" | "baseVersion" | "form" | "mark"
>;

/** One statement, so of two pages only one wins. Undefined: what is there has none of the marks that may be replaced. */
export async function putDraft(db: Db, key: DraftKey, values: DraftValues, replaces: readonly string[]) {
  const { plantRevisionId, baseRevisionId, baseVersion, form, mark } = values;
  const [kept] = await db
    .insert(designDrafts)
    .values({ ...key, ...values })
    .onConflictDoUpdate({
      target: [designDrafts.teamId, designDrafts.userId, designDrafts.subjectId],
      set: { plantRevisionId, baseRevisionId, baseVersion, form, mark, updatedAt: sql`now()` },
      setWhere: inArray(designDrafts.mark, [...replaces, mark]),
    })
    .returning({ mark: designDrafts.mark, updatedAt: designDrafts.updatedAt });
  return kept;
}

/** Whether it went: a draft with another mark stays. */
export async function removeDraft(db: Db, key: DraftKey, marks: readonly string[]): Promise<boolean> {
  const gone = await db
    .delete(designDrafts)
    .where(and(owned(key), inArray(designDrafts.mark, [...marks])))
    .returning({ mark: designDrafts.mark });
  return gone.length > 0;
}
