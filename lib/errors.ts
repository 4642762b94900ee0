/** What a service can refuse. Codes are stable and documented; one mapper turns them into RFC 9457 problems. */
export type DomainErrorCode =
  | "unreadable" // 400
  | "no-session" // 401
  | "forbidden" // 403: the right is missing on a thing the caller may see
  | "not-found" // 404: absent, or another team's
  | "conflict" // 409
  | "gains-disagree" // 409: the sender's gains are not those of the service
  | "stale-version" // 412 { given, current }
  | "too-large" // 413 { limit }
  | "not-json" // 415
  | "invalid" // 422 { issues: Issue[] }
  | "unsolvable" // 422 { code, data }: the core refused; see control/errors.ts
  | "precondition-required" // 428
  | "too-many-requests" // 429 { retryAfter }
  | "busy" // 503 { retryAfter }
  | "unavailable"; // 503 { retryAfter }

/** `pointer` is a JSON pointer (RFC 6901) into the body that was sent. */
export type Issue = { readonly pointer: string; readonly detail: string };

export class DomainError extends Error {
  readonly code: DomainErrorCode;
  readonly data: Readonly<Record<string, unknown>>;
  readonly issues: readonly Issue[];

  constructor(
    code: DomainErrorCode,
    message: string,
    data: Readonly<Record<string, unknown>> = {},
    issues: readonly Issue[] = [],
  ) {
    super(message);
    this.name = "DomainError";
    this.code = code;
    this.data = data;
    this.issues = issues;
  }
}

export class NotFound extends DomainError {
  constructor(what: string) {
    super("not-found", `${what} not found. It may have been removed, or it belongs to another team.`);
  }
}

export class StaleVersion extends DomainError {
  constructor(given: number, current: number) {
    super("stale-version", "Somebody saved a change after you opened this. Compare, then choose what to keep.", {
      given,
      current,
    });
  }
}
