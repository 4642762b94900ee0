import { createServer, request as httpRequest } from "node:http";
import type { AddressInfo } from "node:net";
import { afterAll, describe, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { clientAddress, noteClientAddresses } from "@/lib/auth/client-address";
import { withClient } from "@/lib/commands/databases.mjs";
import { requestReset } from "@/lib/services/account/request-reset";
import { resetPassword } from "@/lib/services/account/reset-password";
import { signIn } from "@/lib/services/account/sign-in";
import { signInByForm } from "../helpers/auth-requests";
import { lastMailTo, lastSecretTo } from "../helpers/last-mail";
import { newEmail, PASSWORD, refusalOf, someone, visitor } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(closePool);
const admin = (statement: string, values: unknown[] = []) => withClient(adminUrl, (client) => client.query(statement, values));
/** Lets the time pass that somebody was told to wait. */
const waitOver = () => admin("update rate_limits set expire = 0 where key like 'guess-ticket%'");
const WRONG = "not the password";

describe("guessing a password", () => {
  test("is free five times, then answered 429 with the seconds to wait, and the wait doubles", { timeout: 60_000 }, async () => {
    const { email } = await someone();
    const from = visitor();
    for (let round = 0; round < 5; round++) expect(await signIn(from, { email, password: WRONG })).toBeUndefined();
    const waits: number[] = [];
    for (let round = 0; round < 4; round++) {
      const { code, data } = await refusalOf(signIn(from, { email, password: WRONG }));
      expect(code).toBe("too-many-requests");
      waits.push((data as { retryAfter: number }).retryAfter);
      await waitOver();
      expect(await signIn(from, { email, password: WRONG })).toBeUndefined();
    }
    expect(waits.map((wait) => Math.round(wait / 15))).toEqual([1, 2, 4, 8]);
  });

  test("is answered by the sign-in route with 429 and Retry-After, and a place to show it", { timeout: 60_000 }, async () => {
    const { email } = await someone();
    for (let round = 0; round < 5; round++) expect((await signInByForm(email, WRONG, "192.0.2.7")).reply.status).toBe(401);
    const { reply } = await signInByForm(email, PASSWORD, "192.0.2.7");
    expect(reply.status).toBe(429);
    expect(Number(reply.headers.get("retry-after"))).toBeGreaterThanOrEqual(1);
    expect(await reply.json()).toMatchObject({ code: "too-many-requests", status: 429 });
  });

  test("never shuts out the person it is tried on, who comes from elsewhere", { timeout: 60_000 }, async () => {
    const { email } = await someone();
    const attacker = visitor();
    for (let round = 0; round < 8; round++) await signIn(attacker, { email, password: WRONG }).catch(() => undefined);
    expect(await refusalOf(signIn(attacker, { email, password: PASSWORD }))).toMatchObject({ code: "too-many-requests" });
    expect(await signIn(visitor(), { email, password: PASSWORD })).toMatchObject({ userId: expect.any(String) });
  });

  test("twenty times at once is no way around: five are looked at", { timeout: 60_000 }, async () => {
    const { email } = await someone();
    const from = visitor();
    const outcomes = await Promise.allSettled(Array.from({ length: 20 }, () => signIn(from, { email, password: WRONG })));
    const codes = outcomes.map((outcome) => (outcome.status === "rejected" ? outcome.reason.code : "looked at"));
    expect(codes.filter((code) => code === "looked at").length).toBeLessThanOrEqual(5);
    expect(codes.filter((code) => code === "too-many-requests").length).toBeGreaterThanOrEqual(15);
  });

  test("starts anew after the right password", { timeout: 60_000 }, async () => {
    const { email } = await someone();
    const from = visitor();
    for (let turn = 0; turn < 2; turn++) {
      for (let round = 0; round < 4; round++) expect(await signIn(from, { email, password: WRONG })).toBeUndefined();
      expect(await signIn(from, { email, password: PASSWORD })).toBeDefined();
    }
  });

  test("is told nothing about whether the account exists: the limit counts for unknown addresses too", {
    timeout: 60_000,
  }, async () => {
    const email = newEmail();
    const from = visitor();
    for (let round = 0; round < 5; round++) expect(await signIn(from, { email, password: WRONG })).toBeUndefined();
    expect(await refusalOf(signIn(from, { email, password: WRONG }))).toMatchObject({ code: "too-many-requests" });
  });

  test("leaves no address or mail in the counters", async () => {
    const { email } = await someone();
    const from = visitor();
    await signIn(from, { email, password: WRONG });
    const { rows } = await admin(
      "select count(*)::int as count from rate_limits where key like '%' || $1 || '%' or key like '%' || $2 || '%'",
      [email, from.address],
    );
    expect(rows).toEqual([{ count: 0 }]);
  });
});

describe("a link for a new password", () => {
  test("is answered alike, and in the same time, for an address without an account", async () => {
    const { email } = await someone();
    const timed = async (address: string) => {
      const began = performance.now();
      const answer = await requestReset(visitor(), { email: address });
      return { answer, ms: performance.now() - began };
    };
    const [known, unknown] = [await timed(email), await timed(newEmail())];
    expect(unknown.answer).toEqual(known.answer);
    // Both wait for the same moment; the margin is for a busy machine.
    for (const { ms } of [known, unknown]) expect(ms).toBeGreaterThanOrEqual(299);
    expect(Math.abs(known.ms - unknown.ms)).toBeLessThan(150);
  });

  test("works once, within 60 minutes, and only its hash is kept", { timeout: 60_000 }, async () => {
    const { email, userId } = await someone();
    await requestReset(visitor(), { email });
    const secret = await lastSecretTo(adminUrl, email);
    const { rows } = await admin(
      "select r::text as row, expires_at - created_at as life from password_resets r where user_id = $1",
      [userId],
    );
    expect(rows).toHaveLength(1);
    expect(rows[0].row).not.toContain(secret);
    expect(rows[0].life).toMatchObject({ hours: 1 });
    await resetPassword(visitor(), { secret, password: "ten webs of paper" });
    expect(await signIn(visitor(), { email, password: PASSWORD })).toBeUndefined();
    expect(await signIn(visitor(), { email, password: "ten webs of paper" })).toBeDefined();
    expect(await refusalOf(resetPassword(visitor(), { secret, password: "eleven webs of paper" }))).toMatchObject({
      code: "invalid",
    });
    expect((await lastMailTo(adminUrl, email))?.subject).toBe("Your password was changed");
  });

  test("used twice at once works once", { timeout: 60_000 }, async () => {
    const { email } = await someone();
    await requestReset(visitor(), { email });
    const secret = await lastSecretTo(adminUrl, email);
    const uses = ["a first new password", "a second new password"].map((password) =>
      resetPassword(visitor(), { secret, password }),
    );
    const outcomes = await Promise.allSettled(uses);
    expect(outcomes.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
  });

  test("ends after its hour, and when another link was used", { timeout: 60_000 }, async () => {
    const { email, userId } = await someone();
    await requestReset(visitor(), { email });
    const older = await lastSecretTo(adminUrl, email);
    await requestReset(visitor(), { email });
    const newer = await lastSecretTo(adminUrl, email);
    await resetPassword(visitor(), { secret: newer, password: "twelve webs of paper" });
    expect(await refusalOf(resetPassword(visitor(), { secret: older, password: "thirteen webs" }))).toMatchObject({
      code: "invalid",
    });
    await requestReset(visitor(), { email });
    const late = await lastSecretTo(adminUrl, email);
    await admin("update password_resets set expires_at = now() where user_id = $1", [userId]);
    expect(await refusalOf(resetPassword(visitor(), { secret: late, password: "fourteen webs" }))).toMatchObject({
      code: "invalid",
    });
  });

  test("is sent three times an hour at most, without a word about it", async () => {
    const { email } = await someone();
    for (let round = 0; round < 5; round++) await requestReset(visitor(), { email });
    const { rows } = await admin("select count(*)::int as count from outbox where recipient = $1", [email]);
    expect(rows).toEqual([{ count: 3 }]);
  });

  test("that nobody was sent opens nothing", async () => {
    const guess = { secret: "A".repeat(43), password: "fifteen webs of paper" };
    expect(await refusalOf(resetPassword(visitor(), guess))).toMatchObject({ code: "invalid", issues: [{ pointer: "/secret" }] });
  });
});

describe("the address that limits count by", () => {
  test("is the connection's, whatever the request claims", async () => {
    noteClientAddresses();
    const server = createServer((request, response) => {
      const headers = new Headers();
      for (const [name, value] of Object.entries(request.headers)) if (typeof value === "string") headers.set(name, value);
      response.end(clientAddress(headers));
    });
    await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
    const { port } = server.address() as AddressInfo;
    const ask = (headers: Record<string, string>) =>
      new Promise<string>((resolve, reject) => {
        const sent = httpRequest({ port, host: "127.0.0.1", headers }, (reply) => {
          let text = "";
          reply.on("data", (part) => {
            text += part;
          });
          reply.on("end", () => resolve(text));
        });
        sent.on("error", reject).end();
      });
    const claims = { "x-forwarded-for": "203.0.113.9", "x-real-ip": "203.0.113.9", "x-gainwright-address": "guess 203.0.113.9" };
    expect(await ask({})).toBe("127.0.0.1");
    expect(await ask(claims)).toBe("127.0.0.1");
    await new Promise((resolve) => server.close(resolve));
  });

  test("is unknown to a request that no server of ours has taken in", () => {
    noteClientAddresses();
    expect(clientAddress(new Headers({ "x-gainwright-address": "x 203.0.113.9", "x-forwarded-for": "203.0.113.9" }))).toBe(
      "unknown",
    );
    expect(clientAddress(new Headers())).toBe("unknown");
  });

  test.each([
    ["::ffff:192.0.2.1", "192.0.2.1"],
    ["2001:db8:1:2:3:4:5:6", "2001:db8:1:2::/64"],
    ["2001:db8::1", "2001:db8:0:0::/64"],
    ["::1", "0:0:0:0::/64"],
    ["192.0.2.1", "192.0.2.1"],
  ])("%s counts as %s", (address, counted) => {
    noteClientAddresses();
    const proof = (globalThis as { gainwrightAddressProof?: string }).gainwrightAddressProof;
    expect(clientAddress(new Headers({ "x-gainwright-address": `${proof} ${address}` }))).toBe(counted);
  });
});
