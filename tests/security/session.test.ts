import { afterAll, beforeEach, describe, expect, test, vi } from "vitest";
import { closePool, pool } from "@/db/client";
import { contextOf, sessionOf } from "@/lib/auth/session";
import { withClient } from "@/lib/commands/databases.mjs";
import { askAuth, cookieHeader, signInByForm, signOutByForm } from "../helpers/auth-requests";
import { memberOf, newTeam, PASSWORD, requestId, someone } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(closePool);

const team = await newTeam();
const who = await someone("Ines Caldeira");
await memberOf(team.teamId, "reviewer", who);
const sessionWith = (cookie: string) => sessionOf(new Headers({ cookie }), requestId);
const contextWith = (cookie: string) => contextOf(new Headers({ cookie }), requestId);
const admin = (statement: string, values: unknown[] = []) => withClient(adminUrl, (client) => client.query(statement, values));

beforeEach(() => admin("delete from rate_limits"));

describe("a session cookie", () => {
  test("cannot be read by scripts, is not sent along from other sites, and says nothing but what only we can read", async () => {
    const { reply, cookie } = await signInByForm(who.email, PASSWORD);
    expect(reply.status).toBe(200);
    const [line] = reply.headers.getSetCookie().filter((each) => each.startsWith("gainwright-session="));
    expect(line).toMatch(/; Path=\/; .*HttpOnly; SameSite=Lax$/);
    expect(line).not.toMatch(/Domain=/);
    const session = await sessionWith(cookie);
    for (const secret of [who.userId, session?.person.sessionId ?? "none", who.email]) expect(line).not.toContain(secret);
    // Encrypted, not only signed: the second of five parts, the wrapped key, is empty for a direct key.
    expect(line.split(";")[0].split("=")[1].split(".")).toHaveLength(5);
  });

  test("names a new session after each sign-in, by a random id inside the encrypted part", async () => {
    const [first, second] = [await signInByForm(who.email, PASSWORD), await signInByForm(who.email, PASSWORD)];
    const ids = await Promise.all([first, second].map(async ({ cookie }) => (await sessionWith(cookie))?.person.sessionId));
    expect(ids[0]).toMatch(/^[0-9a-f]{8}-[0-9a-f]{4}-4[0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/);
    expect(ids[1]).not.toBe(ids[0]);
  });

  test("stands for the person, their team and the role they hold now", async () => {
    const { cookie } = await signInByForm(who.email, PASSWORD);
    expect(await contextWith(cookie)).toEqual({
      teamId: team.teamId,
      userId: who.userId,
      role: "reviewer",
      scope: "write",
      requestId,
    });
  });

  test("that was changed, cut, made with another key or never made is nobody's", async () => {
    const { cookie } = await signInByForm(who.email, PASSWORD);
    const value = /gainwright-session=([^;]+)/.exec(cookie)?.[1] ?? "";
    const flipped = value.slice(0, -2) + (value.endsWith("A") ? "BB" : "AA");
    for (const wrong of [flipped, value.slice(0, 40), "", "null", "a.b.c.d.e", `${value}x`]) {
      expect(await sessionWith(`gainwright-session=${wrong}`), wrong).toBeNull();
    }
    const { encode } = await import("next-auth/jwt");
    const session = await sessionWith(cookie);
    const claims = { sub: who.userId, sid: session?.person.sessionId };
    const forged = await encode({ token: claims, secret: "another secret of more than 32 characters" });
    expect(await sessionWith(`gainwright-session=${forged}`)).toBeNull();
  });

  test("of one person does not open another's session", async () => {
    const other = await someone();
    const { cookie } = await signInByForm(who.email, PASSWORD);
    const { encode } = await import("next-auth/jwt");
    const sid = (await sessionWith(cookie))?.person.sessionId;
    const mixed = await encode({ token: { sub: other.userId, sid }, secret: process.env.NEXTAUTH_SECRET ?? "" });
    expect(await sessionWith(`gainwright-session=${mixed}`)).toBeNull();
  });
});

describe("a session ends", () => {
  test("24 hours after its last use, and while it is used the last use moves on", async () => {
    const { cookie } = await signInByForm(who.email, PASSWORD);
    const id = (await sessionWith(cookie))?.person.sessionId;
    await admin("update sessions set last_seen_at = now() - interval '23 hours 59 minutes' where id = $1", [id]);
    expect(await contextWith(cookie)).not.toBeNull();
    const { rows } = await admin("select last_seen_at > now() - interval '1 minute' as moved from sessions where id = $1", [id]);
    expect(rows).toEqual([{ moved: true }]);
    await admin("update sessions set last_seen_at = now() - interval '24 hours 1 second' where id = $1", [id]);
    expect(await contextWith(cookie)).toBeNull();
  });

  test("14 days after it began, however busy", async () => {
    const { cookie } = await signInByForm(who.email, PASSWORD);
    const id = (await sessionWith(cookie))?.person.sessionId;
    const { rows } = await admin("select expires_at - created_at = interval '14 days' as right from sessions where id = $1", [
      id,
    ]);
    expect(rows).toEqual([{ right: true }]);
    await admin("update sessions set expires_at = now() where id = $1", [id]);
    expect(await contextWith(cookie)).toBeNull();
  });

  test("with signing out, for a copy of its cookie too", async () => {
    const { cookie } = await signInByForm(who.email, PASSWORD);
    expect(await contextWith(cookie)).not.toBeNull();
    const reply = await signOutByForm(cookie);
    expect(reply.status).toBe(200);
    expect(cookieHeader(reply)).not.toContain("gainwright-session=");
    expect(await contextWith(cookie)).toBeNull();
    expect(await (await askAuth("session", { cookie })).json()).not.toHaveProperty("user.email");
  });

  test("or signing out says that it did not work", async () => {
    const { cookie } = await signInByForm(who.email, PASSWORD);
    const connect = vi
      .spyOn(pool(), "connect")
      .mockImplementation(() => Promise.reject(new Error("timeout exceeded when trying to connect")));
    const reply = await signOutByForm(cookie);
    connect.mockRestore();
    expect(reply.status).toBe(503);
    expect(reply.headers.get("retry-after")).toMatch(/^\d+$/);
    expect(await contextWith(cookie)).not.toBeNull();
  });
});

describe("what next-auth answers", () => {
  test("tells a page the name and address of who is signed in, and no identifier", async () => {
    const { cookie } = await signInByForm(who.email, PASSWORD);
    const told = await (await askAuth("session", { cookie })).json();
    expect(told).toEqual({ user: { name: who.name, email: who.email }, expires: expect.any(String) });
    const cold = await (await askAuth("session")).json();
    expect(cold).toEqual({});
  });

  test("is never kept by a cache, carries a request id, and is a problem when refused", async () => {
    const reply = await askAuth("session");
    expect(reply.headers.get("cache-control")).toMatch(/no-store/);
    expect(reply.headers.get("x-request-id")).toMatch(/^[\w-]{8,}$/);
    const unknown = await askAuth("nonsense");
    expect(unknown.status).toBe(404);
    expect(unknown.headers.get("content-type")).toBe("application/problem+json");
  });

  test("to a form from another site, or from nowhere, is no", async () => {
    const first = await askAuth("csrf");
    const { csrfToken } = (await first.json()) as { csrfToken: string };
    const form = { email: who.email, password: PASSWORD, csrfToken, json: "true" };
    const from = (headers: Record<string, string>) =>
      askAuth("callback/credentials", { cookie: cookieHeader(first), form, headers });
    expect((await from({ origin: "https://elsewhere.example" })).status).toBe(403);
    expect((await from({ origin: "null" })).status).toBe(403);
    expect((await from({ origin: "https://elsewhere.example", "sec-fetch-site": "cross-site" })).status).toBe(403);
    expect((await from({ "content-type": "text/plain" })).status).toBe(415);
    expect((await from({ "content-type": "application/json" })).status).toBe(415);
    expect((await from({})).status).toBe(200);
  });

  test("without the token against forged requests signs nobody in", async () => {
    const form = { email: who.email, password: PASSWORD, csrfToken: "0".repeat(64), json: "true" };
    const reply = await askAuth("callback/credentials", { form });
    expect(reply.headers.getSetCookie().join()).not.toContain("gainwright-session=");
  });

  test("to a body of more than 16 kB is 413", async () => {
    const reply = await askAuth("callback/credentials", { form: { email: "x".repeat(20_000) } });
    expect(reply.status).toBe(413);
  });

  test("to a wrong password is 401 without a cookie", async () => {
    const { reply, cookie } = await signInByForm(who.email, "not the password");
    expect(reply.status).toBe(401);
    expect(cookie).not.toContain("gainwright-session=");
  });

  test("to an outside address as the place to go on to is our own front door", async () => {
    const first = await askAuth("csrf");
    const { csrfToken } = (await first.json()) as { csrfToken: string };
    const form = { email: who.email, password: PASSWORD, csrfToken, callbackUrl: "https://elsewhere.example/", json: "true" };
    const reply = await askAuth("callback/credentials", { cookie: cookieHeader(first), form });
    const { url } = (await reply.json()) as { url: string };
    expect(new URL(url).origin).toBe("http://localhost:3000");
  });
});

test("over https every cookie belongs to this host alone and to encrypted connections", async () => {
  vi.resetModules();
  const before = process.env.NEXTAUTH_URL;
  process.env.NEXTAUTH_URL = "https://gainwright.example";
  try {
    const { handleAuth } = await import("@/lib/auth/handler");
    const request = new Request("https://gainwright.example/api/auth/csrf");
    const first = await handleAuth(request, { params: Promise.resolve({ nextauth: ["csrf"] }) });
    const { csrfToken } = (await first.json()) as { csrfToken: string };
    const signIn = new Request("https://gainwright.example/api/auth/callback/credentials", {
      method: "POST",
      headers: {
        origin: "https://gainwright.example",
        "content-type": "application/x-www-form-urlencoded",
        cookie: cookieHeader(first),
      },
      body: new URLSearchParams({ email: who.email, password: PASSWORD, csrfToken, json: "true" }).toString(),
    });
    const reply = await handleAuth(signIn, { params: Promise.resolve({ nextauth: ["callback", "credentials"] }) });
    expect(reply.status).toBe(200);
    const lines = [...first.headers.getSetCookie(), ...reply.headers.getSetCookie()];
    expect(lines.map((line) => line.split("=")[0])).toContain("__Host-gainwright-session");
    for (const line of lines) {
      expect(line).toMatch(/^__Host-gainwright-/);
      expect(line).toMatch(/; Secure/);
      expect(line).toMatch(/; Path=\/;/);
      expect(line).not.toMatch(/Domain=/i);
    }
  } finally {
    process.env.NEXTAUTH_URL = before;
  }
});
