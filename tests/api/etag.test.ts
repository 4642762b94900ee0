import { beforeAll, expect, test } from "vitest";
import { GET, PATCH } from "@/app/api/v1/plants/[plantId]/route";
import { closePool } from "@/db/client";
import type { Context } from "@/lib/services/context";
import { createPlant } from "@/lib/services/plants/create";
import { member } from "../helpers/api";
import { call, problemIn, signedIn } from "../helpers/call-route";
import { newTeam } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights } from "../helpers/recipes";
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

/** The version in a tag, which a read's checksum may follow. */
const versionIn = (response: Response) => Number(/^"(\d+)(?:\.[0-9a-f]{16})?"$/.exec(response.headers.get("etag") ?? "")?.[1]);

test("a read gives the version in a strong tag, and 304 for a tag it still has", async () => {
  const response = await read();
  const tag = response.headers.get("etag") ?? "";
  expect(response.status).toBe(200);
  expect(versionIn(response)).toBe((await response.json()).version);
  for (const given of [tag, `W/${tag}`, `"999", ${tag}`, "*"]) {
    const unchanged = await read({ "if-none-match": given });
    expect([unchanged.status, unchanged.headers.get("etag"), await unchanged.text()]).toEqual([304, tag, ""]);
  }
  for (const given of ['"999"', `"${versionIn(response)}"`, "nonsense"])
    expect((await read({ "if-none-match": given })).status, given).toBe(200);
});

test("what changes without its version is never answered 304: a plant's designs, a design's newer plant", async () => {
  const { ctx, api } = await member();
  const { id, currentRevision } = await createPlant(ctx, { name: "Tilt", content: twoCarriages(), note: "" });
  const first = await api.ask("GET", `/api/v1/plants/${id}`);
  const body = { name: "Soft", plantRevisionId: currentRevision.id, recipe: byWeights() };
  const made = await api.post<{ id: string; currentRevision: { id: string } }>(`/api/v1/plants/${id}/designs`, body);
  const again = (path: string, response: Response) =>
    api.ask("GET", path, { headers: { "if-none-match": response.headers.get("etag") ?? "" } });
  const second = await again(`/api/v1/plants/${id}`, first);
  expect([second.status, versionIn(second)]).toEqual([200, versionIn(first)]);
  expect([await first.json(), await second.json()]).toMatchObject([{ designCount: 0 }, { designCount: 1 }]);
  // A change looks at the version alone: what was read before that design still serves.
  const renamed = await api.ask("PATCH", `/api/v1/plants/${id}`, {
    body: { name: "Tilt 2" },
    headers: { "if-match": first.headers.get("etag") ?? "" },
  });
  expect(renamed.status).toBe(200);

  const design = await api.ask("GET", `/api/v1/designs/${made.id}`);
  expect((await again(`/api/v1/designs/${made.id}`, design)).status).toBe(304);
  await api.post(`/api/v1/plants/${id}/revisions`, { content: twoCarriages({ source: "Measured again" }) }, versionIn(renamed));
  const outdated = await again(`/api/v1/designs/${made.id}`, design);
  expect([outdated.status, (await outdated.json()).outdated]).toEqual([200, true]);
});

test("a change without If-Match is answered 428 and changes nothing", async () => {
  const response = await rename("Other");
  expect(await problemIn(response)).toMatchObject({ status: 428, code: "precondition-required" });
  expect((await (await read()).json()).name).toBe("Gantry");
});

test("a stale version is answered 412 with the stored one, and changes nothing", async () => {
  const current = versionIn(await read());
  const response = await rename("Stale", { "if-match": '"99"' });
  expect(versionIn(response)).toBe(current);
  expect(await problemIn(response)).toMatchObject({ status: 412, code: "stale-version", given: 99, current });
  expect((await (await read()).json()).name).toBe("Gantry");
});

test.each([
  ['W/"1"', 412],
  ["*", 400],
  ['"1", "2"', 400],
  ["1", 400],
  ['"0"', 400],
  ['"1e3"', 400],
  ['W/"1.0123456789abcdef"', 412],
  ['"1.0123"', 400],
])("If-Match %s is refused with %i", async (given, status) => {
  const response = await rename("Weak", { "if-match": given });
  expect(response.status).toBe(status);
  expect((await (await read()).json()).name).toBe("Gantry");
});

test("of twenty writers on one version one is answered 200 and nineteen 412", async () => {
  const before = await read();
  const tag = before.headers.get("etag") ?? "";
  const responses = await Promise.all(Array.from({ length: 20 }, (_, index) => rename(`Gantry ${index}`, { "if-match": tag })));
  const statuses = responses.map(({ status }) => status).sort();
  expect(statuses).toEqual([200, ...Array.from({ length: 19 }, () => 412)]);
  const winner = responses.find(({ status }) => status === 200);
  expect(winner && versionIn(winner)).toBe(versionIn(before) + 1);
});
