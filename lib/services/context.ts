import type { Role, Scope } from "@/lib/schemas/team";

/** Who asks, for which team, by which right. Made once per request from the session or the access token. */
export type Context = {
  readonly teamId: string;
  readonly userId: string;
  readonly role: Role;
  /** A session may do what the role may; a token also needs the scope. */
  readonly scope: Scope;
  readonly requestId: string;
};
