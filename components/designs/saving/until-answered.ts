import { RequestProblem } from "@/lib/client/request";
import { backOffMs } from "../drafts/back-off";

type Waiting = { readonly signal: AbortSignal; readonly onWaiting: (waiting: boolean) => void };

/**
 * Sends again after 1, 2, 4 … 30 s, and at once when the browser is connected again, until the service answers or it is given up.
 * What is sent must be safe to repeat: an answer may have been lost and not the request.
 *
 * @throws RequestProblem
 */
export async function untilAnswered<T>(send: () => Promise<T>, { signal, onWaiting }: Waiting): Promise<T> {
  try {
    for (let failures = 1; ; failures++) {
      try {
        return await send();
      } catch (error) {
        const isOffline = error instanceof RequestProblem && error.code === "offline";
        if (!isOffline || signal.aborted) throw error;
        onWaiting(true);
        await pause(backOffMs(failures), signal);
        if (signal.aborted) throw error;
      }
    }
  } finally {
    onWaiting(false);
  }
}

function pause(ms: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    const done = () => {
      clearTimeout(timer);
      window.removeEventListener("online", done);
      signal.removeEventListener("abort", done);
      resolve();
    };
    const timer = setTimeout(done, ms);
    window.addEventListener("online", done);
    signal.addEventListener("abort", done);
  });
}
