import "server-only";
import { and, desc, eq, inArray, isNull, or, sql } from "drizzle-orm";
import type { Db } from "../client";
import { outbox } from "../schema/outbox";
import { memberships, users } from "../schema/people";

export type Mail = { readonly recipient: string; readonly subject: string; readonly text: string; readonly html: string };
export type OutboxRow = typeof outbox.$inferSelect;

/** `id` is made by the caller: row security lets nobody read back a mail that belongs to no team. */
export async function insertMail(db: Db, mail: Mail & { readonly id: string; readonly teamId: string | null }): Promise<void> {
  await db.insert(outbox).values(mail);
}

/** The queue learns of it with the commit and not before. */
export async function enqueueMail(db: Db, id: string): Promise<void> {
  await db.execute(sql`select app.enqueue_mail(${id}::uuid)`);
}

/** Needs the setting `outbox_id`. */
export async function findUnsentMail(db: Db, id: string): Promise<OutboxRow | undefined> {
  const [row] = await db
    .select()
    .from(outbox)
    .where(and(eq(outbox.id, id), isNull(outbox.sentAt)));
  return row;
}

export async function markMailSent(db: Db, id: string): Promise<void> {
  await db
    .update(outbox)
    .set({ sentAt: sql`now()`, attempts: sql`${outbox.attempts} + 1`, lastError: null })
    .where(eq(outbox.id, id));
}

export async function markMailFailed(db: Db, id: string, reason: string): Promise<void> {
  await db
    .update(outbox)
    .set({ attempts: sql`${outbox.attempts} + 1`, lastError: reason.slice(0, 500) })
    .where(and(eq(outbox.id, id), isNull(outbox.sentAt)));
}

/** Mail of the team, and mail to its present members as such. The latter needs the setting `outbox_open`. */
export async function listMail(db: Db, teamId: string): Promise<OutboxRow[]> {
  const ofMembers = db
    .select({ email: users.email })
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(and(eq(memberships.teamId, teamId), isNull(memberships.removedAt)));
  return db
    .select()
    .from(outbox)
    .where(or(eq(outbox.teamId, teamId), and(isNull(outbox.teamId), inArray(outbox.recipient, ofMembers))))
    .orderBy(desc(outbox.createdAt), desc(outbox.id))
    .limit(100);
}
