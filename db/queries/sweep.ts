import "server-only";
import { lt, sql } from "drizzle-orm";
import type { PgTable } from "drizzle-orm/pg-core";
import type { Db } from "../client";
import { passwordResets, sessions } from "../schema/access";
import { designDrafts } from "../schema/design-drafts";
import { outbox } from "../schema/outbox";
import { idempotencyKeys } from "../schema/requests";

const ago = (time: string) => sql`now() - ${time}::interval`;

/** What is due, by its kind. Row security lets no other row go either; see the migration `sweep`. */
const DUE = {
  sessions: { table: sessions, condition: lt(sql`least(${sessions.expiresAt}, ${sessions.revokedAt})`, ago("30 days")) },
  passwordResets: { table: passwordResets, condition: lt(passwordResets.expiresAt, ago("30 days")) },
  mails: { table: outbox, condition: lt(sql`coalesce(${outbox.sentAt}, ${outbox.createdAt})`, ago("30 days")) },
  idempotencyKeys: { table: idempotencyKeys, condition: lt(idempotencyKeys.createdAt, ago("24 hours")) },
  drafts: { table: designDrafts, condition: lt(designDrafts.updatedAt, ago("90 days")) },
} as const satisfies Record<string, { readonly table: PgTable; readonly condition: ReturnType<typeof lt> }>;

export type Kind = keyof typeof DUE;
export const KINDS = Object.keys(DUE) as Kind[];

/** Needs the setting `sweeping`. At most `limit` of one kind, so that no statement takes long; how many went. */
export async function removeDue(db: Db, kind: Kind, limit: number): Promise<number> {
  const { table, condition } = DUE[kind];
  const removed = await db.execute(
    sql`delete from ${table} where ctid in (select ctid from ${table} where ${condition} limit ${limit})`,
  );
  return removed.rowCount ?? 0;
}
