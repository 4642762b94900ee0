import "server-only";
import { and, desc, eq, gt, isNull, lt, ne, type SQL, sql } from "drizzle-orm";
import type { Db } from "../client";
import { sessions } from "../schema/access";
import { memberships, users } from "../schema/people";

export type SessionKey = { readonly userId: string; readonly sessionId: string };
const own = ({ userId, sessionId }: SessionKey) => and(eq(sessions.userId, userId), eq(sessions.id, sessionId));

export async function insertSession(db: Db, session: { userId: string; teamId: string | null; lifetimeSeconds: number }) {
  const [row] = await db
    .insert(sessions)
    .values({
      userId: session.userId,
      teamId: session.teamId,
      expiresAt: sql`now() + make_interval(secs => ${session.lifetimeSeconds})`,
    })
    .returning();
  return row;
}

/** A session that is neither ended nor idle too long, with who it is and the role held now in the team they work in. */
export async function findLiveSession(db: Db, key: SessionKey, idleSeconds: number) {
  const [row] = await db
    .select({
      teamId: memberships.teamId,
      role: memberships.role,
      name: users.name,
      email: users.email,
      stale: sql<boolean>`${sessions.lastSeenAt} < now() - interval '1 minute'`,
    })
    .from(sessions)
    .innerJoin(users, eq(users.id, sessions.userId))
    .leftJoin(
      memberships,
      and(eq(memberships.teamId, sessions.teamId), eq(memberships.userId, sessions.userId), isNull(memberships.removedAt)),
    )
    .where(
      and(
        own(key),
        isNull(sessions.revokedAt),
        gt(sessions.expiresAt, sql`now()`),
        gt(sessions.lastSeenAt, sql`now() - make_interval(secs => ${idleSeconds})`),
      ),
    );
  return row;
}

/** Where they worked last, to go on there. */
export async function lastTeamOf(db: Db, userId: string): Promise<string | null> {
  const [row] = await db
    .select({ teamId: sessions.teamId })
    .from(sessions)
    .where(eq(sessions.userId, userId))
    .orderBy(desc(sessions.lastSeenAt))
    .limit(1);
  return row?.teamId ?? null;
}

/** At most once a minute, so that reading pages does not mean writing rows. */
export async function touchSession(db: Db, key: SessionKey): Promise<void> {
  await db
    .update(sessions)
    .set({ lastSeenAt: sql`now()` })
    .where(and(own(key), lt(sessions.lastSeenAt, sql`now() - interval '1 minute'`)));
}

export async function moveSession(db: Db, key: SessionKey, teamId: string): Promise<boolean> {
  const moved = await db
    .update(sessions)
    .set({ teamId })
    .where(and(own(key), isNull(sessions.revokedAt)))
    .returning({ id: sessions.id });
  return moved.length === 1;
}

async function revoke(db: Db, which: SQL | undefined): Promise<number> {
  const ended = await db
    .update(sessions)
    .set({ revokedAt: sql`now()` })
    .where(and(which, isNull(sessions.revokedAt)))
    .returning({ id: sessions.id });
  return ended.length;
}

export const revokeSession = (db: Db, key: SessionKey) => revoke(db, own(key));

/** All of a person's sessions, or all but the one they are using. */
export const revokeSessionsOf = (db: Db, userId: string, except: string | null) =>
  revoke(db, and(eq(sessions.userId, userId), except === null ? undefined : ne(sessions.id, except)));

/** Those of a removed member that work in this team; sessions in other teams are not this team's business. */
export const revokeTeamSessions = (db: Db, { teamId, userId }: { teamId: string; userId: string }) =>
  revoke(db, and(eq(sessions.teamId, teamId), eq(sessions.userId, userId)));
