import { personRoute } from "@/lib/api/route";
import { StartTeam, SwitchTeam, Team } from "@/lib/schemas/team";
import { startTeam, switchTeam } from "@/lib/services/team/teams";

export const POST = personRoute(
  { summary: "Start a further team and work in it", body: StartTeam, reply: Team, status: 201 },
  async ({ person, body }) => ({
    body: await startTeam(person, body),
  }),
);

export const PUT = personRoute(
  { summary: "Work in another of one's teams", body: SwitchTeam, reply: null },
  async ({ person, body }) => {
    await switchTeam(person, body);
    return null;
  },
);
