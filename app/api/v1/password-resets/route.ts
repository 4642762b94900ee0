import { publicRoute } from "@/lib/api/route";
import { RequestReset } from "@/lib/schemas/account";
import { requestReset } from "@/lib/services/account/request-reset";

/** The same reply whether or not the address is known. */
export const POST = publicRoute(
  { summary: "Ask for a mail with a link to a new password", body: RequestReset, reply: null },
  async ({ visitor, body }) => {
    await requestReset(visitor, body);
    return null;
  },
);
