import "server-only";
import { and, asc, eq, isNull } from "drizzle-orm";
import type { Db } from "../client";
import { memberships, teams } from "../schema/people";

export type TeamRow = typeof teams.$inferSelect;

/** Needs the setting `team_id` to be the new id. */
export async function insertTeam(db: Db, team: { readonly id: string; readonly name: string }): Promise<TeamRow> {
  const [row] = await db.insert(teams).values(team).returning();
  return row;
}

export async function findTeam(db: Db, teamId: string): Promise<TeamRow | undefined> {
  const [row] = await db.select().from(teams).where(eq(teams.id, teamId));
  return row;
}

export async function renameTeamRow(db: Db, teamId: string, name: string): Promise<TeamRow | undefined> {
  const [row] = await db.update(teams).set({ name }).where(eq(teams.id, teamId)).returning();
  return row;
}

/** The teams a person belongs to now, in a steady order. */
export async function listTeamsOf(db: Db, userId: string) {
  return db
    .select({ id: teams.id, name: teams.name, role: memberships.role })
    .from(memberships)
    .innerJoin(teams, eq(teams.id, memberships.teamId))
    .where(and(eq(memberships.userId, userId), isNull(memberships.removedAt)))
    .orderBy(asc(teams.name), asc(teams.id));
}
