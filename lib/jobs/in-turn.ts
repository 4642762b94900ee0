import { DomainError } from "@/lib/errors";
import { FairQueue } from "./fair-queue";

/** Twice the threads, so that one team's two leave room for others; and few of the database connections that creates hold. */
const AT_ONCE = 4;
const RETRY_SECONDS = 3;

type Turn = { readonly teamId: string; readonly begin: () => void };
const queue = new FairQueue<Turn>({ running: 2, waiting: 10, waitingInAll: 60 });
let running = 0;

/**
 * Admits a request that computes, as a whole: it may use the core more than once, and is never turned away half-way. Whoever
 * has to wait for a turn holds nothing, while a create holds its transaction open as it computes.
 */
export async function inTurn<T>(teamId: string, signal: AbortSignal, work: () => Promise<T>): Promise<T> {
  await takeTurn(teamId, signal);
  try {
    return await work();
  } finally {
    running--;
    queue.finished(teamId);
    callNext();
  }
}

async function takeTurn(teamId: string, signal: AbortSignal): Promise<void> {
  signal.throwIfAborted();
  let giveUp = () => {};
  try {
    await new Promise<void>((begin, reject) => {
      const turn = { teamId, begin };
      if (!queue.join(turn)) {
        const words = "Too many computations are waiting. Try again in a few seconds.";
        reject(new DomainError("busy", words, { retryAfter: RETRY_SECONDS }));
      }
      giveUp = () => queue.leave(turn) && reject(signal.reason);
      signal.addEventListener("abort", giveUp);
      callNext();
    });
  } finally {
    signal.removeEventListener("abort", giveUp);
  }
}

function callNext(): void {
  while (running < AT_ONCE) {
    const turn = queue.next();
    if (!turn) return;
    running++;
    turn.begin();
  }
}
