import "server-only";
import { adopt, asVisitor } from "@/db/client";
import { insertReset } from "@/db/queries/password-resets";
import type { Rate } from "@/db/queries/rate-limits";
import { findUserByEmail } from "@/db/queries/users";
import { env } from "@/lib/env";
import { resetMail } from "@/lib/mail/letters";
import type { RequestReset } from "@/lib/schemas/account";
import type { Visitor } from "../context";
import { postMail } from "../post-mail";
import { countUse, mayUse } from "./guessing";
import { newSecret } from "./secrets";

const LINK_SECONDS = 3600;
const askers: Rate = { name: "reset-place", points: 20, seconds: 3600 };
const mails: Rate = { name: "reset-mail", points: 3, seconds: 3600 };
/** Longer than the work takes with or without an account, so that the time tells nothing. */
const ANSWER_MS = 300;

/** Answers alike whether the address has an account or not; the rest is in the mail. */
export async function requestReset(visitor: Visitor, { email }: RequestReset): Promise<void> {
  await countUse(askers, visitor.address);
  const pause = new Promise((resolve) => setTimeout(resolve, ANSWER_MS));
  await Promise.all([pause, sendLink(email)]);
}

async function sendLink(email: string): Promise<void> {
  if (!(await mayUse(mails, email))) return;
  const { secret, hash } = newSecret();
  await asVisitor(
    async (tx) => {
      const user = await findUserByEmail(tx, email);
      if (!user) return;
      await adopt(tx, { user_id: user.id });
      await insertReset(tx, { userId: user.id, tokenHash: hash }, LINK_SECONDS);
      await postMail(tx, null, resetMail(email, `${new URL(env().NEXTAUTH_URL).origin}/reset-password/${secret}`));
    },
    { email },
  );
}
