import { afterAll, describe, expect, test, vi } from "vitest";
import { closePool } from "@/db/client";
import { createAccessToken, revokeAccessToken } from "@/lib/services/account/access-tokens";
import { changePassword } from "@/lib/services/account/change-password";
import { endSessions } from "@/lib/services/account/end-sessions";
import { requestReset } from "@/lib/services/account/request-reset";
import { resetPassword } from "@/lib/services/account/reset-password";
import { signIn } from "@/lib/services/account/sign-in";
import { signUp } from "@/lib/services/account/sign-up";
import { acceptInvitation, joinByInvitation } from "@/lib/services/team/accept-invitation";
import { withdrawInvitation } from "@/lib/services/team/invitations";
import { invite, issue } from "@/lib/services/team/invite";
import { changeRole, removeMember } from "@/lib/services/team/members";
import { renameTeam, startTeam, switchTeam } from "@/lib/services/team/teams";
import { checksum, eachFault } from "../helpers/fault-injection";
import { lastSecretTo } from "../helpers/last-mail";
import { memberOf, newEmail, newTeam, PASSWORD, sessionOfMember, someone, visitor } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

// Each verb runs some twenty times, and what a password costs is measured elsewhere.
vi.mock("node:crypto", async (original) => (await import("../helpers/quick-crypto")).quickCrypto(await original()));

const { adminUrl } = await testDatabase();
afterAll(closePool);

const team = await newTeam();
const lead = await sessionOfMember(team);

async function inSeries<T>(times: number, make: () => Promise<T>): Promise<T[]> {
  const made: T[] = [];
  while (made.length < times) made.push(await make());
  return made;
}

function lastOf<T>(list: T[]): T {
  const last = list.pop();
  if (last === undefined) throw new Error("more tries than were prepared for");
  return last;
}

type Verb = { readonly name: string; readonly arrange: () => Promise<() => Promise<unknown>> };

const verbs: Verb[] = [
  {
    name: "signing up",
    arrange: async () => () => signUp(visitor(), { name: "New", email: newEmail(), password: PASSWORD, teamName: "New team" }),
  },
  {
    name: "signing in",
    arrange: async () => {
      const { email } = await someone();
      return () => signIn(visitor(), { email, password: PASSWORD });
    },
  },
  {
    name: "asking for a new password",
    arrange: async () => {
      const people = await inSeries(40, () => someone());
      return () => requestReset(visitor(), { email: lastOf(people).email });
    },
  },
  {
    name: "choosing a new password",
    arrange: async () => {
      const { email } = await someone();
      await requestReset(visitor(), { email });
      const secret = await lastSecretTo(adminUrl, email);
      return () => resetPassword(visitor(), { secret, password: "eight levitated stages" });
    },
  },
  {
    name: "changing the password",
    arrange: async () => {
      // One for each try: every one counts against guessing.
      const people = await inSeries(40, async () => {
        const member = await memberOf(team.teamId, "engineer");
        return { ...(await sessionOfMember(member)), email: newEmail() };
      });
      return () => changePassword(lastOf(people), { currentPassword: PASSWORD, newPassword: "nine tanks in a row" });
    },
  },
  {
    name: "ending all sessions",
    arrange: async () => {
      const member = await memberOf(team.teamId, "reviewer");
      const person = await sessionOfMember(member);
      await sessionOfMember(member);
      return () => endSessions(person, "all");
    },
  },
  { name: "inviting", arrange: async () => () => invite(team, { email: newEmail(), role: "engineer" }) },
  {
    name: "withdrawing an invitation",
    arrange: async () => {
      const { invitation } = await issue(team, { email: newEmail(), role: "engineer" });
      return () => withdrawInvitation(team, invitation.id);
    },
  },
  {
    name: "joining as somebody new",
    arrange: async () => {
      const { secret } = await issue(team, { email: newEmail(), role: "engineer" });
      return () => joinByInvitation(visitor(), { secret, name: "Joiner", password: PASSWORD });
    },
  },
  {
    name: "accepting an invitation",
    arrange: async () => {
      const other = await newTeam();
      const person = { ...(await sessionOfMember(other)), email: newEmail() };
      const { secret } = await issue(team, { email: person.email, role: "reviewer" });
      return () => acceptInvitation(person, { secret });
    },
  },
  {
    name: "changing a role",
    arrange: async () => {
      const { userId } = await memberOf(team.teamId, "engineer");
      return () => changeRole(team, userId, { role: "reviewer" });
    },
  },
  {
    name: "removing a member",
    arrange: async () => {
      const member = await memberOf(team.teamId, "engineer");
      await sessionOfMember(member);
      await createAccessToken(member, { name: "Script", scope: "read", expiresInDays: 1 });
      return () => removeMember(team, member.userId);
    },
  },
  { name: "renaming the team", arrange: async () => () => renameTeam(team, { name: "Another name" }) },
  { name: "starting a team", arrange: async () => () => startTeam(lead, { name: "Second team" }) },
  {
    name: "switching teams",
    arrange: async () => {
      const { teamId } = await newTeam();
      await memberOf(teamId, "reviewer", { userId: team.userId, email: "", name: "" });
      return () => switchTeam(lead, { teamId });
    },
  },
  {
    name: "creating an access token",
    arrange: async () => () => createAccessToken(team, { name: "Script", scope: "write", expiresInDays: 30 }),
  },
  {
    name: "revoking an access token",
    arrange: async () => {
      const { id } = await createAccessToken(team, { name: "Script", scope: "write", expiresInDays: 30 });
      return () => revokeAccessToken(team, id);
    },
  },
];

describe("a statement that fails leaves every table as it was", () => {
  test.each(verbs)("$name", { timeout: 120_000 }, async ({ arrange }) => {
    const act = await arrange();
    const before = await checksum(adminUrl);
    const faults = await eachFault(act, async (at) => {
      expect(await checksum(adminUrl), `after a fault in place of statement ${at}`).toBe(before);
    });
    expect(faults).toBeGreaterThanOrEqual(4);
    expect(await checksum(adminUrl)).not.toBe(before);
  });
});
