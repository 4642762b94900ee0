import "server-only";
import { inTransaction } from "@/db/client";
import { listOpenInvitations, withdrawInvitationRow } from "@/db/queries/invitations";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Invitation } from "@/lib/schemas/team";
import { recordEvent } from "../audit";
import type { Context } from "../context";

/** Those that can still be accepted, newest first. */
export function listInvitations(ctx: Context): Promise<Invitation[]> {
  allow(ctx, "team:manage");
  return inTransaction(ctx, async (tx) => {
    const rows = await listOpenInvitations(tx, ctx.teamId);
    return rows.map((row) => ({ ...row, createdAt: row.createdAt.toISOString(), expiresAt: row.expiresAt.toISOString() }));
  });
}

/** The link ends at once. */
export function withdrawInvitation(ctx: Context, invitationId: string): Promise<void> {
  allow(ctx, "team:manage");
  return inTransaction(ctx, async (tx) => {
    const row = await withdrawInvitationRow(tx, { teamId: ctx.teamId, id: invitationId });
    if (!row) throw new NotFound("Open invitation");
    await recordEvent(tx, ctx, "invitation.withdrawn", { type: "invitation", id: row.id });
  });
}
