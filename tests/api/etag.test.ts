import { beforeAll, expect, test } from "vitest";
import { GET, PATCH } from "@/app/api/v1/plants/[plantId]/route";
import { closePool } from "@/db/client";
import type { Context } from "@/lib/services/context";
import { createPlant } from "@/lib/services/plants/create";
import { call, problemIn, signedIn } from "../helpers/call-route";
import { newTeam } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
let ctx: Context;
let headers: Record<string, string>;
let plantId: string;
beforeAll(async () => {
  ctx = await newTeam();
  headers = await signedIn(ctx);
  plantId = (await createPlant(ctx, { name: "Gantry", content: twoCarriages(), note: "" })).id;
  return closePool;
});

const read = (more: Record<string, string> = {}) => call(GET, { params: { plantId }, headers: { ...headers, ...more } });
const rename = (name: string, more: Record<string, string> = {}) =>
  call(PATCH, { method: "PATCH", params: { plantId }, headers: { ...headers, ...more }, body: { name } });

test("a read gives the version as a strong tag, and 304 for a tag it still has", async () => {
  const response = await read();
  const tag = response.headers.get("etag") ?? "";
  expect(response.status).toBe(200);
  expect(tag).toBe(`"${(await response.json()).version}"`);
  for (const given of [tag, `W/${tag}`, `"999", ${tag}`, "*"]) {
    const unchanged = await read({ "if-none-match": given });
    expect([unchanged.status, unchanged.headers.get("etag"), await unchanged.text()]).toEqual([304, tag, ""]);
  }
  expect((await read({ "if-none-match": '"999"' })).status).toBe(200);
});

test("a change without If-Match is answered 428 and changes nothing", async () => {
  const response = await rename("Other");
  expect(await problemIn(response)).toMatchObject({ status: 428, code: "precondition-required" });
  expect((await (await read()).json()).name).toBe("Gantry");
});

test("a stale version is answered 412 with the stored one, and changes nothing", async () => {
  const tag = (await read()).headers.get("etag") ?? "";
  const response = await rename("Stale", { "if-match": '"99"' });
  expect(response.headers.get("etag")).toBe(tag);
  expect(await problemIn(response)).toMatchObject({
    status: 412,
    code: "stale-version",
    given: 99,
    current: Number(tag.slice(1, -1)),
  });
  expect((await (await read()).json()).name).toBe("Gantry");
});

test.each([
  ['W/"1"', 412],
  ["*", 400],
  ['"1", "2"', 400],
  ["1", 400],
  ['"0"', 400],
  ['"1e3"', 400],
])("If-Match %s is refused with %i", async (given, status) => {
  const response = await rename("Weak", { "if-match": given });
  expect(response.status).toBe(status);
  expect((await (await read()).json()).name).toBe("Gantry");
});

test("of twenty writers on one version one is answered 200 and nineteen 412", async () => {
  const tag = (await read()).headers.get("etag") ?? "";
  const responses = await Promise.all(Array.from({ length: 20 }, (_, index) => rename(`Gantry ${index}`, { "if-match": tag })));
  const statuses = responses.map(({ status }) => status).sort();
  expect(statuses).toEqual([200, ...Array.from({ length: 19 }, () => 412)]);
  const winner = responses.find(({ status }) => status === 200);
  expect(winner?.headers.get("etag")).toBe(`"${Number(tag.slice(1, -1)) + 1}"`);
});
