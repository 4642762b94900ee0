import "server-only";
import { createTransport } from "nodemailer";
import { asVisitor } from "@/db/client";
import { findUnsentMail, markMailFailed, markMailSent } from "@/db/queries/outbox";
import { env } from "@/lib/env";

const PATIENCE_MS = 10_000;

type Transport = ReturnType<typeof createTransport>;
let kept: { readonly url: string; readonly transport: Transport } | undefined;

function transportTo(url: string): Transport {
  if (kept?.url === url) return kept.transport;
  kept?.transport.close();
  const transport = createTransport(url, {
    connectionTimeout: PATIENCE_MS,
    greetingTimeout: PATIENCE_MS,
    socketTimeout: PATIENCE_MS,
  });
  kept = { url, transport };
  return transport;
}

/**
 * Sends one mail of the outbox, or leaves it there where no server is set. Sent twice it is at worst received twice with one
 * Message-ID, since a process may die between the server's yes and our note of it.
 */
export async function sendMail(outboxId: string): Promise<"sent" | "kept" | "nothing-to-send"> {
  const mail = await asVisitor((tx) => findUnsentMail(tx, outboxId), { outbox_id: outboxId });
  if (!mail) return "nothing-to-send";
  const { SMTP_URL, MAIL_FROM, NEXTAUTH_URL } = env();
  if (!SMTP_URL) return "kept";
  try {
    await transportTo(SMTP_URL).sendMail({
      from: MAIL_FROM,
      to: { name: "", address: mail.recipient },
      subject: mail.subject,
      text: mail.text,
      html: mail.html,
      messageId: `<${mail.id}@${new URL(NEXTAUTH_URL).hostname}>`,
      headers: { "Auto-Submitted": "auto-generated" },
      disableFileAccess: true,
      disableUrlAccess: true,
    });
  } catch (error) {
    const reason = error instanceof Error ? error.message : "unknown";
    await asVisitor((tx) => markMailFailed(tx, outboxId, reason), { outbox_id: outboxId });
    throw error;
  }
  await asVisitor((tx) => markMailSent(tx, outboxId), { outbox_id: outboxId });
  return "sent";
}
