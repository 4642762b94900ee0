import "server-only";
import { createHash } from "node:crypto";
import { forgetPoints, type Rate, readPoints, spendPoint } from "@/db/queries/rate-limits";
import { DomainError } from "@/lib/errors";

const FREE_TRIES = 5;
const LONGEST_WAIT = 900;

/** By who is tried and from where: whoever guesses from elsewhere never shuts out the person the account belongs to. */
const pair: Rate = { name: "guess-pair", points: FREE_TRIES, seconds: 24 * 3600 };
/** After the free tries each further one takes the only ticket, which comes back after a wait that doubles. */
const ticket: Rate = { name: "guess-ticket", points: 1, seconds: 15 };
/** One address trying many accounts. */
const place: Rate = { name: "guess-place", points: 100, seconds: 900 };
/** One account tried from many addresses: every try becomes slower, none is refused. */
const account: Rate = { name: "guess-account", points: 20, seconds: 3600 };

const keyOf = (...parts: string[]) => createHash("sha256").update(JSON.stringify(parts)).digest("hex");
const waitAfter = (tries: number) => Math.min(LONGEST_WAIT, 15 * 2 ** Math.min(10, tries - FREE_TRIES));

function refuse(retryAfter: number): never {
  throw new DomainError("too-many-requests", `Too many tries. Wait ${retryAfter} seconds, then try once more.`, { retryAfter });
}

/**
 * Counts a try before it is known whether it is right, so that tries at once count too; `forgetTries` after a right one.
 * @throws DomainError too-many-requests with the seconds to wait
 */
export async function countTry(subject: string, address: string): Promise<void> {
  const key = keyOf(subject, address);
  const taken = await readPoints(ticket, key);
  if (taken.count > 0) refuse(Math.max(1, taken.waitSeconds));
  const placeTries = await spendPoint(place, keyOf(address));
  if (!placeTries.allowed) refuse(Math.max(1, placeTries.waitSeconds));
  const { count } = await spendPoint(pair, key);
  if (count >= FREE_TRIES) {
    const mine = await spendPoint(ticket, key, waitAfter(count));
    if (mine.count > 1) refuse(Math.max(1, mine.waitSeconds));
  }
  const everywhere = await spendPoint(account, keyOf(subject));
  if (!everywhere.allowed) await new Promise((resolve) => setTimeout(resolve, slowdown(everywhere.count)));
}

const slowdown = (tries: number) => Math.min(4_000, 250 * (tries - account.points));

export async function forgetTries(subject: string, address: string): Promise<void> {
  const key = keyOf(subject, address);
  await Promise.all([forgetPoints(pair, key), forgetPoints(ticket, key)]);
}

/** For what anybody may call: making accounts, asking for links. @throws DomainError too-many-requests */
export async function countUse(rate: Rate, ...parts: string[]): Promise<void> {
  const spent = await spendPoint(rate, keyOf(...parts));
  if (!spent.allowed) refuse(Math.max(1, spent.waitSeconds));
}

/** The same, where the caller must not learn that there was a limit. */
export async function mayUse(rate: Rate, ...parts: string[]): Promise<boolean> {
  return (await spendPoint(rate, keyOf(...parts))).allowed;
}
