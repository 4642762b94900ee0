import { personRoute } from "@/lib/api/route";
import { ChangePassword } from "@/lib/schemas/account";
import { changePassword } from "@/lib/services/account/change-password";

export const POST = personRoute(
  { summary: "Change one's own password, which ends every other session", body: ChangePassword, reply: null },
  async ({ person, body }) => {
    await changePassword(person, body);
    return null;
  },
);
