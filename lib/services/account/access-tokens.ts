import "server-only";
import { inTransaction } from "@/db/client";
import {
  type AccessTokenRow,
  countLiveAccessTokens,
  insertAccessToken,
  listAccessTokens as listRows,
  revokeAccessToken as revokeRow,
} from "@/db/queries/access-tokens";
import { DomainError, NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { AccessToken, CreateAccessToken, CreatedAccessToken } from "@/lib/schemas/account";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { newSecret, TOKEN_PREFIX } from "./secrets";

const MOST = 20;
const DAY_SECONDS = 24 * 3600;

/** The secret is in this reply and nowhere else, ever: a reply kept for repeated requests must not hold it. */
export async function createAccessToken(
  ctx: Context,
  { name, scope, expiresInDays }: CreateAccessToken,
): Promise<CreatedAccessToken> {
  allow(ctx, "token:own");
  const { secret, hash } = newSecret(TOKEN_PREFIX);
  return inTransaction(ctx, async (tx) => {
    const key = { teamId: ctx.teamId, userId: ctx.userId };
    if ((await countLiveAccessTokens(tx, key)) >= MOST) {
      throw new DomainError("conflict", `You have ${MOST} live tokens in this team. Revoke one that you no longer use.`);
    }
    const row = await insertAccessToken(tx, { ...key, name, scope, tokenHash: hash }, expiresInDays * DAY_SECONDS);
    await recordEvent(tx, ctx, "token.created", { type: "token", id: row.id }, { name, scope });
    return { ...toAccessToken(row), secret };
  });
}

export function listAccessTokens(ctx: Context): Promise<AccessToken[]> {
  allow(ctx, "token:own");
  return inTransaction(ctx, async (tx) => (await listRows(tx, ctx)).map(toAccessToken));
}

export function revokeAccessToken(ctx: Context, tokenId: string): Promise<AccessToken> {
  allow(ctx, "token:own");
  return inTransaction(ctx, async (tx) => {
    const row = await revokeRow(tx, ctx, tokenId);
    if (!row) throw new NotFound("Live access token");
    await recordEvent(tx, ctx, "token.revoked", { type: "token", id: row.id }, { name: row.name });
    return toAccessToken(row);
  });
}

function toAccessToken({ id, name, scope, createdAt, expiresAt, lastUsedAt, revokedAt }: AccessTokenRow): AccessToken {
  return {
    id,
    name,
    scope,
    createdAt: createdAt.toISOString(),
    expiresAt: expiresAt.toISOString(),
    lastUsedAt: lastUsedAt?.toISOString() ?? null,
    revokedAt: revokedAt?.toISOString() ?? null,
  };
}
