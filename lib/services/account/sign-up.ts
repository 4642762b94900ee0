import "server-only";
import { randomUUID } from "node:crypto";
import { asVisitor } from "@/db/client";
import { addMember } from "@/db/queries/memberships";
import type { Rate } from "@/db/queries/rate-limits";
import { insertTeam } from "@/db/queries/teams";
import { insertUser } from "@/db/queries/users";
import { brokenConstraint } from "@/db/with-retries";
import { DomainError } from "@/lib/errors";
import type { SignUp } from "@/lib/schemas/account";
import { recordEvent } from "../audit";
import type { Visitor } from "../context";
import { countUse } from "./guessing";
import { hashPassword } from "./password-hash";
import { refuseWeakPassword } from "./refuse-weak-password";

const signUps: Rate = { name: "sign-up", points: 20, seconds: 3600 };

/** Makes an account and its team, whose lead it is. Signing in is the next step, through the same door as ever. */
export async function signUp(visitor: Visitor, { name, email, password, teamName }: SignUp) {
  await countUse(signUps, visitor.address);
  refuseWeakPassword(password, [name, email, teamName], "/password");
  const passwordHash = await hashPassword(password);
  const userId = randomUUID();
  const teamId = randomUUID();
  const making = asVisitor(
    async (tx) => {
      await insertUser(tx, { id: userId, email, name, passwordHash });
      await insertTeam(tx, { id: teamId, name: teamName });
      await addMember(tx, { teamId, userId }, "lead");
      await recordEvent(tx, { teamId, userId, requestId: visitor.requestId }, "team.started", { type: "team", id: teamId });
    },
    { user_id: userId, team_id: teamId },
  );
  await making.catch(refuseTakenAddress);
  return { userId, teamId };
}

export function refuseTakenAddress(error: unknown): never {
  if (brokenConstraint(error) !== "users_email_unique") throw error;
  throw new DomainError("conflict", "There is an account with this address already. Sign in, or ask for a new password.", {}, [
    { pointer: "/email", detail: "This address has an account already" },
  ]);
}
