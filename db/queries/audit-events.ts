import "server-only";
import { and, eq } from "drizzle-orm";
import type { Db } from "../client";
import { auditEvents } from "../schema/audit";
import { users } from "../schema/people";
import { after, type Keyset, type Order, ordered, sortValue } from "./keyset";

const newestFirst: Order = { by: auditEvents.at, id: auditEvents.id, type: "timestamptz", descending: true };

export async function insertAuditEvent(db: Db, event: Omit<typeof auditEvents.$inferInsert, "id" | "at">): Promise<void> {
  await db.insert(auditEvents).values(event);
}

/** One row more than `limit`, which says whether there is a next page. */
export async function listAuditEvents(db: Db, teamId: string, limit: number, place: Keyset | null) {
  return db
    .select({
      id: auditEvents.id,
      at: auditEvents.at,
      actor: users.name,
      kind: auditEvents.kind,
      subjectType: auditEvents.subjectType,
      subjectId: auditEvents.subjectId,
      revision: auditEvents.revision,
      requestId: auditEvents.requestId,
      data: auditEvents.data,
      place: sortValue(newestFirst),
    })
    .from(auditEvents)
    .leftJoin(users, eq(users.id, auditEvents.actorId))
    .where(and(eq(auditEvents.teamId, teamId), after(newestFirst, place)))
    .orderBy(...ordered(newestFirst))
    .limit(limit + 1);
}
