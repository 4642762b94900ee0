import "server-only";
import { type Db, inTransaction } from "@/db/client";
import { revokeAccessTokensOf } from "@/db/queries/access-tokens";
import { endMembership, findMember, listMembers as listRows, lockLeads, setRole } from "@/db/queries/memberships";
import { revokeTeamSessions } from "@/db/queries/sessions";
import { DomainError, NotFound } from "@/lib/errors";
import { allow, isAllowed } from "@/lib/permissions/allow";
import type { ChangeRole, Member } from "@/lib/schemas/team";
import { recordEvent } from "../audit";
import type { Context } from "../context";

type Row = Awaited<ReturnType<typeof listRows>>[number];

export function listMembers(ctx: Context): Promise<Member[]> {
  allow(ctx, "team:read");
  return inTransaction(ctx, async (tx) => (await listRows(tx, ctx.teamId)).map((row) => toMember(ctx, row)));
}

/** Counts from that person's next request on. */
export function changeRole(ctx: Context, userId: string, { role }: ChangeRole): Promise<Member> {
  allow(ctx, "team:manage");
  return inTransaction(ctx, async (tx) => {
    const key = { teamId: ctx.teamId, userId };
    if (role !== "lead") await keepALead(tx, key);
    const before = await findMember(tx, key);
    if (!before || !(await setRole(tx, key, role))) throw new NotFound("Member");
    await recordEvent(tx, ctx, "member.role-changed", { type: "member", id: userId }, { from: before.role, to: role });
    return toMember(ctx, { ...before, role });
  });
}

/** A lead removes anybody, anybody leaves. Sessions and tokens in this team end at once; what they made stays, with their name. */
export function removeMember(ctx: Context, userId: string): Promise<void> {
  allow(ctx, userId === ctx.userId ? "account:own" : "team:manage");
  return inTransaction(ctx, async (tx) => {
    const key = { teamId: ctx.teamId, userId };
    await keepALead(tx, key);
    if (!(await endMembership(tx, key))) throw new NotFound("Member");
    await revokeTeamSessions(tx, key);
    await revokeAccessTokensOf(tx, key);
    const kind = userId === ctx.userId ? "member.left" : "member.removed";
    await recordEvent(tx, ctx, kind, { type: "member", id: userId });
  });
}

/** Locks the leads first, so that two who step down at once do not leave a team without one. */
async function keepALead(tx: Db, { teamId, userId }: { teamId: string; userId: string }): Promise<void> {
  const leads = await lockLeads(tx, teamId);
  if (leads.length === 1 && leads[0] === userId) {
    throw new DomainError("conflict", "A team keeps at least one lead. Make somebody else a lead first.");
  }
}

/** Addresses are for leads, who invite and remove; others see their own. */
function toMember(ctx: Context, { userId, name, email, role, joinedAt }: Row): Member {
  const shown = userId === ctx.userId || isAllowed(ctx, "team:manage");
  return { userId, name, email: shown ? email : null, role, joinedAt: joinedAt.toISOString() };
}
