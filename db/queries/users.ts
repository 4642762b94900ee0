import "server-only";
import { and, eq } from "drizzle-orm";
import type { Db } from "../client";
import { users } from "../schema/people";

export type UserRow = typeof users.$inferSelect;

/** Needs the setting `user_id` to be the new id. */
export async function insertUser(db: Db, user: Omit<UserRow, "createdAt">): Promise<void> {
  await db.insert(users).values(user);
}

/** Needs the setting `email`, as before a sign-in. */
export async function findUserByEmail(db: Db, email: string): Promise<UserRow | undefined> {
  const [row] = await db.select().from(users).where(eq(users.email, email));
  return row;
}

export async function findUser(db: Db, userId: string): Promise<UserRow | undefined> {
  const [row] = await db.select().from(users).where(eq(users.id, userId));
  return row;
}

export async function renameUser(db: Db, userId: string, name: string): Promise<UserRow | undefined> {
  const [row] = await db.update(users).set({ name }).where(eq(users.id, userId)).returning();
  return row;
}

export async function setPasswordHash(db: Db, userId: string, passwordHash: string): Promise<void> {
  await db.update(users).set({ passwordHash }).where(eq(users.id, userId));
}

/** Only over the hash that the given password was checked against: of two changes at once the second is refused. */
export async function replacePasswordHash(db: Db, userId: string, checked: string, passwordHash: string): Promise<boolean> {
  const changed = await db
    .update(users)
    .set({ passwordHash })
    .where(and(eq(users.id, userId), eq(users.passwordHash, checked)))
    .returning({ id: users.id });
  return changed.length === 1;
}
