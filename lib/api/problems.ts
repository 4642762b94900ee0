import { NumericalError } from "@/control/errors";
import { DomainError } from "@/lib/errors";
import type { Problem } from "@/lib/schemas/problem";
import { isDatabaseAway } from "./database-away";
import { PROBLEMS, type ProblemCode } from "./problem-catalogue";

const RETRY_SECONDS = 5;

type Refusal = {
  readonly code: ProblemCode;
  readonly detail?: string;
  readonly data?: Readonly<Record<string, unknown>>;
  readonly issues?: DomainError["issues"];
  readonly facts?: Readonly<Record<string, unknown>>;
};

/** What is said about an error, whatever it was. Nothing of an unexpected one is told but the request id. */
export function problemOf(error: unknown, requestId: string, instance: string): Problem {
  const { code, detail, data = {}, issues = [], facts } = refusalOf(error);
  const { status, title, meaning } = PROBLEMS[code];
  const retryAfter = numberIn(data.retryAfter) ?? (status === 503 || status === 429 ? RETRY_SECONDS : undefined);
  return {
    type: `/docs/problems#${code}`,
    title,
    status,
    detail: detail || meaning,
    instance,
    code,
    requestId,
    ...(issues.length > 0 && { errors: [...issues] }),
    ...(retryAfter !== undefined && { retryAfter: Math.max(1, Math.ceil(retryAfter)) }),
    ...(numberIn(data.given) !== undefined && { given: numberIn(data.given) }),
    ...(numberIn(data.current) !== undefined && { current: numberIn(data.current) }),
    ...(facts && { data: plainFacts(facts) }),
  };
}

function refusalOf(error: unknown): Refusal {
  if (error instanceof NumericalError) return { code: error.code, facts: error.data };
  if (error instanceof DomainError) {
    const { code, message, data, issues } = error;
    if (code !== "unsolvable") return { code, detail: message, data, issues };
    const inner = data.code;
    const facts = typeof data.data === "object" && data.data !== null ? { ...data.data } : undefined;
    return { code: isProblemCode(inner) ? inner : code, detail: message, facts, issues };
  }
  if (isDatabaseAway(error)) return { code: "unavailable" };
  return { code: "internal" };
}

function isProblemCode(code: unknown): code is ProblemCode {
  return typeof code === "string" && Object.hasOwn(PROBLEMS, code);
}

function numberIn(value: unknown): number | undefined {
  return typeof value === "number" && Number.isFinite(value) ? value : undefined;
}

/** Through JSON once, so that no function, undefined or infinite value reaches the reply. */
function plainFacts(facts: Readonly<Record<string, unknown>>): Record<string, unknown> {
  return JSON.parse(JSON.stringify(facts));
}

/** The problem as a reply, never stored by a cache. */
export function problemReply(problem: Problem): Response {
  const headers = new Headers({
    "content-type": "application/problem+json",
    "cache-control": "private, no-store",
    "x-request-id": problem.requestId,
  });
  if (problem.retryAfter !== undefined) headers.set("retry-after", String(problem.retryAfter));
  if (problem.code === "no-session") headers.set("www-authenticate", "Bearer");
  if (problem.current !== undefined) headers.set("etag", `"${problem.current}"`);
  return new Response(JSON.stringify(problem), { status: problem.status, headers });
}
