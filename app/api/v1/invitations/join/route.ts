import { publicRoute } from "@/lib/api/route";
import { JoinByInvitation } from "@/lib/schemas/invitation";
import { weakPasswordIn } from "@/lib/services/account/refuse-weak-password";
import { joinByInvitation } from "@/lib/services/team/accept-invitation";

export const POST = publicRoute(
  {
    summary: "Make an account with the invited address and join the team",
    body: JoinByInvitation,
    alsoRefused: weakPasswordIn,
    reply: null,
  },
  async ({ visitor, body }) => {
    await joinByInvitation(visitor, body);
    return null;
  },
);
