import { afterAll, describe, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { contextOf, sessionOf } from "@/lib/auth/session";
import { withClient } from "@/lib/commands/databases.mjs";
import { createAccessToken, listAccessTokens, revokeAccessToken } from "@/lib/services/account/access-tokens";
import { changePassword } from "@/lib/services/account/change-password";
import { endSessions } from "@/lib/services/account/end-sessions";
import { requestReset } from "@/lib/services/account/request-reset";
import { resetPassword } from "@/lib/services/account/reset-password";
import type { Context } from "@/lib/services/context";
import { changeRole, removeMember } from "@/lib/services/team/members";
import { startTeam, switchTeam } from "@/lib/services/team/teams";
import { signInByForm } from "../helpers/auth-requests";
import { lastSecretTo } from "../helpers/last-mail";
import { memberOf, newTeam, PASSWORD, refusalOf, requestId, type Someone, someone, visitor } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(closePool);
const team = await newTeam();

const withCookie = (cookie: string) => contextOf(new Headers({ cookie }), requestId);
const withToken = (secret: string) => contextOf(new Headers({ authorization: `Bearer ${secret}` }), requestId);

async function personWith(cookie: string) {
  const session = await sessionOf(new Headers({ cookie }), requestId);
  if (!session) throw new Error("no session");
  return session.person;
}

async function signedInTwice(): Promise<{ who: Someone; here: string; there: string }> {
  const who = await someone();
  await memberOf(team.teamId, "engineer", who);
  const [here, there] = [await signInByForm(who.email, PASSWORD), await signInByForm(who.email, PASSWORD)];
  expect(await withCookie(here.cookie)).toMatchObject({ role: "engineer" });
  expect(await withCookie(there.cookie)).toMatchObject({ role: "engineer" });
  return { who, here: here.cookie, there: there.cookie };
}

describe("on the very next request", () => {
  test("after ending other sessions, those are dead and this one lives", async () => {
    const { here, there } = await signedInTwice();
    expect(await endSessions(await personWith(here), "others")).toBe(1);
    expect(await withCookie(there)).toBeNull();
    expect(await withCookie(here)).not.toBeNull();
  });

  test("after signing out everywhere, all are dead", async () => {
    const { here, there } = await signedInTwice();
    expect(await endSessions(await personWith(here), "all")).toBe(2);
    expect(await withCookie(here)).toBeNull();
    expect(await withCookie(there)).toBeNull();
  });

  test("after a new password, the other sessions are dead", { timeout: 60_000 }, async () => {
    const { here, there } = await signedInTwice();
    const person = await personWith(here);
    const wrong = changePassword(person, { currentPassword: "not the password", newPassword: "sixteen stages" });
    expect(await refusalOf(wrong)).toMatchObject({ code: "invalid", issues: [{ pointer: "/currentPassword" }] });
    expect(await withCookie(there)).not.toBeNull();
    await changePassword(person, { currentPassword: PASSWORD, newPassword: "seventeen stages" });
    expect(await withCookie(there)).toBeNull();
    expect(await withCookie(here)).not.toBeNull();
  });

  test("after a password was chosen by a link, every session is dead", { timeout: 60_000 }, async () => {
    const { who, here, there } = await signedInTwice();
    await requestReset(visitor(), { email: who.email });
    await resetPassword(visitor(), { secret: await lastSecretTo(adminUrl, who.email), password: "eighteen stages" });
    expect(await withCookie(here)).toBeNull();
    expect(await withCookie(there)).toBeNull();
  });

  test("after a change of role, session and token carry the new one", async () => {
    const { who, here } = await signedInTwice();
    const asEngineer = await withCookie(here);
    const { secret } = await createAccessToken(asEngineer as Context, { name: "Script", scope: "write", expiresInDays: 1 });
    await changeRole(team, who.userId, { role: "reviewer" });
    expect(await withCookie(here)).toMatchObject({ role: "reviewer" });
    expect(await withToken(secret)).toMatchObject({ role: "reviewer" });
  });

  test("after removal from the team, sessions and tokens of it are dead", async () => {
    const { who, here, there } = await signedInTwice();
    const member = (await withCookie(here)) as Context;
    const { secret } = await createAccessToken(member, { name: "Script", scope: "read", expiresInDays: 1 });
    expect(await withToken(secret)).toMatchObject({ userId: who.userId });
    await removeMember(team, who.userId);
    for (const cookie of [here, there]) expect(await sessionOf(new Headers({ cookie }), requestId)).toBeNull();
    expect(await withToken(secret)).toBeNull();
    const { cookie } = await signInByForm(who.email, PASSWORD);
    expect(await withCookie(cookie)).toBeNull();
    expect(await personWith(cookie)).toMatchObject({ userId: who.userId });
  });

  test("a removal in one team leaves the work in another alone", async () => {
    const { who, here, there } = await signedInTwice();
    const other = await startTeam(await personWith(there), { name: "Their own" });
    await removeMember(team, who.userId);
    expect(await withCookie(here)).toBeNull();
    expect(await withCookie(there)).toMatchObject({ teamId: other.id, role: "lead" });
  });
});

describe("an access token", () => {
  test("is shown once, kept as a hash, bound to its team, scope and day, and remembers its last use", async () => {
    const { secret, ...shown } = await createAccessToken(team, { name: "Nightly", scope: "read", expiresInDays: 30 });
    expect(secret).toMatch(/^gw_[\w-]{43}$/);
    expect(new Date(shown.expiresAt).getTime() - new Date(shown.createdAt).getTime()).toBe(30 * 24 * 3600 * 1000);
    const stored = await withClient(adminUrl, (client) =>
      client.query("select t::text as row from access_tokens t where id = $1", [shown.id]),
    );
    expect(stored.rows[0].row).not.toContain(secret.slice(3));
    expect(await withToken(secret)).toEqual({
      teamId: team.teamId,
      userId: team.userId,
      role: "lead",
      scope: "read",
      requestId,
      tokenId: shown.id,
    });
    const [listed] = (await listAccessTokens(team)).filter(({ id }) => id === shown.id);
    expect(listed).toEqual({ ...shown, lastUsedAt: expect.stringMatching(/^\d{4}-/) });
  });

  test("ends when it is revoked and when its time is over", async () => {
    const first = await createAccessToken(team, { name: "First", scope: "read", expiresInDays: 1 });
    await revokeAccessToken(team, first.id);
    expect(await withToken(first.secret)).toBeNull();
    expect(await refusalOf(revokeAccessToken(team, first.id))).toMatchObject({ code: "not-found" });
    const second = await createAccessToken(team, { name: "Second", scope: "read", expiresInDays: 1 });
    await withClient(adminUrl, (client) =>
      client.query("update access_tokens set expires_at = now() where id = $1", [second.id]),
    );
    expect(await withToken(second.secret)).toBeNull();
  });

  test("is its owner's alone: a lead of the team neither sees nor revokes it", async () => {
    const engineer = await memberOf(team.teamId, "engineer");
    const { id } = await createAccessToken(engineer, { name: "Mine", scope: "write", expiresInDays: 1 });
    expect((await listAccessTokens(team)).map((token) => token.id)).not.toContain(id);
    expect(await refusalOf(revokeAccessToken(team, id))).toMatchObject({ code: "not-found" });
  });

  test("makes, lists and revokes no tokens", async () => {
    const { secret, id } = await createAccessToken(team, { name: "Ambitious", scope: "write", expiresInDays: 1 });
    const ctx = (await withToken(secret)) as Context;
    const attempts: (() => Promise<unknown>)[] = [
      () => createAccessToken(ctx, { name: "Child", scope: "write", expiresInDays: 1 }),
      () => listAccessTokens(ctx),
      () => revokeAccessToken(ctx, id),
    ];
    for (const attempt of attempts) expect(await refusalOf(Promise.resolve().then(attempt))).toMatchObject({ code: "forbidden" });
  });

  test("that is not one of ours is nobody's, and no cookie stands in for it", async () => {
    const who = await someone();
    await memberOf(team.teamId, "engineer", who);
    const { cookie } = await signInByForm(who.email, PASSWORD);
    for (const authorization of [
      "Bearer gw_nothing",
      `Bearer gw_${"A".repeat(43)}`,
      "Bearer",
      "Basic YTpi",
      "",
      "Bearer a b",
      `Bearer ${"x".repeat(9000)}`,
    ]) {
      expect(await contextOf(new Headers({ cookie, authorization }), requestId), authorization).toBeNull();
    }
  });
});

test("switching teams moves one session and needs a membership there", async () => {
  const { who, here, there } = await signedInTwice();
  const other = await newTeam("Other team");
  const person = await personWith(here);
  expect(await refusalOf(switchTeam(person, { teamId: other.teamId }))).toMatchObject({ code: "not-found" });
  await memberOf(other.teamId, "reviewer", who);
  await switchTeam(person, { teamId: other.teamId });
  expect(await withCookie(here)).toMatchObject({ teamId: other.teamId, role: "reviewer" });
  expect(await withCookie(there)).toMatchObject({ teamId: team.teamId, role: "engineer" });
});
