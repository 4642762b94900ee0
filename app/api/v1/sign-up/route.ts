import { publicRoute } from "@/lib/api/route";
import { SignUp } from "@/lib/schemas/account";
import { weakPasswordIn } from "@/lib/services/account/refuse-weak-password";
import { signUp } from "@/lib/services/account/sign-up";

export const POST = publicRoute(
  { summary: "Make an account and its team", body: SignUp, alsoRefused: weakPasswordIn, reply: null },
  async ({ visitor, body }) => {
    await signUp(visitor, body);
    return null;
  },
);
