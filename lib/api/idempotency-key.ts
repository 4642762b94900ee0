import { createHash } from "node:crypto";
import { DomainError } from "@/lib/errors";
import type { Once } from "@/lib/services/idempotency/run-once";

/** Bare, as most callers send it, or as the quoted string of the header's specification. */
const KEY = /^(?:([A-Za-z0-9_-]{8,128})|"([A-Za-z0-9_-]{8,128})")$/;

/** The key, the place it counts for, and a fingerprint of everything that makes this request what it is. */
export function onceOf(request: Request, bytes: Uint8Array): Once {
  const given = request.headers.get("idempotency-key");
  if (given === null) {
    throw new DomainError(
      "unreadable",
      "Send an Idempotency-Key, such as a fresh UUID, so that a repeated request creates nothing twice.",
    );
  }
  const [, bare, quoted] = KEY.exec(given.trim()) ?? [];
  const key = bare ?? quoted;
  if (!key) throw new DomainError("unreadable", "An Idempotency-Key has 8 to 128 letters, digits, hyphens or underscores.");
  const { pathname, search } = new URL(request.url);
  const fingerprint = createHash("sha256")
    .update(JSON.stringify([search, request.headers.get("if-match")]))
    .update(bytes)
    .digest("hex");
  return { route: `${request.method} ${pathname}`, key, fingerprint };
}
