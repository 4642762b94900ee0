import { route } from "@/lib/api/route";
import { MemberAddress } from "@/lib/schemas/addresses";
import { ChangeRole, Member } from "@/lib/schemas/team";
import { changeRole, removeMember } from "@/lib/services/team/members";

export const PATCH = route(
  { summary: "Change a member's role", params: MemberAddress, body: ChangeRole, reply: Member, right: "team:manage" },
  async ({ ctx, params, body }) => ({ body: await changeRole(ctx, params.userId, body) }),
);

/** Anybody may leave; the service asks for more where somebody else is removed. */
export const DELETE = route(
  { summary: "Remove a member, or leave; what they made stays", params: MemberAddress, reply: null, right: "account:own" },
  async ({ ctx, params }) => {
    await removeMember(ctx, params.userId);
    return null;
  },
);
