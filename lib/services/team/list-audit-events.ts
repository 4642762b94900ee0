import "server-only";
import { inTransaction } from "@/db/client";
import { listAuditEvents as listRows } from "@/db/queries/audit-events";
import { allow } from "@/lib/permissions/allow";
import type { AuditEvent, AuditQuery } from "@/lib/schemas/team";
import type { Context } from "../context";
import { fromCursor, toPage } from "../cursor";

/** Who did what, newest first. */
export function listAuditEvents(ctx: Context, { cursor, limit }: AuditQuery) {
  allow(ctx, "audit:read");
  const place = fromCursor(cursor, "time");
  return inTransaction(ctx, async (tx) => {
    const rows = await listRows(tx, ctx.teamId, limit, place);
    return toPage(
      rows,
      limit,
      (row) => ({ value: row.place, id: row.id }),
      ({ place: _, at, ...event }): AuditEvent => ({ ...event, at: at.toISOString() }),
    );
  });
}
