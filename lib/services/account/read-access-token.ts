import "server-only";
import { adopt, asVisitor } from "@/db/client";
import { findLiveAccessToken, touchAccessToken } from "@/db/queries/access-tokens";
import { findMember } from "@/db/queries/memberships";
import type { Context } from "../context";
import { hashSecret, TOKEN_PREFIX } from "./secrets";

const SHAPE = new RegExp(`^${TOKEN_PREFIX}[A-Za-z0-9_-]{43}$`);

/** Null for anything that is not a live token of somebody who still belongs to its team. */
export async function readAccessToken(secret: string, requestId: string): Promise<Context | null> {
  if (!SHAPE.test(secret)) return null;
  const hash = hashSecret(secret);
  return asVisitor(
    async (tx) => {
      const token = await findLiveAccessToken(tx, hash);
      if (!token) return null;
      const { id, teamId, userId, scope } = token;
      await adopt(tx, { team_id: teamId, user_id: userId });
      const member = await findMember(tx, { teamId, userId });
      if (!member) return null;
      await touchAccessToken(tx, { teamId, id });
      return { teamId, userId, role: member.role, scope, requestId, tokenId: id };
    },
    { secret_hash: hash },
  );
}
