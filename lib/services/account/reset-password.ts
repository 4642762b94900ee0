import "server-only";
import { adopt, asVisitor } from "@/db/client";
import { endResetsOf, findReset, takeReset } from "@/db/queries/password-resets";
import type { Rate } from "@/db/queries/rate-limits";
import { revokeSessionsOf } from "@/db/queries/sessions";
import { findUser, setPasswordHash } from "@/db/queries/users";
import { DomainError } from "@/lib/errors";
import { passwordChangedMail } from "@/lib/mail/letters";
import type { ResetPassword } from "@/lib/schemas/account";
import type { Visitor } from "../context";
import { postMail } from "../post-mail";
import { countUse } from "./guessing";
import { hashPassword } from "./password-hash";
import { refuseWeakPassword } from "./refuse-weak-password";
import { hashSecret } from "./secrets";

const uses: Rate = { name: "reset-use", points: 20, seconds: 3600 };

/** The link works once. Every session of the account ends, for whoever asked may have lost it to somebody. */
export async function resetPassword(visitor: Visitor, { secret, password }: ResetPassword): Promise<void> {
  await countUse(uses, visitor.address);
  const hash = hashSecret(secret);
  const settings = { secret_hash: hash };
  const owner = await asVisitor(async (tx) => {
    const reset = await findReset(tx, hash);
    if (!reset) return undefined;
    await adopt(tx, { user_id: reset.userId });
    return findUser(tx, reset.userId);
  }, settings);
  if (!owner) throw usedUp();
  refuseWeakPassword(password, [owner.name, owner.email], "/password");
  const passwordHash = await hashPassword(password);
  await asVisitor(async (tx) => {
    const taken = await takeReset(tx, hash);
    if (!taken) throw usedUp();
    await adopt(tx, { user_id: taken.userId });
    await setPasswordHash(tx, taken.userId, passwordHash);
    await endResetsOf(tx, taken.userId);
    await revokeSessionsOf(tx, taken.userId, null);
    await postMail(tx, null, passwordChangedMail(owner.email));
  }, settings);
}

function usedUp(): DomainError {
  return new DomainError("invalid", "This link was used already or is older than 60 minutes. Ask for a new one.", {}, [
    { pointer: "/secret", detail: "The link was used already or is older than 60 minutes. Ask for a new one" },
  ]);
}
