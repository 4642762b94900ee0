import "server-only";
import { randomUUID } from "node:crypto";
import { adopt, asVisitor, inTransaction } from "@/db/client";
import { addMember, findMember } from "@/db/queries/memberships";
import { moveSession } from "@/db/queries/sessions";
import { findTeam, insertTeam, listTeamsOf, renameTeamRow, type TeamRow } from "@/db/queries/teams";
import { DomainError, NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { RenameTeam, StartTeam, SwitchTeam, Team } from "@/lib/schemas/team";
import { recordEvent } from "../audit";
import type { Context, Person } from "../context";

const MOST_TEAMS = 20;
const toTeam = ({ id, name, createdAt }: TeamRow): Team => ({ id, name, createdAt: createdAt.toISOString() });

export function readTeam(ctx: Context): Promise<Team> {
  allow(ctx, "team:read");
  return inTransaction(ctx, async (tx) => {
    const team = await findTeam(tx, ctx.teamId);
    if (!team) throw new NotFound("Team");
    return toTeam(team);
  });
}

export function renameTeam(ctx: Context, { name }: RenameTeam): Promise<Team> {
  allow(ctx, "team:manage");
  return inTransaction(ctx, async (tx) => {
    const team = await renameTeamRow(tx, ctx.teamId, name);
    if (!team) throw new NotFound("Team");
    await recordEvent(tx, ctx, "team.renamed", { type: "team", id: team.id }, { name });
    return toTeam(team);
  });
}

/** A further team, or the first of somebody who was left without one. The session goes on in it. */
export function startTeam(person: Person, { name }: StartTeam): Promise<Team> {
  const teamId = randomUUID();
  const { userId, requestId } = person;
  return asVisitor(
    async (tx) => {
      if ((await listTeamsOf(tx, userId)).length >= MOST_TEAMS) {
        throw new DomainError("conflict", `You belong to ${MOST_TEAMS} teams, which is the most. Leave one first.`);
      }
      await adopt(tx, { team_id: teamId });
      const team = await insertTeam(tx, { id: teamId, name });
      await addMember(tx, { teamId, userId }, "lead");
      await moveSession(tx, person, teamId);
      await recordEvent(tx, { teamId, userId, requestId }, "team.started", { type: "team", id: teamId });
      return toTeam(team);
    },
    { user_id: userId },
  );
}

/** Everything after this request happens in the other team, in this session alone. */
export function switchTeam(person: Person, { teamId }: SwitchTeam): Promise<void> {
  return asVisitor(
    async (tx) => {
      const member = await findMember(tx, { teamId, userId: person.userId });
      if (!member || !(await moveSession(tx, person, teamId))) throw new NotFound("Team");
    },
    { user_id: person.userId },
  );
}
