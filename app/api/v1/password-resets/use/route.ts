import { publicRoute } from "@/lib/api/route";
import { ResetPassword } from "@/lib/schemas/account";
import { resetPassword } from "@/lib/services/account/reset-password";

export const POST = publicRoute(
  { summary: "Set a new password with the secret of a mailed link", body: ResetPassword, reply: null },
  async ({ visitor, body }) => {
    await resetPassword(visitor, body);
    return null;
  },
);
