import "server-only";
import { asVisitor, type Db } from "@/db/client";
import { listTeamsOf } from "@/db/queries/teams";
import { findUser, renameUser, type UserRow } from "@/db/queries/users";
import { NotFound } from "@/lib/errors";
import type { ChangeName, Profile } from "@/lib/schemas/account";
import type { Context, Person } from "../context";

/** `context` as the session gave it, null without a team. */
export function readProfile(person: Person, context: Context | null): Promise<Profile> {
  return asVisitor(async (tx) => toProfile(tx, await findUser(tx, person.userId), context), { user_id: person.userId });
}

export function changeName(person: Person, context: Context | null, { name }: ChangeName): Promise<Profile> {
  return asVisitor(async (tx) => toProfile(tx, await renameUser(tx, person.userId, name), context), { user_id: person.userId });
}

async function toProfile(tx: Db, user: UserRow | undefined, context: Context | null): Promise<Profile> {
  if (!user) throw new NotFound("Account");
  const { id, name, email, createdAt } = user;
  const teams = await listTeamsOf(tx, id);
  return { id, name, email, createdAt: createdAt.toISOString(), currentTeamId: context?.teamId ?? null, teams };
}
