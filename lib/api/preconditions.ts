import { createHash } from "node:crypto";
import { DomainError } from "@/lib/errors";

/** The strong tag of a version, as in `ETag: "7"`. */
export const entityTag = (version: number): string => `"${version}"`;

/**
 * The tag of what a read gives, as in `ETag: "7.0f3a…"`: a reply may change without its version, as the number of a plant's
 * designs does. A change looks at the version alone.
 */
export const readTag = (version: number, body: string): string =>
  `"${version}.${createHash("sha256").update(body).digest("hex").slice(0, 16)}"`;

const STRONG_VERSION = /^"([1-9]\d{0,9})(?:\.[0-9a-f]{16})?"$/;

/** The version a change starts from. Exactly one strong tag: a list or `*` would change what nobody has looked at. */
export function versionFromIfMatch(headers: Headers): number {
  const given = headers.get("if-match");
  if (given === null) {
    throw new DomainError("precondition-required", 'Send If-Match with the ETag of the version you have seen, such as "7".');
  }
  const [, version] = STRONG_VERSION.exec(given.trim()) ?? [];
  if (version) return Number(version);
  if (/^\s*W\//.test(given))
    throw new DomainError("stale-version", "If-Match compares strongly, so a weak tag (W/) never matches.");
  throw new DomainError("unreadable", 'If-Match must be one tag as it was received, such as "7".');
}

/** If-None-Match compares weakly (RFC 9110, 13.1.2). */
export function isUnchanged(headers: Headers, tag: string): boolean {
  const given = headers.get("if-none-match");
  if (given === null) return false;
  return given.split(",").some((candidate) => candidate.trim() === "*" || candidate.trim().replace(/^W\//, "") === tag);
}
