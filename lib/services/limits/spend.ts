import "server-only";
import { createHash } from "node:crypto";
import { spendPoint } from "@/db/queries/rate-limits";
import { DomainError } from "@/lib/errors";
import type { Context, Visitor } from "../context";

/** What a request costs: `solve` runs the core. */
export type Cost = "read" | "write" | "solve";

const SECONDS = 60;
/** An office behind one address shares this; guessing passwords has narrower limits of its own. */
const VISITS_PER_MINUTE = 120;

/** Requests a minute, for one person and for a whole team. */
const PER_MINUTE: Readonly<Record<Cost, { readonly person: number; readonly team: number }>> = {
  read: { person: 600, team: 3_000 },
  write: { person: 120, team: 600 },
  solve: { person: 30, team: 90 },
};

/**
 * Counts a request against its person and its team, in the database, so that every process counts alike.
 * @throws DomainError `too-many-requests` with the seconds to wait
 */
export async function spend({ teamId, userId }: Pick<Context, "teamId" | "userId">, cost: Cost): Promise<void> {
  const { person, team } = PER_MINUTE[cost];
  await Promise.all([take(`${cost}:person`, person, userId, "you"), take(`${cost}:team`, team, teamId, "your team")]);
}

/** For somebody who need not belong to a team. */
export async function spendAsPerson({ userId }: Pick<Context, "userId">, cost: Cost): Promise<void> {
  await take(`${cost}:person`, PER_MINUTE[cost].person, userId, "you");
}

/** For somebody nobody knows yet, by network address, which is stored only as a hash. */
export async function spendAsVisitor({ address }: Pick<Visitor, "address">): Promise<void> {
  const key = createHash("sha256").update(address).digest("base64url");
  await take("visitor", VISITS_PER_MINUTE, key, "your network address");
}

async function take(name: string, points: number, key: string, who: string): Promise<void> {
  const { allowed, waitSeconds } = await spendPoint({ name, points, seconds: SECONDS }, key);
  if (allowed) return;
  const retryAfter = Math.max(1, waitSeconds);
  const words = `At most ${points} requests of this kind a minute for ${who}. Wait ${retryAfter} s.`;
  throw new DomainError("too-many-requests", words, { retryAfter });
}
