import type { Role } from "@/lib/schemas/team";

/**
 * The one table of who may do what. `changes` says which rights a token with the read scope does not have; `byToken` which
 * rights no token has: nobody can invite, promote or make further tokens with a leaked one.
 */
const everybody = ["lead", "engineer", "reviewer"] as const;
const builders = ["lead", "engineer"] as const;
const leads = ["lead"] as const;

type Entry = { readonly roles: readonly Role[]; readonly changes: boolean; readonly byToken: boolean };
const reading = (roles: readonly Role[]): Entry => ({ roles, changes: false, byToken: true });
const writing = (roles: readonly Role[]): Entry => ({ roles, changes: true, byToken: true });
const inPerson = (roles: readonly Role[], changes = true): Entry => ({ roles, changes, byToken: false });

export const RIGHTS = {
  "plant:read": reading(everybody),
  "plant:write": writing(builders),
  "design:read": reading(everybody),
  "design:write": writing(builders),
  /** Computes without storing: a reader's tool. */
  "compute:use": reading(everybody),
  "comparison:read": reading(everybody),
  "comparison:write": writing(everybody),
  "template:read": reading(everybody),
  "template:use": writing(builders),
  "template:publish": writing(leads),
  "team:read": reading(everybody),
  "team:manage": inPerson(leads),
  "audit:read": reading(everybody),
  "token:own": inPerson(everybody),
  "account:own": inPerson(everybody),
  /** The demo's page of mails, which hold live links. */
  "outbox:read": inPerson(leads, false),
} as const satisfies Record<string, Entry>;

export type Right = keyof typeof RIGHTS;
