import "server-only";
import { and, eq, gt, isNull, sql } from "drizzle-orm";
import type { Db } from "../client";
import { passwordResets } from "../schema/access";

const unused = and(isNull(passwordResets.usedAt), gt(passwordResets.expiresAt, sql`now()`));

export async function insertReset(db: Db, reset: { userId: string; tokenHash: string }, lifetimeSeconds: number): Promise<void> {
  await db.insert(passwordResets).values({ ...reset, expiresAt: sql`now() + make_interval(secs => ${lifetimeSeconds})` });
}

/** Needs the setting `secret_hash`. */
export async function findReset(db: Db, tokenHash: string): Promise<{ userId: string } | undefined> {
  const [row] = await db
    .select({ userId: passwordResets.userId })
    .from(passwordResets)
    .where(and(eq(passwordResets.tokenHash, tokenHash), unused));
  return row;
}

/** Needs the setting `secret_hash`. One statement, so that a link works once. */
export async function takeReset(db: Db, tokenHash: string): Promise<{ userId: string } | undefined> {
  const [row] = await db
    .update(passwordResets)
    .set({ usedAt: sql`now()` })
    .where(and(eq(passwordResets.tokenHash, tokenHash), unused))
    .returning({ userId: passwordResets.userId });
  return row;
}

/** Older links end as soon as one was used, or the password was changed otherwise. */
export async function endResetsOf(db: Db, userId: string): Promise<void> {
  await db
    .update(passwordResets)
    .set({ usedAt: sql`now()` })
    .where(and(eq(passwordResets.userId, userId), unused));
}
