import "server-only";
import { asVisitor } from "@/db/client";
import { insertSession, lastTeamOf } from "@/db/queries/sessions";
import { listTeamsOf } from "@/db/queries/teams";
import { findUserByEmail } from "@/db/queries/users";
import type { SignIn } from "@/lib/schemas/account";
import type { Visitor } from "../context";
import { countTry, forgetTries } from "./guessing";
import { passwordMatches } from "./password-hash";
import { SESSION_SECONDS } from "./session-times";

export type SignedIn = { readonly userId: string; readonly sessionId: string };

/**
 * Undefined for a wrong password and for an unknown address alike, after the same work.
 * @throws DomainError too-many-requests after five wrong tries from one address, busy when too many sign in at once
 */
export async function signIn(visitor: Visitor, { email, password }: SignIn): Promise<SignedIn | undefined> {
  await countTry(email, visitor.address);
  const user = await asVisitor((tx) => findUserByEmail(tx, email), { email });
  if (!(await passwordMatches(password, user?.passwordHash)) || !user) return undefined;
  await forgetTries(email, visitor.address);
  return asVisitor(
    async (tx) => {
      const teams = await listTeamsOf(tx, user.id);
      const last = await lastTeamOf(tx, user.id);
      const teamId = (teams.find(({ id }) => id === last) ?? teams.at(0))?.id ?? null;
      const session = await insertSession(tx, { userId: user.id, teamId, lifetimeSeconds: SESSION_SECONDS.absolute });
      return { userId: user.id, sessionId: session.id };
    },
    { user_id: user.id },
  );
}
