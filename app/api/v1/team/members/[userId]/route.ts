import { route } from "@/lib/api/route";
import { MemberAddress } from "@/lib/schemas/addresses";
import { ChangeRole, Member } from "@/lib/schemas/team";
import { changeRole, removeMember } from "@/lib/services/team/members";

export const PATCH = route(
  { summary: "Change a member's role", params: MemberAddress, body: ChangeRole, reply: Member, right: "team:manage" },
  async ({ ctx, params, body }) => ({ body: await changeRole(ctx, params.userId, body) }),
);

export const DELETE = route(
  { summary: "Remove a member; what they made stays", params: MemberAddress, reply: null, right: "team:manage" },
  async ({ ctx, params }) => {
    await removeMember(ctx, params.userId);
    return null;
  },
);
