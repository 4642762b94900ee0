import "server-only";
import { asVisitor } from "@/db/client";
import { endResetsOf } from "@/db/queries/password-resets";
import { revokeSessionsOf } from "@/db/queries/sessions";
import { findUser, replacePasswordHash } from "@/db/queries/users";
import { DomainError } from "@/lib/errors";
import { passwordChangedMail } from "@/lib/mail/letters";
import type { ChangePassword } from "@/lib/schemas/account";
import type { Person } from "../context";
import { postMail } from "../post-mail";
import { countTry, forgetTries } from "./guessing";
import { hashPassword, passwordMatches } from "./password-hash";
import { refuseWeakPassword } from "./refuse-weak-password";

/** Asks for the present password: an open screen is not enough. Ends every other session. */
export async function changePassword(person: Person, { currentPassword, newPassword }: ChangePassword): Promise<void> {
  const { userId, sessionId, name, email } = person;
  const settings = { user_id: userId };
  await countTry(userId, "change-password");
  const user = await asVisitor((tx) => findUser(tx, userId), settings);
  if (!user || !(await passwordMatches(currentPassword, user.passwordHash))) throw wrongPassword();
  await forgetTries(userId, "change-password");
  refuseWeakPassword(newPassword, [name, email], "/newPassword");
  const passwordHash = await hashPassword(newPassword);
  await asVisitor(async (tx) => {
    if (!(await replacePasswordHash(tx, userId, user.passwordHash, passwordHash))) throw wrongPassword();
    await endResetsOf(tx, userId);
    await revokeSessionsOf(tx, userId, sessionId);
    await postMail(tx, null, passwordChangedMail(email));
  }, settings);
}

function wrongPassword(): DomainError {
  return new DomainError("invalid", "The present password is not right, so nothing was changed.", {}, [
    { pointer: "/currentPassword", detail: "This is not your present password" },
  ]);
}
