import type { z } from "zod";
import type { ProblemIssue } from "./problem";

type ZodIssue = z.core.$ZodIssue;
const LIMIT = 50;
const SEGMENT_LIMIT = 80;

/** RFC 6901: `~` and `/` inside a name are escaped. */
export function pointerTo(path: readonly PropertyKey[]): string {
  return path.map((part) => `/${String(part).slice(0, SEGMENT_LIMIT).replaceAll("~", "~0").replaceAll("/", "~1")}`).join("");
}

/** What to change, place by place, from a failed parse. At most fifty, so that a hostile body cannot make a huge reply. */
export function issuesOf(error: z.ZodError): readonly ProblemIssue[] {
  return flatten(error.issues, []).slice(0, LIMIT);
}

function flatten(issues: readonly ZodIssue[], base: readonly PropertyKey[]): ProblemIssue[] {
  return issues.slice(0, LIMIT).flatMap((issue) => {
    const path = [...base, ...issue.path];
    if (issue.code === "unrecognized_keys") {
      return issue.keys
        .slice(0, LIMIT)
        .map((key) => ({ pointer: pointerTo([...path, key]), detail: "This field is not known here" }));
    }
    if (issue.code === "invalid_union" && issue.errors.length > 0) return flatten(closestBranch(issue.errors), path);
    if (issue.code === "invalid_key" || issue.code === "invalid_element") return flatten(issue.issues, path);
    return [{ pointer: pointerTo(path), detail: issue.message }];
  });
}

/** Of the alternatives of a union, the one that was most likely meant: it fails deepest, then least often. */
function closestBranch(branches: readonly (readonly ZodIssue[])[]): readonly ZodIssue[] {
  const depth = (branch: readonly ZodIssue[]) => branch.reduce((deepest, { path }) => Math.max(deepest, path.length), 0);
  return [...branches].sort((a, b) => depth(b) - depth(a) || a.length - b.length)[0] ?? [];
}

/**
 * Words for what a schema leaves to the default. A message written in the schema stays.
 * Pass as `schema.safeParse(value, { error: issueWords })`.
 */
export const issueWords: z.core.$ZodErrorMap = (issue) => {
  switch (issue.code) {
    case "invalid_type":
      return issue.input === undefined ? "This is missing" : `This must be ${KINDS[issue.expected] ?? issue.expected}`;
    case "invalid_value":
      return `This must be one of: ${issue.values.slice(0, 20).join(", ")}`;
    case "invalid_union":
      return issue.discriminator ? `"${issue.discriminator}" names none of the kinds that can stand here` : undefined;
    case "too_small":
      return `At least ${issue.minimum} ${amount(issue.origin, issue.minimum)}`.trim();
    case "too_big":
      return `At most ${issue.maximum} ${amount(issue.origin, issue.maximum)}`.trim();
    case "invalid_format":
      return FORMATS[issue.format];
    case "not_multiple_of":
      return `This must be a multiple of ${issue.divisor}`;
    default:
      return undefined;
  }
};

const KINDS: Readonly<Record<string, string>> = {
  string: "text",
  number: "a finite number",
  int: "a whole number",
  boolean: "true or false",
  array: "a list",
  object: "an object",
  record: "an object",
  null: "null",
};

const FORMATS: Readonly<Record<string, string>> = {
  uuid: "This is not an identifier of ours",
  email: "This is not an e-mail address",
  datetime: "This must be a UTC time such as 2031-04-05T06:07:08Z",
};

function amount(origin: string, count: number | bigint): string {
  const one = Number(count) === 1;
  if (origin === "string") return one ? "character" : "characters";
  if (origin === "array" || origin === "set") return one ? "entry" : "entries";
  return "";
}
