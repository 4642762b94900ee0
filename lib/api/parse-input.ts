import type { z } from "zod";
import { DomainError, type Issue, NotFound } from "@/lib/errors";
import { issuesOf, issueWords, pointerTo } from "@/lib/schemas/issues";
import { refuseUnstorableText } from "./read-body";

/** 422 with one line for each place that has to change; `also` finds more of them once the schema has refused. */
export function parseBody<S extends z.ZodType>(
  schema: S,
  value: unknown,
  also: (value: unknown) => readonly Issue[] = () => [],
): z.output<S> {
  const parsed = schema.safeParse(value, { error: issueWords });
  if (parsed.success) return parsed.data;
  const issues = issuesOf(parsed.error);
  const more = also(value).filter(({ pointer }) => issues.every((issue) => issue.pointer !== pointer));
  throw new DomainError("invalid", "Some of what was sent cannot be taken as it is.", {}, [...issues, ...more]);
}

/** A path that cannot name anything is answered like one that names nothing. */
export function parseParams<S extends z.ZodType>(schema: S, value: unknown): z.output<S> {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  throw new NotFound("What this address names");
}

/** Each name at most once: of two equal names one would be silently dropped. Pointers are into the query as an object. */
export function parseQuery<S extends z.ZodType>(schema: S, search: URLSearchParams): z.output<S> {
  const given = new Map<string, string>();
  for (const [name, value] of search) {
    refuseUnstorableText(name + value);
    if (given.has(name)) throw invalidQuery([{ pointer: pointerTo([name]), detail: "This stands twice in the address" }]);
    given.set(name, value);
  }
  const parsed = schema.safeParse(Object.fromEntries(given), { error: issueWords });
  if (parsed.success) return parsed.data;
  throw invalidQuery(issuesOf(parsed.error));
}

function invalidQuery(issues: readonly Issue[]): DomainError {
  return new DomainError("invalid", "Some of the query of this address cannot be taken as it is.", {}, issues);
}
