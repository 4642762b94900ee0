import "server-only";
import { adopt, asVisitor, type Db } from "@/db/client";
import { findOpenInvitation } from "@/db/queries/invitations";
import { findMember } from "@/db/queries/memberships";
import { findTeam } from "@/db/queries/teams";
import { findUserByEmail } from "@/db/queries/users";
import { DomainError } from "@/lib/errors";
import type { AcceptInvitation } from "@/lib/schemas/invitation";
import type { InvitationPreview } from "@/lib/schemas/team";
import { hashSecret } from "../account/secrets";

/** Whoever holds the secret may act in its team from here on, for this transaction. Needs the setting `secret_hash`. */
export async function openInvitation(tx: Db, secret: string) {
  const invitation = await findOpenInvitation(tx, hashSecret(secret));
  if (!invitation) {
    throw new DomainError("invalid", "This invitation was used, withdrawn or is older than seven days. Ask for a new one.", {}, [
      { pointer: "/secret", detail: "The link was used, withdrawn or is older than seven days. Ask the lead for a new one" },
    ]);
  }
  await adopt(tx, { team_id: invitation.teamId, email: invitation.email });
  return invitation;
}

/** What the holder of the link may know before accepting. */
export function previewInvitation({ secret }: AcceptInvitation): Promise<InvitationPreview> {
  return asVisitor(
    async (tx) => {
      const { teamId, email, role, invitedBy } = await openInvitation(tx, secret);
      const team = await findTeam(tx, teamId);
      const inviter = await findMember(tx, { teamId, userId: invitedBy });
      const hasAccount = (await findUserByEmail(tx, email)) !== undefined;
      return { teamName: team?.name ?? "", email, role, invitedBy: inviter?.name ?? "A lead of the team", hasAccount };
    },
    { secret_hash: hashSecret(secret) },
  );
}
