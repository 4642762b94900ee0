import { randomUUID } from "node:crypto";
import { afterAll, expect, test } from "vitest";
import { z } from "zod";
import { POST } from "@/app/api/v1/plants/route";
import { closePool } from "@/db/client";
import { route } from "@/lib/api/route";
import { withClient } from "@/lib/commands/databases.mjs";
import { DomainError } from "@/lib/errors";
import type { Context } from "@/lib/services/context";
import { createPlant } from "@/lib/services/plants/create";
import { call, problemIn, signedIn } from "../helpers/call-route";
import { memberOf, newTeam } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(closePool);

const body = (name: string) => ({ name, content: twoCarriages() });
const post = (headers: Record<string, string>, key: string, name: string) =>
  call(POST, { method: "POST", path: "/api/v1/plants", headers: { ...headers, "idempotency-key": key }, body: body(name) });

/** Past row security: how many plants of that name a team has. */
async function stored({ teamId }: Context, name: string): Promise<number> {
  const sql = "select count(*)::int as count from plants where team_id = $1 and name = $2";
  const { rows } = await withClient(adminUrl, (client) => client.query(sql, [teamId, name]));
  return rows[0].count;
}

test("ten equal creates at once make one plant and get one reply", async () => {
  const ctx = await newTeam();
  const headers = await signedIn(ctx);
  const key = randomUUID();
  const responses = await Promise.all(Array.from({ length: 10 }, () => post(headers, key, "Gimbal")));
  const replies = await Promise.all(responses.map((response) => response.text()));
  expect(responses.map(({ status }) => status)).toEqual(Array.from({ length: 10 }, () => 201));
  expect(new Set(replies).size).toBe(1);
  expect(new Set(responses.map((response) => response.headers.get("location"))).size).toBe(1);
  expect(await stored(ctx, "Gimbal")).toBe(1);
});

test("a key that comes with another body is refused, and the first plant stands", async () => {
  const ctx = await newTeam();
  const headers = await signedIn(ctx);
  const key = randomUUID();
  expect((await post(headers, key, "First")).status).toBe(201);
  expect(await problemIn(await post(headers, key, "Second"))).toMatchObject({ status: 422, code: "invalid" });
  expect([await stored(ctx, "First"), await stored(ctx, "Second")]).toEqual([1, 0]);
});

test("a key counts for one person and one route only", async () => {
  const ctx = await newTeam();
  const colleague = await memberOf(ctx.teamId, "engineer");
  const key = randomUUID();
  expect((await post(await signedIn(ctx), key, "Mine")).status).toBe(201);
  expect((await post(await signedIn(colleague), key, "Mine")).status).toBe(201);
  expect(await stored(ctx, "Mine")).toBe(2);
  const other = await call(POST, {
    method: "POST",
    path: "/api/v1/elsewhere",
    headers: { ...(await signedIn(ctx)), "idempotency-key": key },
    body: body("Mine"),
  });
  expect(other.status).toBe(201);
});

test("a refused create leaves the key free for the corrected one", async () => {
  const headers = await signedIn(await newTeam());
  const key = randomUUID();
  expect((await post(headers, key, "")).status).toBe(422);
  expect((await post(headers, key, "Corrected")).status).toBe(201);
});

test("a create without a key, or with one that is none, is refused", async () => {
  const headers = await signedIn(await newTeam());
  const without = await call(POST, { method: "POST", path: "/api/v1/plants", headers, body: body("x") });
  expect(await problemIn(without)).toMatchObject({ status: 400, code: "unreadable" });
  for (const key of ["short", "a key with spaces", "x".repeat(200)]) expect((await post(headers, key, "x")).status).toBe(400);
});

test("while the first request still runs, the second is told so within seconds", async () => {
  const ctx = await newTeam();
  const headers = { ...(await signedIn(ctx)), "idempotency-key": randomUUID() };
  let finish = () => {};
  const held = new Promise<void>((resolve) => {
    finish = resolve;
  });
  const slow = route(
    { summary: "Create slowly", reply: z.strictObject({ id: z.string() }), idempotent: true, status: 201 },
    async ({ ctx }) => {
      const plant = await createPlant(ctx, { name: "Slow", content: twoCarriages(), note: "" });
      await held;
      return { body: { id: plant.id } };
    },
  );
  const first = call(slow, { method: "POST", headers });
  await new Promise((resolve) => setTimeout(resolve, 300));
  const second = await call(slow, { method: "POST", headers });
  expect(await problemIn(second)).toMatchObject({ status: 409, code: "conflict" });
  expect(Number(second.headers.get("retry-after"))).toBeGreaterThan(0);
  finish();
  const third = await call(slow, { method: "POST", headers });
  expect(await third.text()).toBe(await (await first).text());
  expect(await stored(ctx, "Slow")).toBe(1);
});

test("what a create stored is gone when its reply cannot be kept, so that the key finds both or neither", async () => {
  const ctx = await newTeam();
  const headers = { ...(await signedIn(ctx)), "idempotency-key": randomUUID() };
  let broken = true;
  const fragile = route(
    { summary: "Create and fail", reply: z.strictObject({ id: z.string() }), idempotent: true, status: 201 },
    async ({ ctx }) => {
      const plant = await createPlant(ctx, { name: "Fragile", content: twoCarriages(), note: "" });
      if (broken) throw new DomainError("unavailable", "The power went");
      return { body: { id: plant.id } };
    },
  );
  expect((await call(fragile, { method: "POST", headers })).status).toBe(503);
  expect(await stored(ctx, "Fragile")).toBe(0);
  broken = false;
  expect((await call(fragile, { method: "POST", headers })).status).toBe(201);
  expect(await stored(ctx, "Fragile")).toBe(1);
});

test("after a day a key is free again", async () => {
  const ctx = await newTeam();
  const headers = await signedIn(ctx);
  const key = randomUUID();
  await post(headers, key, "Yesterday");
  const age = "update idempotency_keys set created_at = now() - interval '25 hours' where key = $1";
  await withClient(adminUrl, (client) => client.query(age, [key]));
  expect((await post(headers, key, "Today")).status).toBe(201);
  expect([await stored(ctx, "Yesterday"), await stored(ctx, "Today")]).toEqual([1, 1]);
});
