import "server-only";
import { and, desc, eq, gt, isNull, lt, or, sql } from "drizzle-orm";
import type { Db } from "../client";
import { accessTokens } from "../schema/access";
import type { MemberKey } from "./memberships";

type NewToken = Pick<typeof accessTokens.$inferInsert, "teamId" | "userId" | "name" | "tokenHash" | "scope">;
export type AccessTokenRow = typeof accessTokens.$inferSelect;
const ownedBy = ({ teamId, userId }: MemberKey) => and(eq(accessTokens.teamId, teamId), eq(accessTokens.userId, userId));
const live = and(isNull(accessTokens.revokedAt), gt(accessTokens.expiresAt, sql`now()`));

export async function insertAccessToken(db: Db, token: NewToken, lifetimeSeconds: number): Promise<AccessTokenRow> {
  const [row] = await db
    .insert(accessTokens)
    .values({ ...token, expiresAt: sql`now() + make_interval(secs => ${lifetimeSeconds})` })
    .returning();
  return row;
}

export async function listAccessTokens(db: Db, key: MemberKey): Promise<AccessTokenRow[]> {
  return db
    .select()
    .from(accessTokens)
    .where(ownedBy(key))
    .orderBy(desc(accessTokens.createdAt), desc(accessTokens.id))
    .limit(200);
}

/** Needs the setting `secret_hash`. */
export async function findLiveAccessToken(db: Db, tokenHash: string): Promise<AccessTokenRow | undefined> {
  const [row] = await db
    .select()
    .from(accessTokens)
    .where(and(eq(accessTokens.tokenHash, tokenHash), live));
  return row;
}

/** At most once a minute. */
export async function touchAccessToken(db: Db, { teamId, id }: { teamId: string; id: string }): Promise<void> {
  const longAgo = or(isNull(accessTokens.lastUsedAt), lt(accessTokens.lastUsedAt, sql`now() - interval '1 minute'`));
  await db
    .update(accessTokens)
    .set({ lastUsedAt: sql`now()` })
    .where(and(eq(accessTokens.teamId, teamId), eq(accessTokens.id, id), longAgo));
}

export async function revokeAccessToken(db: Db, key: MemberKey, id: string): Promise<AccessTokenRow | undefined> {
  const [row] = await db
    .update(accessTokens)
    .set({ revokedAt: sql`now()` })
    .where(and(ownedBy(key), eq(accessTokens.id, id), isNull(accessTokens.revokedAt)))
    .returning();
  return row;
}

export async function revokeAccessTokensOf(db: Db, key: MemberKey): Promise<void> {
  await db
    .update(accessTokens)
    .set({ revokedAt: sql`now()` })
    .where(and(ownedBy(key), isNull(accessTokens.revokedAt)));
}

export async function countLiveAccessTokens(db: Db, key: MemberKey): Promise<number> {
  return db.$count(accessTokens, and(ownedBy(key), live));
}
