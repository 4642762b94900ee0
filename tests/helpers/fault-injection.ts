import pg from "pg";
import { withClient } from "@/lib/commands/databases.mjs";

export class Fault extends Error {}
type Query = (...args: unknown[]) => unknown;

/**
 * Every statement of this process goes through here. `at`: that one, counted from 1, is not sent but fails; a commit is a
 * statement too. Returns how many were counted, and whether the fault was met.
 */
async function withFaultAt(at: number, act: () => Promise<unknown>): Promise<{ reached: boolean; error: unknown }> {
  const prototype = pg.Client.prototype as unknown as { query: Query };
  const original = prototype.query;
  let count = 0;
  let reached = false;
  prototype.query = function (this: unknown, ...args: unknown[]) {
    count += 1;
    if (count !== at) return original.apply(this, args);
    reached = true;
    const fault = new Fault(`statement ${at} failed`);
    const callback = args.find((argument): argument is (error: Error) => void => typeof argument === "function");
    if (!callback) return Promise.reject(fault);
    callback(fault);
    return undefined;
  };
  try {
    const error = await act().then(
      () => undefined,
      (reason: unknown) => reason,
    );
    return { reached, error };
  } finally {
    prototype.query = original;
  }
}

/** A checksum of every row of every table and of the waiting jobs, but for the counters of the rate limiter. */
export function checksum(adminUrl: string): Promise<string> {
  return withClient(adminUrl, async (client) => {
    const { rows: tables } = await client.query<{ name: string }>(
      `select format('%I.%I', schemaname, tablename) as name from pg_tables
       where (schemaname = 'public' and tablename <> 'rate_limits') or tablename = '_private_jobs' order by 1`,
    );
    const sums: string[] = [];
    for (const { name } of tables) {
      const { rows } = await client.query<{ sum: string | null }>(
        `select md5(string_agg(t::text, '|' order by t::text)) as sum from ${name} t`,
      );
      sums.push(`${name} ${rows[0].sum}`);
    }
    return sums.join("\n");
  });
}

/**
 * Runs `act` again and again, each time with the next statement failing, until it is through without meeting the fault; calls
 * `unchanged` after each failure. Gives the number of faults that were met.
 */
export async function eachFault(
  act: () => Promise<unknown>,
  unchanged: (at: number, error: unknown) => Promise<void>,
): Promise<number> {
  for (let at = 1; at <= 200; at++) {
    const { reached, error } = await withFaultAt(at, act);
    if (!reached) {
      if (error) throw error;
      return at - 1;
    }
    await unchanged(at, error);
  }
  throw new Error("more than 200 statements");
}
