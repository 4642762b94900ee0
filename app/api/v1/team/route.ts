import { route } from "@/lib/api/route";
import { RenameTeam, Team } from "@/lib/schemas/team";
import { readTeam, renameTeam } from "@/lib/services/team/teams";

export const GET = route({ summary: "Read the team", reply: Team, right: "team:read" }, async ({ ctx }) => ({
  body: await readTeam(ctx),
}));

export const PATCH = route(
  { summary: "Rename the team", body: RenameTeam, reply: Team, right: "team:manage" },
  async ({ ctx, body }) => ({
    body: await renameTeam(ctx, body),
  }),
);
