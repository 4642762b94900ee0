import { withClient } from "@/lib/commands/databases.mjs";

export function lastMailTo(
  adminUrl: string,
  email: string,
): Promise<{ subject: string; text: string; html: string } | undefined> {
  return withClient(adminUrl, async (client) => {
    const { rows } = await client.query(
      "select subject, text, html from outbox where recipient = $1 order by created_at desc limit 1",
      [email],
    );
    return rows.at(0);
  });
}

/** The secret of the link in the newest mail to `email`. */
export async function lastSecretTo(adminUrl: string, email: string): Promise<string> {
  const mail = await lastMailTo(adminUrl, email);
  const found = /\/(?:reset-password|invitations)\/([A-Za-z0-9_-]{43})\b/.exec(mail?.text ?? "");
  if (!found) throw new Error(`no mail with a link to ${email}`);
  return found[1];
}
