import "server-only";
import { and, desc, eq, gt, isNull, sql } from "drizzle-orm";
import type { Db } from "../client";
import { invitations } from "../schema/access";
import { users } from "../schema/people";

type NewInvitation = Pick<typeof invitations.$inferInsert, "teamId" | "invitedBy" | "email" | "role" | "tokenHash">;
const open = and(isNull(invitations.acceptedAt), isNull(invitations.withdrawnAt), gt(invitations.expiresAt, sql`now()`));

export async function insertInvitation(db: Db, invitation: NewInvitation, lifetimeSeconds: number) {
  const [row] = await db
    .insert(invitations)
    .values({ ...invitation, expiresAt: sql`now() + make_interval(secs => ${lifetimeSeconds})` })
    .returning();
  return row;
}

export async function listOpenInvitations(db: Db, teamId: string) {
  return db
    .select({
      id: invitations.id,
      email: invitations.email,
      role: invitations.role,
      invitedBy: users.name,
      createdAt: invitations.createdAt,
      expiresAt: invitations.expiresAt,
    })
    .from(invitations)
    .innerJoin(users, eq(users.id, invitations.invitedBy))
    .where(and(eq(invitations.teamId, teamId), open))
    .orderBy(desc(invitations.createdAt), desc(invitations.id))
    .limit(200);
}

/** Needs the setting `secret_hash`. The row is locked: of two who use one link only the first joins. */
export async function findOpenInvitation(db: Db, tokenHash: string) {
  const [row] = await db
    .select()
    .from(invitations)
    .where(and(eq(invitations.tokenHash, tokenHash), open))
    .for("update");
  return row;
}

export async function acceptInvitationRow(db: Db, { teamId, id }: { teamId: string; id: string }): Promise<void> {
  await db
    .update(invitations)
    .set({ acceptedAt: sql`now()` })
    .where(and(eq(invitations.teamId, teamId), eq(invitations.id, id)));
}

export async function withdrawInvitationRow(db: Db, { teamId, id }: { teamId: string; id: string }) {
  const [row] = await db
    .update(invitations)
    .set({ withdrawnAt: sql`now()` })
    .where(and(eq(invitations.teamId, teamId), eq(invitations.id, id), open))
    .returning();
  return row;
}

/** A new invitation to the same address takes the place of the older ones, whose links end. */
export async function withdrawInvitationsTo(db: Db, teamId: string, email: string): Promise<void> {
  await db
    .update(invitations)
    .set({ withdrawnAt: sql`now()` })
    .where(and(eq(invitations.teamId, teamId), eq(invitations.email, email), open));
}
