import { randomUUID } from "node:crypto";
import { asVisitor, inTransaction } from "@/db/client";
import { addMember } from "@/db/queries/memberships";
import { insertSession } from "@/db/queries/sessions";
import { insertTeam } from "@/db/queries/teams";
import { insertUser } from "@/db/queries/users";
import type { Role } from "@/lib/schemas/team";
import { hashPassword } from "@/lib/services/account/password-hash";
import type { Context, Person, Visitor } from "@/lib/services/context";

export const requestId = "request-of-a-test";
/** Each visitor comes from an address of its own, so that limits of one test do not reach another. */
export const visitor = (): Visitor => ({ address: `10.${randomByte()}.${randomByte()}.${randomByte()}`, requestId });
const randomByte = () => Math.floor(Math.random() * 256);
export const newEmail = () => `${randomUUID()}@saltmarsh.example`;

export const PASSWORD = "seven gantries at dusk";
let hashed: Promise<string> | undefined;

export type Someone = { readonly userId: string; readonly email: string; readonly name: string };

/** An account whose password is `PASSWORD`; hashed once per file, since hashing is slow on purpose. */
export async function someone(name = "Test Person"): Promise<Someone> {
  hashed ??= hashPassword(PASSWORD);
  const made = { id: randomUUID(), email: newEmail(), name, passwordHash: await hashed };
  await asVisitor((tx) => insertUser(tx, made), { user_id: made.id });
  return { userId: made.id, email: made.email, name };
}

/** A new team with its lead. */
export async function newTeam(name = "Test Team"): Promise<Context> {
  const lead = await someone("Test Lead");
  const teamId = randomUUID();
  await asVisitor((tx) => insertTeam(tx, { id: teamId, name }), { team_id: teamId });
  return memberOf(teamId, "lead", lead);
}

export async function memberOf(teamId: string, role: Role, who?: Someone): Promise<Context> {
  const { userId } = who ?? (await someone(`Test ${role}`));
  await inTransaction({ teamId, userId }, (tx) => addMember(tx, { teamId, userId }, role));
  return { teamId, userId, role, scope: "write", requestId };
}

/** A session as signing in makes it. */
export async function sessionOfMember({ teamId, userId }: Pick<Context, "teamId" | "userId">): Promise<Person> {
  const session = await inTransaction({ teamId, userId }, (tx) => insertSession(tx, { userId, teamId, lifetimeSeconds: 3600 }));
  return { userId, sessionId: session.id, name: "Test Person", email: "", requestId };
}

/** What a refused promise was refused with. */
export async function refusalOf(
  promise: Promise<unknown>,
): Promise<{ code?: string; message: string; data?: unknown; issues?: unknown }> {
  const outcome = await promise.then(
    () => undefined,
    (error: unknown) => error,
  );
  if (!(outcome instanceof Error)) throw new Error("nothing was refused");
  return outcome;
}
