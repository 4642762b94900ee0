import "server-only";
import { and, eq, isNotNull, sql } from "drizzle-orm";
import type { Db } from "../client";
import { idempotencyKeys } from "../schema/requests";

export type IdempotencyKey = {
  readonly teamId: string;
  readonly userId: string;
  /** Method and path, with the ids in it. */
  readonly route: string;
  readonly key: string;
};

const named = ({ teamId, userId, route, key }: IdempotencyKey) =>
  and(
    eq(idempotencyKeys.teamId, teamId),
    eq(idempotencyKeys.userId, userId),
    eq(idempotencyKeys.route, route),
    eq(idempotencyKeys.key, key),
  );

/** False: an equal key is there. Waits for another transaction that has inserted it and is not at its end. */
export async function claimIdempotencyKey(db: Db, key: IdempotencyKey, bodyHash: string): Promise<boolean> {
  const { teamId, userId, route } = key;
  const claimed = await db
    .insert(idempotencyKeys)
    .values({ teamId, userId, route, key: key.key, bodyHash })
    .onConflictDoNothing()
    .returning({ key: idempotencyKeys.key });
  return claimed.length > 0;
}

export async function findIdempotencyKey(db: Db, key: IdempotencyKey) {
  const [row] = await db
    .select({ bodyHash: idempotencyKeys.bodyHash, reply: idempotencyKeys.reply })
    .from(idempotencyKeys)
    .where(and(named(key), isNotNull(idempotencyKeys.status), sql`${idempotencyKeys.createdAt} > now() - interval '24 hours'`));
  return row;
}

export async function saveIdempotentReply(db: Db, key: IdempotencyKey, status: number, reply: unknown): Promise<void> {
  await db.update(idempotencyKeys).set({ status, reply }).where(named(key));
}

/** Of one person. Rows that another request is dropping just now are left to it. */
export async function dropExpiredIdempotencyKeys(
  db: Db,
  { teamId, userId }: Pick<IdempotencyKey, "teamId" | "userId">,
): Promise<void> {
  await db.execute(sql`
    delete from ${idempotencyKeys} where ctid in (
      select ctid from ${idempotencyKeys}
      where team_id = ${teamId} and user_id = ${userId} and created_at <= now() - interval '24 hours'
      limit 200 for update skip locked)`);
}

/** How long this transaction waits for others from now on; zero: as long as it takes. */
export async function waitAtMost(db: Db, milliseconds: number): Promise<void> {
  await db.execute(sql`select set_config('lock_timeout', ${String(milliseconds)}, true)`);
}

/** How long this transaction may stay open without a statement, while the core computes for it. */
export async function stayOpenFor(db: Db, milliseconds: number): Promise<void> {
  await db.execute(sql`select set_config('idle_in_transaction_session_timeout', ${String(milliseconds)}, true)`);
}
