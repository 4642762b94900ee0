import "server-only";
import { adopt, inTransaction } from "@/db/client";
import { listMail } from "@/db/queries/outbox";
import { env } from "@/lib/env";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { OutboxMail } from "@/lib/schemas/team";
import type { Context } from "../context";

/** The demo's stand-in for a mailbox: the newest hundred mails of the team and to its members. Does not exist outside the demo. */
export async function listOutbox(ctx: Context): Promise<OutboxMail[]> {
  if (!env().GAINWRIGHT_DEMO) throw new NotFound("Outbox");
  allow(ctx, "outbox:read");
  return inTransaction(ctx, async (tx) => {
    await adopt(tx, { outbox_open: "on" });
    const rows = await listMail(tx, ctx.teamId);
    return rows.map(({ id, recipient, subject, text, createdAt, sentAt, lastError }) => ({
      id,
      recipient,
      subject,
      text,
      createdAt: createdAt.toISOString(),
      sentAt: sentAt?.toISOString() ?? null,
      lastError,
    }));
  });
}
