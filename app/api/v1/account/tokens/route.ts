import { z } from "zod";
import { route } from "@/lib/api/route";
import { AccessToken, CreateAccessToken, CreatedAccessToken } from "@/lib/schemas/account";
import { createAccessToken, listAccessTokens } from "@/lib/services/account/access-tokens";

export const GET = route(
  {
    summary: "List one's own access tokens for this team",
    reply: z.strictObject({ items: z.array(AccessToken) }),
    right: "token:own",
  },
  async ({ ctx }) => ({ body: { items: await listAccessTokens(ctx) } }),
);

/** No key: the reply holds the secret, and replies behind a key are kept. */
export const POST = route(
  {
    summary: "Make an access token; its secret is shown this once",
    body: CreateAccessToken,
    reply: CreatedAccessToken,
    right: "token:own",
    status: 201,
  },
  async ({ ctx, body }) => ({ body: await createAccessToken(ctx, body) }),
);
