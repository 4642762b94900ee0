import { personRoute } from "@/lib/api/route";
import { AcceptInvitation } from "@/lib/schemas/invitation";
import { acceptInvitation } from "@/lib/services/team/accept-invitation";

export const POST = personRoute(
  { summary: "Join the team that invited the signed-in address", body: AcceptInvitation, reply: null },
  async ({ person, body }) => {
    await acceptInvitation(person, body);
    return null;
  },
);
