import { z } from "zod";
import { route } from "@/lib/api/route";
import { Invite } from "@/lib/schemas/invitation";
import { Invitation } from "@/lib/schemas/team";
import { listInvitations } from "@/lib/services/team/invitations";
import { invite } from "@/lib/services/team/invite";

export const GET = route(
  { summary: "List open invitations", reply: z.strictObject({ items: z.array(Invitation) }), right: "team:manage" },
  async ({ ctx }) => ({ body: { items: await listInvitations(ctx) } }),
);

/** No key: a new invitation to the same address ends the older one, so a repeat does no harm. */
export const POST = route(
  { summary: "Invite somebody by mail", body: Invite, reply: Invitation, right: "team:manage", status: 201 },
  async ({ ctx, body }) => ({ body: await invite(ctx, body) }),
);
