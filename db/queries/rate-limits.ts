import "server-only";
import { RateLimiterPostgres, type RateLimiterRes } from "rate-limiter-flexible";
import { pool } from "../client";

export type Rate = { readonly name: string; readonly points: number; readonly seconds: number };
/** `count` includes this one; `waitSeconds` is until the counter starts anew. */
export type Spent = { readonly allowed: boolean; readonly count: number; readonly waitSeconds: number };

const limiters = new Map<string, { readonly of: ReturnType<typeof pool>; readonly limiter: RateLimiterPostgres }>();

/** Counters live in PostgreSQL, so that all processes count together; one statement each, outside any transaction. */
function limiterOf({ name, points, seconds }: Rate): RateLimiterPostgres {
  const current = pool();
  const known = limiters.get(name);
  if (known?.of === current) return known.limiter;
  const limiter = new RateLimiterPostgres({
    storeClient: current,
    storeType: "pool",
    tableName: "rate_limits",
    tableCreated: true,
    clearExpiredByTimeout: true,
    keyPrefix: name,
    points,
    duration: seconds,
  });
  limiters.set(name, { of: current, limiter });
  return limiter;
}

/** `seconds` lets one spending last longer or shorter than the rate says. */
export async function spendPoint(rate: Rate, key: string, seconds = rate.seconds): Promise<Spent> {
  const result = await limiterOf(rate).penalty(key, 1, { customDuration: seconds });
  return spent(rate, result);
}

export async function readPoints(rate: Rate, key: string): Promise<Spent> {
  const result = await limiterOf(rate).get(key);
  return result ? spent(rate, result) : { allowed: true, count: 0, waitSeconds: 0 };
}

export async function forgetPoints(rate: Rate, key: string): Promise<void> {
  await limiterOf(rate).delete(key);
}

function spent({ points }: Rate, { consumedPoints, msBeforeNext }: RateLimiterRes): Spent {
  return { allowed: consumedPoints <= points, count: consumedPoints, waitSeconds: Math.max(0, Math.ceil(msBeforeNext / 1000)) };
}
