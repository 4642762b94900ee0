import { route } from "@/lib/api/route";
import { InvitationAddress } from "@/lib/schemas/addresses";
import { withdrawInvitation } from "@/lib/services/team/invitations";

export const DELETE = route(
  { summary: "Withdraw an invitation", params: InvitationAddress, reply: null, right: "team:manage" },
  async ({ ctx, params }) => {
    await withdrawInvitation(ctx, params.invitationId);
    return null;
  },
);
