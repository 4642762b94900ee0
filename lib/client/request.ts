import type { Problem, ProblemIssue } from "@/lib/schemas/problem";

export type RequestOptions = {
  readonly method?: "GET" | "POST" | "PUT" | "PATCH" | "DELETE";
  /** Names without a value are left out. */
  readonly query?: Readonly<Record<string, string | number | boolean | undefined>>;
  readonly body?: unknown;
  /** The version that a change starts from. */
  readonly version?: number;
  /** For a create: the same key again when the same create is sent again; see `newKey`. */
  readonly key?: string;
  readonly signal?: AbortSignal;
  /** Goes on although the page is left; for small bodies only. */
  readonly keepalive?: boolean;
  /** Before the path, outside a browser. */
  readonly base?: string;
};

/** `version` is what a change of this thing starts from, `location` where a created thing lives. */
export type Reply<T> = { readonly data: T; readonly version: number | null; readonly location: string | null };

/** Codes that no server sends: nothing answered, or something else than this service did. */
export type LocalCode = "offline" | "unexpected-reply";

/** A refused request, in words that can be shown, with the places to correct. */
export class RequestProblem extends Error {
  readonly code: string;
  readonly status: number;
  readonly title: string;
  readonly issues: readonly ProblemIssue[];
  readonly requestId: string | null;
  /** Seconds. */
  readonly retryAfter: number | null;
  /** The stored version, where the one sent is stale. */
  readonly current: number | null;
  readonly data: Readonly<Record<string, unknown>>;

  constructor(problem: Pick<Problem, "code" | "status" | "title" | "detail"> & Partial<Problem>) {
    super(problem.detail);
    this.name = "RequestProblem";
    this.code = problem.code;
    this.status = problem.status;
    this.title = problem.title;
    this.issues = problem.errors ?? [];
    this.requestId = problem.requestId ?? null;
    this.retryAfter = problem.retryAfter ?? null;
    this.current = problem.current ?? null;
    this.data = problem.data ?? {};
  }

  /** The session is over: ask to sign in again in place, then send the same request once more. */
  get needsSignIn(): boolean {
    return this.code === "no-session";
  }

  /** What to correct at a place of the body, such as `/name`, or anywhere below it. */
  at(pointer: string): readonly string[] {
    return this.issues
      .filter((issue) => issue.pointer === pointer || issue.pointer.startsWith(`${pointer}/`))
      .map(({ detail }) => detail);
  }
}

/** Works also where `randomUUID` does not, on plain http outside loopback. */
export function newKey(): string {
  return [...crypto.getRandomValues(new Uint8Array(16))].map((byte) => byte.toString(16).padStart(2, "0")).join("");
}

/**
 * Sends one request to the service. An abort passes through as the signal's own reason.
 * @throws RequestProblem
 */
export async function request<T>(path: string, options: RequestOptions = {}): Promise<Reply<T>> {
  const response = await send(path, options);
  if (!response.ok) throw await problemIn(response);
  const data = response.status === 204 ? undefined : await jsonIn(response);
  const [, version] = /^"(\d+)(?:\.[0-9a-f]+)?"$/.exec(response.headers.get("etag") ?? "") ?? [];
  // Replies are parsed by their schema on the way out; parsing them again would put every schema into every page.
  return { data: data as T, version: version ? Number(version) : null, location: response.headers.get("location") };
}

async function send(
  path: string,
  { method = "GET", query, body, version, key, signal, keepalive, base = "" }: RequestOptions,
): Promise<Response> {
  const headers: Record<string, string> = { accept: "application/json" };
  if (body !== undefined) headers["content-type"] = "application/json";
  if (version !== undefined) headers["if-match"] = `"${version}"`;
  if (key !== undefined) headers["idempotency-key"] = key;
  const init: RequestInit = { method, headers, credentials: "same-origin", cache: "no-store" };
  if (body !== undefined) init.body = JSON.stringify(body);
  if (signal) init.signal = signal;
  if (keepalive) init.keepalive = true;
  try {
    return await fetch(`${base}${path}${queryText(query)}`, init);
  } catch (error) {
    if (signal?.aborted) throw error;
    throw noConnection();
  }
}

export function noConnection(): RequestProblem {
  const detail = "The service did not answer. What you typed is kept; try again when you are connected.";
  return localProblem("offline", "No connection", detail);
}

function queryText(query: RequestOptions["query"] = {}): string {
  const given = Object.entries(query).flatMap(([name, value]) => (value === undefined ? [] : [[name, String(value)]]));
  return given.length > 0 ? `?${new URLSearchParams(given)}` : "";
}

export async function problemIn(response: Response): Promise<RequestProblem> {
  const type = response.headers.get("content-type") ?? "";
  if (!type.startsWith("application/problem+json")) return unexpected(response);
  return new RequestProblem((await jsonIn(response)) as Problem);
}

export async function jsonIn(response: Response): Promise<unknown> {
  const type = response.headers.get("content-type") ?? "";
  if (!/^application\/(problem\+)?json/.test(type)) throw unexpected(response);
  try {
    return await response.json();
  } catch (error) {
    if (error instanceof SyntaxError) throw unexpected(response);
    throw error;
  }
}

function unexpected({ status, headers }: Response): RequestProblem {
  const words = `The answer (status ${status}) did not come from this service. Reload the page and try again.`;
  return localProblem("unexpected-reply", "Unexpected answer", words, {
    status,
    requestId: headers.get("x-request-id") ?? undefined,
  });
}

function localProblem(code: LocalCode, title: string, detail: string, more: Partial<Problem> = {}): RequestProblem {
  return new RequestProblem({ status: 0, ...more, code, title, detail });
}
