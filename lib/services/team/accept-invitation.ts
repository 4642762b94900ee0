import "server-only";
import { randomUUID } from "node:crypto";
import { adopt, asVisitor, type Db } from "@/db/client";
import { acceptInvitationRow } from "@/db/queries/invitations";
import { addMember } from "@/db/queries/memberships";
import type { Rate } from "@/db/queries/rate-limits";
import { moveSession } from "@/db/queries/sessions";
import { insertUser } from "@/db/queries/users";
import { DomainError } from "@/lib/errors";
import type { AcceptInvitation, JoinByInvitation } from "@/lib/schemas/invitation";
import type { Role } from "@/lib/schemas/team";
import { countUse } from "../account/guessing";
import { hashPassword } from "../account/password-hash";
import { refuseWeakPassword } from "../account/refuse-weak-password";
import { hashSecret } from "../account/secrets";
import { refuseTakenAddress } from "../account/sign-up";
import { recordEvent } from "../audit";
import type { Person, Visitor } from "../context";
import { openInvitation, previewInvitation } from "./open-invitation";

const joins: Rate = { name: "join", points: 20, seconds: 3600 };

/** By somebody signed in with the invited address; their session goes on in the new team. */
export function acceptInvitation(person: Person, { secret }: AcceptInvitation): Promise<{ teamId: string }> {
  return asVisitor(
    async (tx) => {
      const invitation = await openInvitation(tx, secret);
      if (invitation.email !== person.email) {
        const words = `This invitation is for ${invitation.email}; you are signed in as ${person.email}.`;
        throw new DomainError("forbidden", words);
      }
      await join(tx, invitation, person);
      await moveSession(tx, person, invitation.teamId);
      return { teamId: invitation.teamId };
    },
    { user_id: person.userId, secret_hash: hashSecret(secret) },
  );
}

/** By somebody new: the link proves the address, so the account is theirs at once. Signing in is the next step. */
export async function joinByInvitation(visitor: Visitor, { secret, name, password }: JoinByInvitation) {
  await countUse(joins, visitor.address);
  const { email, teamName } = await previewInvitation({ secret });
  refuseWeakPassword(password, [name, email, teamName], "/password");
  const passwordHash = await hashPassword(password);
  const userId = randomUUID();
  const joining = asVisitor(
    async (tx) => {
      const invitation = await openInvitation(tx, secret);
      await adopt(tx, { user_id: userId });
      await insertUser(tx, { id: userId, email: invitation.email, name, passwordHash });
      await join(tx, invitation, { userId, requestId: visitor.requestId });
      return { userId, teamId: invitation.teamId, email: invitation.email };
    },
    { secret_hash: hashSecret(secret) },
  );
  return joining.catch(refuseTakenAddress);
}

type Joining = { readonly id: string; readonly teamId: string; readonly role: Role };

async function join(tx: Db, { id, teamId, role }: Joining, { userId, requestId }: Pick<Person, "userId" | "requestId">) {
  await addMember(tx, { teamId, userId }, role);
  await acceptInvitationRow(tx, { teamId, id });
  await recordEvent(tx, { teamId, userId, requestId }, "member.joined", { type: "member", id: userId }, { role });
}
