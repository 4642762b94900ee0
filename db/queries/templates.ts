import "server-only";
import { and, eq, sql } from "drizzle-orm";
import type { Db } from "../client";
import { templates } from "../schema/templates";
import { type Archived, whereArchived } from "./archived";
import { after, type Keyset, type Order, ordered, sortValue } from "./keyset";

const byName = { by: templates.name, id: templates.id, type: "text", descending: false } as const satisfies Order;
const summary = {
  id: templates.id,
  name: templates.name,
  description: templates.description,
  version: templates.version,
  openParameterCount: templates.openParameterCount,
  order: templates.stateCount,
  archivedAt: templates.archivedAt,
  createdAt: templates.createdAt,
};
export type TemplateKey = { readonly teamId: string; readonly templateId: string };
const owned = ({ teamId, templateId }: TemplateKey) => and(eq(templates.teamId, teamId), eq(templates.id, templateId));

export async function listTemplates(db: Db, teamId: string, query: { archived: Archived; limit: number; place: Keyset | null }) {
  const shown = whereArchived(templates.archivedAt, query.archived);
  return db
    .select({ ...summary, sortValue: sortValue(byName) })
    .from(templates)
    .where(and(eq(templates.teamId, teamId), shown, after(byName, query.place)))
    .orderBy(...ordered(byName))
    .limit(query.limit);
}

export async function findTemplate(db: Db, key: TemplateKey) {
  const [found] = await db
    .select({ ...summary, content: templates.content })
    .from(templates)
    .where(owned(key));
  return found;
}
export type TemplateRow = NonNullable<Awaited<ReturnType<typeof findTemplate>>>;

export async function insertTemplate(db: Db, values: typeof templates.$inferInsert) {
  const [made] = await db.insert(templates).values(values).returning({ id: templates.id });
  return made;
}

/** Undefined: absent, another team's, or no longer at `version`. */
export async function archiveTemplateAt(db: Db, key: TemplateKey, version: number, archived: boolean) {
  const [saved] = await db
    .update(templates)
    .set({ archivedAt: archived ? sql`now()` : null, version: sql`${templates.version} + 1`, updatedAt: sql`now()` })
    .where(and(owned(key), eq(templates.version, version)))
    .returning({ id: templates.id });
  return saved;
}
