import "server-only";
import { createHash, randomBytes } from "node:crypto";

export const TOKEN_PREFIX = "gw_";

/** 256 random bits. The database keeps the hash alone: whoever reads it cannot use what it holds. */
export function newSecret(prefix = ""): { secret: string; hash: string } {
  const secret = prefix + randomBytes(32).toString("base64url");
  return { secret, hash: hashSecret(secret) };
}

/** Plain SHA-256 is enough for 256 random bits; nobody guesses them, so nothing has to be slow. */
export const hashSecret = (secret: string) => createHash("sha256").update(secret).digest("hex");
