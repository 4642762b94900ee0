import "server-only";
import { type Db, inOneTransaction } from "@/db/client";
import {
  claimIdempotencyKey,
  dropExpiredIdempotencyKeys,
  findIdempotencyKey,
  type IdempotencyKey,
  saveIdempotentReply,
  stayOpenFor,
  waitAtMost,
} from "@/db/queries/idempotency";
import { sqlState } from "@/db/with-retries";
import { DomainError } from "@/lib/errors";
import type { Context } from "../context";
import { StoredReply } from "./stored-reply";

/** `fingerprint` tells whether a repeated key comes with the same request. */
export type Once = { readonly route: string; readonly key: string; readonly fingerprint: string };

const PATIENCE_MS = 3_000;
/** Above what a computation may take, waiting for its thread included. */
const COMPUTING_MS = 60_000;
const RETRY_SECONDS = 2;
const LOCK_NOT_AVAILABLE = "55P03";

/**
 * Carries out `work` unless the same person has done so with this key within 24 hours, and gives the reply of that one time.
 * Everything `work` stores and the reply are one transaction: after a crash at any moment there are both or neither.
 * What `work` refuses is not remembered.
 *
 * @throws DomainError `invalid` when the key came with another request, `conflict` while the first request still runs
 */
export async function runOnce(ctx: Context, once: Once, work: () => Promise<StoredReply>): Promise<StoredReply> {
  const key = keyOf(ctx, once);
  return inOneTransaction(ctx, async (tx) => {
    await dropExpiredIdempotencyKeys(tx, key);
    if (!(await claimOrWait(tx, key, once.fingerprint))) {
      const earlier = await earlierReply(tx, key, once.fingerprint);
      if (earlier) return earlier;
      throw stillRunning();
    }
    await stayOpenFor(tx, COMPUTING_MS);
    const reply = await work();
    await saveIdempotentReply(tx, key, reply.status, reply);
    return reply;
  });
}

function keyOf({ teamId, userId }: Context, { route, key }: Once): IdempotencyKey {
  return { teamId, userId, route, key };
}

async function earlierReply(tx: Db, key: IdempotencyKey, fingerprint: string): Promise<StoredReply | undefined> {
  const row = await findIdempotencyKey(tx, key);
  if (!row) return undefined;
  if (row.bodyHash !== fingerprint) {
    throw new DomainError("invalid", "This Idempotency-Key was used for another request. Send a new key with a new request.");
  }
  return StoredReply.parse(row.reply);
}

async function claimOrWait(tx: Db, key: IdempotencyKey, fingerprint: string): Promise<boolean> {
  try {
    await waitAtMost(tx, PATIENCE_MS);
    const claimed = await claimIdempotencyKey(tx, key, fingerprint);
    await waitAtMost(tx, 0);
    return claimed;
  } catch (error) {
    if (sqlState(error) === LOCK_NOT_AVAILABLE) throw stillRunning();
    throw error;
  }
}

function stillRunning(): DomainError {
  const words = "The first request with this Idempotency-Key is still being carried out. Ask again in a moment.";
  return new DomainError("conflict", words, { retryAfter: RETRY_SECONDS });
}
