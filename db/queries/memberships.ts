import "server-only";
import { and, asc, eq, isNull, sql } from "drizzle-orm";
import type { Role } from "@/lib/schemas/team";
import type { Db } from "../client";
import { memberships, users } from "../schema/people";

export type MemberKey = { readonly teamId: string; readonly userId: string };
const current = ({ teamId, userId }: MemberKey) =>
  and(eq(memberships.teamId, teamId), eq(memberships.userId, userId), isNull(memberships.removedAt));

/** Also brings a removed member back. Undefined: is a member already, and keeps the role they have. */
export async function addMember(db: Db, { teamId, userId }: MemberKey, role: Role) {
  const [row] = await db
    .insert(memberships)
    .values({ teamId, userId, role })
    .onConflictDoUpdate({
      target: [memberships.teamId, memberships.userId],
      set: { role, removedAt: null },
      setWhere: sql`${memberships.removedAt} is not null`,
    })
    .returning();
  return row;
}

const member = {
  userId: memberships.userId,
  name: users.name,
  email: users.email,
  role: memberships.role,
  joinedAt: memberships.createdAt,
};

export async function findMember(db: Db, key: MemberKey) {
  const [row] = await db.select(member).from(memberships).innerJoin(users, eq(users.id, memberships.userId)).where(current(key));
  return row;
}

export async function listMembers(db: Db, teamId: string) {
  return db
    .select(member)
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(and(eq(memberships.teamId, teamId), isNull(memberships.removedAt)))
    .orderBy(asc(users.name), asc(memberships.userId));
}

/** Locks them, so that of two leads who step down at once the second sees that the first has gone. */
export async function lockLeads(db: Db, teamId: string): Promise<readonly string[]> {
  const rows = await db
    .select({ userId: memberships.userId })
    .from(memberships)
    .where(and(eq(memberships.teamId, teamId), eq(memberships.role, "lead"), isNull(memberships.removedAt)))
    .orderBy(asc(memberships.userId))
    .for("update");
  return rows.map((row) => row.userId);
}

export async function setRole(db: Db, key: MemberKey, role: Role): Promise<boolean> {
  const changed = await db.update(memberships).set({ role }).where(current(key)).returning({ userId: memberships.userId });
  return changed.length === 1;
}

export async function endMembership(db: Db, key: MemberKey): Promise<boolean> {
  const ended = await db
    .update(memberships)
    .set({ removedAt: sql`now()` })
    .where(current(key))
    .returning({ userId: memberships.userId });
  return ended.length === 1;
}
