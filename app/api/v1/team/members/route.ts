import { z } from "zod";
import { route } from "@/lib/api/route";
import { Member } from "@/lib/schemas/team";
import { listMembers } from "@/lib/services/team/members";

export const GET = route(
  { summary: "List the team's members", reply: z.strictObject({ items: z.array(Member) }), right: "team:read" },
  async ({ ctx }) => ({ body: { items: await listMembers(ctx) } }),
);
