import "server-only";
import { and, eq, sql } from "drizzle-orm";
import { alias } from "drizzle-orm/pg-core";
import type { Db } from "../client";
import { auditEvents } from "../schema/audit";
import { comparisons } from "../schema/comparisons";
import { designs } from "../schema/designs";
import { users } from "../schema/people";
import { plants } from "../schema/plants";
import { templates } from "../schema/templates";
import { after, type Keyset, type Order, ordered, sortValue } from "./keyset";

const newestFirst: Order = { by: auditEvents.at, id: auditEvents.id, type: "timestamptz", descending: true };

export async function insertAuditEvent(db: Db, event: Omit<typeof auditEvents.$inferInsert, "id" | "at">): Promise<void> {
  await db.insert(auditEvents).values(event);
}

const member = alias(users, "member");
const subject = auditEvents.subjectId;
/** The subject's name today; null where it has none of its own, such as an invitation. */
const subjectName = sql<
  string | null
>`coalesce(${plants.name}, ${designs.name}, ${templates.name}, ${comparisons.title}, ${member.name})`;

/** One row more than `limit`, which says whether there is a next page. */
export async function listAuditEvents(db: Db, teamId: string, limit: number, place: Keyset | null) {
  return db
    .select({
      id: auditEvents.id,
      at: auditEvents.at,
      actor: users.name,
      kind: auditEvents.kind,
      subjectType: auditEvents.subjectType,
      subjectId: subject,
      subjectName,
      plantId: sql<string | null>`coalesce(${plants.id}, ${designs.plantId}, ${comparisons.plantId})`,
      revision: auditEvents.revision,
      requestId: auditEvents.requestId,
      data: auditEvents.data,
      place: sortValue(newestFirst),
    })
    .from(auditEvents)
    .leftJoin(users, eq(users.id, auditEvents.actorId))
    .leftJoin(plants, and(eq(plants.teamId, teamId), eq(plants.id, subject)))
    .leftJoin(designs, and(eq(designs.teamId, teamId), eq(designs.id, subject)))
    .leftJoin(templates, and(eq(templates.teamId, teamId), eq(templates.id, subject)))
    .leftJoin(comparisons, and(eq(comparisons.teamId, teamId), eq(comparisons.id, subject)))
    .leftJoin(member, eq(member.id, subject))
    .where(and(eq(auditEvents.teamId, teamId), after(newestFirst, place)))
    .orderBy(...ordered(newestFirst))
    .limit(limit + 1);
}
