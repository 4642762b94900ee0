import { randomUUID } from "node:crypto";
import { afterAll, expect, test } from "vitest";
import { POST } from "@/app/api/v1/plants/route";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { call, signedIn } from "../helpers/call-route";
import { checksum, eachFault } from "../helpers/fault-injection";
import { newTeam } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(closePool);

test("whichever statement of a create fails, nothing of it is stored, and the same key then makes exactly one", async () => {
  const ctx = await newTeam();
  const headers = { ...(await signedIn(ctx)), "idempotency-key": randomUUID() };
  const body = { name: "Once", content: twoCarriages() };
  const before = await checksum(adminUrl);
  const statuses: number[] = [];
  const post = async () => {
    const response = await call(POST, { method: "POST", path: "/api/v1/plants", headers, body });
    statuses.push(response.status);
    if (response.status !== 201) throw new Error(await response.text());
  };
  const faults = await eachFault(post, async (at, error) => {
    expect(await checksum(adminUrl), `after statement ${at} failed`).toBe(before);
    expect(String(error), `after statement ${at} failed`).toContain('"code":"internal"');
    expect(String(error)).not.toMatch(/statement \d+ failed/);
  });
  // Session, limits, key, plant, revision, audit, reply and every begin and commit around them.
  expect(faults).toBeGreaterThan(12);
  expect(statuses.at(-1)).toBe(201);
  await post();
  const { rows } = await withClient(adminUrl, (client) =>
    client.query("select (select count(*)::int from plants) as plants, (select count(*)::int from idempotency_keys) as keys"),
  );
  expect(rows[0]).toEqual({ plants: 1, keys: 1 });
});
