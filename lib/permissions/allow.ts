import { DomainError } from "@/lib/errors";
import type { Role, Scope } from "@/lib/schemas/team";
import { RIGHTS, type Right } from "./rights";

/** What a decision looks at. `tokenId` stands there when a program asks with an access token. */
export type Asker = { readonly role: Role; readonly scope: Scope; readonly tokenId?: string | undefined };

export function isAllowed(asker: Asker, right: Right): boolean {
  if (!Object.hasOwn(RIGHTS, right)) return false;
  const { roles, changes, byToken } = RIGHTS[right];
  if (!roles.some((role) => role === asker.role)) return false;
  if (asker.tokenId !== undefined && !byToken) return false;
  return asker.scope === "write" || (asker.scope === "read" && !changes);
}

/** The first line of every verb. @throws DomainError forbidden */
export function allow(asker: Asker, right: Right): void {
  if (isAllowed(asker, right)) return;
  const { roles, byToken } = RIGHTS[right];
  if (!roles.some((role) => role === asker.role)) {
    throw new DomainError("forbidden", `This needs the role ${roles.join(" or ")}; yours is ${asker.role}.`, { right });
  }
  if (asker.tokenId !== undefined && !byToken) {
    throw new DomainError("forbidden", "This is done on a page, signed in, and never with an access token.", { right });
  }
  throw new DomainError("forbidden", "An access token with the scope read changes nothing; this needs the scope write.", {
    right,
  });
}
