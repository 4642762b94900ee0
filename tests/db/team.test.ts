import { afterAll, describe, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { readProfile } from "@/lib/services/account/read-profile";
import { signIn } from "@/lib/services/account/sign-in";
import { signUp } from "@/lib/services/account/sign-up";
import type { Context } from "@/lib/services/context";
import { acceptInvitation, joinByInvitation } from "@/lib/services/team/accept-invitation";
import { listInvitations, withdrawInvitation } from "@/lib/services/team/invitations";
import { invite } from "@/lib/services/team/invite";
import { listAuditEvents } from "@/lib/services/team/list-audit-events";
import { changeRole, listMembers, removeMember } from "@/lib/services/team/members";
import { previewInvitation } from "@/lib/services/team/open-invitation";
import { renameTeam } from "@/lib/services/team/teams";
import { lastMailTo, lastSecretTo } from "../helpers/last-mail";
import {
  memberOf,
  newEmail,
  newTeam,
  PASSWORD,
  refusalOf,
  requestId,
  sessionOfMember,
  someone,
  visitor,
} from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(closePool);
const admin = (statement: string, values: unknown[] = []) => withClient(adminUrl, (client) => client.query(statement, values));
const kinds = async (ctx: Context) => (await listAuditEvents(ctx, { limit: 100 })).items.map(({ kind }) => kind);
const refused = (work: () => Promise<unknown>) => refusalOf(Promise.resolve().then(work));

describe("signing up", () => {
  test("makes an account and a team, whose lead it is", async () => {
    const email = newEmail();
    const { userId, teamId } = await signUp(visitor(), { name: "Mara", email, password: PASSWORD, teamName: "Levitation" });
    const ctx: Context = { teamId, userId, role: "lead", scope: "write", requestId };
    expect(await listMembers(ctx)).toEqual([{ userId, name: "Mara", email, role: "lead", joinedAt: expect.any(String) }]);
    expect(await kinds(ctx)).toEqual(["team.started"]);
    expect(await signIn(visitor(), { email, password: PASSWORD })).toMatchObject({ userId });
  });

  test("with an address that has an account is refused at the field, twice at once as well", { timeout: 60_000 }, async () => {
    const input = { name: "Mara", email: newEmail(), password: PASSWORD, teamName: "Twice" };
    const outcomes = await Promise.allSettled([signUp(visitor(), input), signUp(visitor(), input)]);
    expect(outcomes.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
    expect(await refusalOf(signUp(visitor(), input))).toMatchObject({ code: "conflict", issues: [{ pointer: "/email" }] });
    expect((await admin("select 1 from teams where name = 'Twice'")).rowCount).toBe(1);
  });
});

describe("an invitation", () => {
  test("brings somebody new into the team with the role it names", { timeout: 60_000 }, async () => {
    const lead = await newTeam("Web line");
    const email = newEmail();
    await invite(lead, { email, role: "reviewer" });
    const secret = await lastSecretTo(adminUrl, email);
    expect(await previewInvitation({ secret })).toEqual({
      teamName: "Web line",
      email,
      role: "reviewer",
      invitedBy: "Test Lead",
      hasAccount: false,
    });
    const { userId } = await joinByInvitation(visitor(), { secret, name: "Ines", password: PASSWORD });
    expect((await listMembers(lead)).find((member) => member.userId === userId)).toMatchObject({
      name: "Ines",
      email,
      role: "reviewer",
    });
    expect(await kinds(lead)).toEqual(["member.joined", "invitation.sent"]);
    expect(await listInvitations(lead)).toEqual([]);
    expect(await refusalOf(joinByInvitation(visitor(), { secret, name: "Again", password: PASSWORD }))).toMatchObject({
      code: "invalid",
    });
  });

  test("brings somebody with an account, signed in with that address alone", async () => {
    const lead = await newTeam();
    const who = await someone("Jonas");
    const home = await newTeam();
    await memberOf(home.teamId, "engineer", who);
    const person = { ...(await sessionOfMember({ teamId: home.teamId, userId: who.userId })), email: who.email };
    await invite(lead, { email: who.email, role: "engineer" });
    const secret = await lastSecretTo(adminUrl, who.email);
    expect((await previewInvitation({ secret })).hasAccount).toBe(true);
    const other = { ...(await sessionOfMember(home)), email: "lead@saltmarsh.example" };
    expect(await refusalOf(acceptInvitation(other, { secret }))).toMatchObject({ code: "forbidden" });
    expect(await acceptInvitation(person, { secret })).toEqual({ teamId: lead.teamId });
    const profile = await readProfile(person, null);
    expect(profile.teams.map(({ id, role }) => [id, role])).toContainEqual([lead.teamId, "engineer"]);
    expect(await refusalOf(acceptInvitation(person, { secret }))).toMatchObject({ code: "invalid" });
  });

  test("used by two at once brings one", { timeout: 60_000 }, async () => {
    const lead = await newTeam();
    const email = newEmail();
    await invite(lead, { email, role: "engineer" });
    const secret = await lastSecretTo(adminUrl, email);
    const join = () => joinByInvitation(visitor(), { secret, name: "Twin", password: PASSWORD });
    const outcomes = await Promise.allSettled([join(), join()]);
    expect(outcomes.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
    expect(await listMembers(lead)).toHaveLength(2);
  });

  test("ends when it is withdrawn, replaced or seven days old", async () => {
    const lead = await newTeam();
    const email = newEmail();
    await invite(lead, { email, role: "engineer" });
    const first = await lastSecretTo(adminUrl, email);
    const second = await invite(lead, { email, role: "reviewer" });
    expect(await refusalOf(previewInvitation({ secret: first }))).toMatchObject({
      code: "invalid",
      issues: [{ pointer: "/secret" }],
    });
    expect(await listInvitations(lead)).toEqual([second]);
    const secret = await lastSecretTo(adminUrl, email);
    expect((await previewInvitation({ secret })).role).toBe("reviewer");
    await withdrawInvitation(lead, second.id);
    expect(await refusalOf(previewInvitation({ secret }))).toMatchObject({ code: "invalid" });
    expect(await refusalOf(withdrawInvitation(lead, second.id))).toMatchObject({ code: "not-found" });
    await invite(lead, { email, role: "engineer" });
    const late = await lastSecretTo(adminUrl, email);
    await admin("update invitations set expires_at = now() where email = $1", [email]);
    expect(await refusalOf(previewInvitation({ secret: late }))).toMatchObject({ code: "invalid" });
  });

  test("to a member is refused, and so is another team's invitation", async () => {
    const [lead, other] = [await newTeam(), await newTeam()];
    const who = await someone();
    await memberOf(lead.teamId, "engineer", who);
    expect(await refusalOf(invite(lead, { email: who.email, role: "lead" }))).toMatchObject({ code: "conflict" });
    const theirs = await invite(other, { email: newEmail(), role: "engineer" });
    expect(await refusalOf(withdrawInvitation(lead, theirs.id))).toMatchObject({ code: "not-found" });
  });

  test("whose inviter or team is named to start a header or a tag of its own does neither", async () => {
    const lead = await newTeam();
    await renameTeam(lead, { name: 'A</p><script>alert("1")</script>' });
    await admin("update users set name = E'Mallory\\r\\nBcc: all@saltmarsh.example' where id = $1", [lead.userId]);
    const email = newEmail();
    await invite(lead, { email, role: "engineer" });
    const mail = await lastMailTo(adminUrl, email);
    expect(mail?.subject).toContain("Mallory Bcc: all@saltmarsh.example invites you");
    expect(mail?.subject).not.toMatch(/[\r\n]/);
    expect(mail?.html).not.toContain("<script>");
    expect(mail?.html).toContain("&lt;script&gt;");
  });
});

describe("members", () => {
  test("are listed with addresses to leads; others see their own", async () => {
    const lead = await newTeam();
    const reviewer = await memberOf(lead.teamId, "reviewer");
    expect((await listMembers(lead)).every(({ email }) => email !== null)).toBe(true);
    const seen = await listMembers(reviewer);
    expect(seen.filter(({ email }) => email !== null).map(({ userId }) => userId)).toEqual([reviewer.userId]);
  });

  test("leave their name on what they did, and come back as who they were", async () => {
    const lead = await newTeam();
    const who = await someone("Former Member");
    const engineer = await memberOf(lead.teamId, "engineer", who);
    await removeMember(engineer, who.userId);
    const { items } = await listAuditEvents(lead, { limit: 10 });
    expect(items[0]).toMatchObject({ kind: "member.left", actor: "Former Member", subjectId: who.userId, requestId });
    expect(await listMembers(lead)).toHaveLength(1);
    await memberOf(lead.teamId, "reviewer", who);
    expect((await listMembers(lead)).map(({ role }) => role).sort()).toEqual(["lead", "reviewer"]);
  });

  test("of another team are not found", async () => {
    const [lead, other] = [await newTeam(), await newTeam()];
    expect(await refusalOf(changeRole(lead, other.userId, { role: "reviewer" }))).toMatchObject({ code: "not-found" });
    expect(await refusalOf(removeMember(lead, other.userId))).toMatchObject({ code: "not-found" });
  });

  test("are managed by leads alone", async () => {
    const lead = await newTeam();
    for (const role of ["engineer", "reviewer"] as const) {
      const ctx = await memberOf(lead.teamId, role);
      const attempts = [
        () => invite(ctx, { email: newEmail(), role: "lead" }),
        () => listInvitations(ctx),
        () => changeRole(ctx, ctx.userId, { role: "lead" }),
        () => removeMember(ctx, lead.userId),
        () => renameTeam(ctx, { name: "Ours now" }),
      ];
      for (const attempt of attempts) expect(await refused(attempt)).toMatchObject({ code: "forbidden" });
    }
    expect((await listMembers(lead)).filter(({ role }) => role === "lead")).toHaveLength(1);
  });

  test("always include a lead: the last one neither leaves nor steps down", async () => {
    const lead = await newTeam();
    await memberOf(lead.teamId, "engineer");
    expect(await refusalOf(removeMember(lead, lead.userId))).toMatchObject({ code: "conflict" });
    expect(await refusalOf(changeRole(lead, lead.userId, { role: "engineer" }))).toMatchObject({ code: "conflict" });
    const second = await memberOf(lead.teamId, "lead");
    expect(await changeRole(lead, lead.userId, { role: "engineer" })).toMatchObject({ role: "engineer" });
    expect(await refusalOf(removeMember(second, second.userId))).toMatchObject({ code: "conflict" });
  });

  test("keep a lead when all twenty of them step down at once", { timeout: 60_000 }, async () => {
    const first = await newTeam();
    const leads = [first];
    while (leads.length < 20) leads.push(await memberOf(first.teamId, "lead"));
    const outcomes = await Promise.allSettled(
      leads.map((lead, index) =>
        index % 2 ? removeMember(lead, lead.userId) : changeRole(lead, lead.userId, { role: "reviewer" }),
      ),
    );
    const refusals = outcomes.filter((outcome) => outcome.status === "rejected");
    expect(refusals.map(({ reason }) => reason.code)).toEqual(["conflict"]);
    expect((await listMembers(first)).filter(({ role }) => role === "lead")).toHaveLength(1);
  });
});
