import { publicRoute } from "@/lib/api/route";
import { SignUp } from "@/lib/schemas/account";
import { signUp } from "@/lib/services/account/sign-up";

export const POST = publicRoute(
  { summary: "Make an account and its team", body: SignUp, reply: null },
  async ({ visitor, body }) => {
    await signUp(visitor, body);
    return null;
  },
);
