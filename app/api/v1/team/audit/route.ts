import { route } from "@/lib/api/route";
import { page } from "@/lib/schemas/common";
import { AuditEvent, AuditQuery } from "@/lib/schemas/team";
import { listAuditEvents } from "@/lib/services/team/list-audit-events";

export const GET = route(
  { summary: "Read the audit trail, newest first", query: AuditQuery, reply: page(AuditEvent), right: "audit:read" },
  async ({ ctx, query }) => ({ body: await listAuditEvents(ctx, query) }),
);
