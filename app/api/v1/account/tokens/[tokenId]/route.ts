import { route } from "@/lib/api/route";
import { AccessToken } from "@/lib/schemas/account";
import { AccessTokenAddress } from "@/lib/schemas/addresses";
import { revokeAccessToken } from "@/lib/services/account/access-tokens";

export const DELETE = route(
  { summary: "Revoke an access token", params: AccessTokenAddress, reply: AccessToken, right: "token:own" },
  async ({ ctx, params }) => ({ body: await revokeAccessToken(ctx, params.tokenId) }),
);
