import { DomainError } from "@/lib/errors";

/**
 * A session cookie travels with requests that other sites cause; a browser marks those, and a page cannot forge the marks.
 * Requests with an access token carry no cookie and are not asked.
 */
export function refuseForeignOrigin(headers: Headers, ourOrigin: string): void {
  if (headers.get("sec-fetch-site") === "same-origin") return;
  if (headers.get("origin") === ourOrigin) return;
  throw new DomainError("forbidden", "A change must come from a page of this service, or carry an access token.");
}
