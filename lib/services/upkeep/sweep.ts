import "server-only";
import { asVisitor } from "@/db/client";
import { KINDS, type Kind, removeDue } from "@/db/queries/sweep";

const AT_ONCE = 1_000;
/** Whatever is left after so many goes the next day. */
const ROUNDS = 500;

/** Removes ended sessions, old reset links, mails, idempotency keys and drafts, and nothing else; tells how many of each. */
export async function sweep(): Promise<Readonly<Record<Kind, number>>> {
  const counts = {} as Record<Kind, number>;
  for (const kind of KINDS) counts[kind] = await removeAll(kind);
  return counts;
}

async function removeAll(kind: Kind): Promise<number> {
  let count = 0;
  for (let round = 0; round < ROUNDS; round++) {
    const removed = await asVisitor((tx) => removeDue(tx, kind, AT_ONCE), { sweeping: "on" });
    count += removed;
    if (removed < AT_ONCE) break;
  }
  return count;
}
