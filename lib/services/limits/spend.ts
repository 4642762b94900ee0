import "server-only";
import { createHash } from "node:crypto";
import { spendPoint } from "@/db/queries/rate-limits";
import { DomainError } from "@/lib/errors";
import type { Context, Visitor } from "../context";

/**
 * What a request costs: `solve` and `check` run the core, `check` so briefly that it comes with looking at a plant. A `draft` is
 * kept by the page itself, which must never use up what a person's own changes need.
 */
export type Cost = "read" | "write" | "draft" | "check" | "solve";

const SECONDS = 60;
/** An office behind one address shares this; guessing passwords has narrower limits of its own. */
const VISITS_PER_MINUTE = 120;

type Allowance = { readonly person: number; readonly team: number; readonly name: string };

/** Requests a minute, for one person and for a whole team, and what they are called where there were too many. */
const PER_MINUTE: Readonly<Record<Cost, Allowance>> = {
  read: { person: 600, team: 3_000, name: "reads" },
  write: { person: 120, team: 600, name: "changes" },
  draft: { person: 120, team: 2_400, name: "drafts" },
  check: { person: 60, team: 180, name: "checks of a plant" },
  solve: { person: 30, team: 90, name: "computations" },
};

/**
 * Counts a request against its person and its team, in the database, so that every process counts alike.
 * @throws DomainError `too-many-requests` with the seconds to wait
 */
export async function spend({ teamId, userId }: Pick<Context, "teamId" | "userId">, cost: Cost): Promise<void> {
  const { person, team, name } = PER_MINUTE[cost];
  await Promise.all([
    take(`${cost}:person`, person, userId, `${name} a minute for you`),
    take(`${cost}:team`, team, teamId, `${name} a minute for your team`),
  ]);
}

/** For somebody who need not belong to a team. */
export async function spendAsPerson({ userId }: Pick<Context, "userId">, cost: Cost): Promise<void> {
  const { person, name } = PER_MINUTE[cost];
  await take(`${cost}:person`, person, userId, `${name} a minute for you`);
}

/** For somebody nobody knows yet, by network address, which is stored only as a hash. */
export async function spendAsVisitor({ address }: Pick<Visitor, "address">): Promise<void> {
  const key = createHash("sha256").update(address).digest("base64url");
  await take("visitor", VISITS_PER_MINUTE, key, "requests a minute for your network address");
}

async function take(name: string, points: number, key: string, what: string): Promise<void> {
  const { allowed, waitSeconds } = await spendPoint({ name, points, seconds: SECONDS }, key);
  if (allowed) return;
  const retryAfter = Math.max(1, waitSeconds);
  const words = `At most ${points} ${what}. Wait ${retryAfter} s, then try again.`;
  throw new DomainError("too-many-requests", words, { retryAfter });
}
