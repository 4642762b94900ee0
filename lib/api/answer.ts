import { log } from "@/lib/log";
import { describeFault } from "./describe-fault";
import { problemOf, problemReply } from "./problems";
import { requestIdOf } from "./request-id";

/** What the one log line of a request tells; filled in while more becomes known. */
export type RequestRecord = {
  readonly requestId: string;
  readonly method: string;
  /** Without the query, which may hold what somebody searched for. */
  readonly path: string;
  teamId?: string;
  userId?: string;
  tokenId?: string;
};

const GONE = 499;

/** The outermost layer of every route: whatever happens inside, one reply with the request id, and one log line. */
export async function answer(request: Request, work: (record: RequestRecord) => Promise<Response>): Promise<Response> {
  const began = performance.now();
  const record: RequestRecord = {
    requestId: requestIdOf(request.headers),
    method: request.method,
    path: new URL(request.url).pathname,
  };
  const { response, level, outcome } = await outcomeOf(request, record, work);
  response.headers.set("x-request-id", record.requestId);
  if (!response.headers.has("cache-control")) response.headers.set("cache-control", "private, no-store");
  response.headers.set("x-content-type-options", "nosniff");
  const ms = Math.round((performance.now() - began) * 10) / 10;
  log[level]({ ...record, status: response.status, ms, ...outcome }, "request");
  return response;
}

type Outcome = {
  readonly response: Response;
  readonly level: "info" | "warn" | "error";
  readonly outcome: { readonly status?: number; readonly code?: string; readonly fault?: unknown };
};

async function outcomeOf(
  request: Request,
  record: RequestRecord,
  work: (record: RequestRecord) => Promise<Response>,
): Promise<Outcome> {
  try {
    return { response: await work(record), level: "info", outcome: {} };
  } catch (error) {
    const problem = problemOf(error, record.requestId, record.path);
    const response = problemReply(problem);
    // Whoever asked is gone: nobody reads this reply, and the aborted work is no fault.
    if (request.signal.aborted) return { response, level: "info", outcome: { status: GONE } };
    const { code } = problem;
    if (code === "internal") return { response, level: "error", outcome: { code, fault: describeFault(error) } };
    if (code === "unavailable") return { response, level: "warn", outcome: { code, fault: describeFault(error) } };
    return { response, level: "info", outcome: { code } };
  }
}
