import type { Role, Scope } from "@/lib/schemas/team";

/** Who asks, for which team, by which right. Made once per request from the session or the access token. */
export type Context = {
  readonly teamId: string;
  readonly userId: string;
  readonly role: Role;
  /** A session may do what the role may; a token also needs the scope. */
  readonly scope: Scope;
  readonly requestId: string;
  /** The access token that asked; absent for a session. */
  readonly tokenId?: string | undefined;
};

/** Somebody signed in, whichever team they work in or none: what an account's own verbs take. */
export type Person = {
  readonly userId: string;
  readonly sessionId: string;
  readonly name: string;
  readonly email: string;
  readonly requestId: string;
};

/** Nobody known yet. `address` is the network address that limits on guessing count by. */
export type Visitor = { readonly address: string; readonly requestId: string };
