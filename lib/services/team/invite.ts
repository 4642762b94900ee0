import "server-only";
import { inTransaction } from "@/db/client";
import { insertInvitation, withdrawInvitationsTo } from "@/db/queries/invitations";
import { findMember, listMembers } from "@/db/queries/memberships";
import type { Rate } from "@/db/queries/rate-limits";
import { findTeam } from "@/db/queries/teams";
import { env } from "@/lib/env";
import { DomainError, NotFound } from "@/lib/errors";
import { invitationMail } from "@/lib/mail/letters";
import { allow } from "@/lib/permissions/allow";
import type { Invite } from "@/lib/schemas/invitation";
import type { Invitation } from "@/lib/schemas/team";
import { countUse } from "../account/guessing";
import { newSecret } from "../account/secrets";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { postMail } from "../post-mail";

const LINK_SECONDS = 7 * 24 * 3600;
const perTeam: Rate = { name: "invite", points: 100, seconds: 24 * 3600 };

/** By mail. A new invitation to the same address ends the older one. */
export async function invite(ctx: Context, input: Invite): Promise<Invitation> {
  allow(ctx, "team:manage");
  await countUse(perTeam, ctx.teamId);
  return (await issue(ctx, input)).invitation;
}

/** The same, with the secret of the link: for the demo team, whose people are made without a mailbox. */
export async function issue(ctx: Context, { email, role }: Invite): Promise<{ invitation: Invitation; secret: string }> {
  allow(ctx, "team:manage");
  const { secret, hash } = newSecret();
  return inTransaction(ctx, async (tx) => {
    const { teamId, userId } = ctx;
    const members = await listMembers(tx, teamId);
    if (members.some((member) => member.email === email)) throw alreadyMember();
    const [team, inviter] = [await findTeam(tx, teamId), await findMember(tx, ctx)];
    if (!team || !inviter) throw new NotFound("Team");
    await withdrawInvitationsTo(tx, teamId, email);
    const row = await insertInvitation(tx, { teamId, invitedBy: userId, email, role, tokenHash: hash }, LINK_SECONDS);
    const url = `${new URL(env().NEXTAUTH_URL).origin}/invitations/${secret}`;
    await postMail(tx, teamId, invitationMail({ recipient: email, teamName: team.name, inviter: inviter.name, role, url }));
    await recordEvent(tx, ctx, "invitation.sent", { type: "invitation", id: row.id }, { role });
    const { id, createdAt, expiresAt } = row;
    const times = { createdAt: createdAt.toISOString(), expiresAt: expiresAt.toISOString() };
    return { invitation: { id, email, role, invitedBy: inviter.name, ...times }, secret };
  });
}

function alreadyMember(): DomainError {
  return new DomainError("conflict", "Somebody with this address belongs to the team already.", {}, [
    { pointer: "/email", detail: "Belongs to the team already" },
  ]);
}
