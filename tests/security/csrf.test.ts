import { randomUUID } from "node:crypto";
import { beforeAll, expect, test } from "vitest";
import { catalogue } from "@/app/api/v1/openapi.json/catalogue";
import { closePool } from "@/db/client";
import { METHODS } from "@/lib/api/openapi";
import type { DeclaredRoute } from "@/lib/api/route";
import { call, ORIGIN, signedIn } from "../helpers/call-route";
import { newTeam } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
let cookie: string;
beforeAll(async () => {
  ({ cookie } = await signedIn(await newTeam()));
  return closePool;
});

type Change = {
  readonly name: string;
  readonly method: string;
  readonly route: DeclaredRoute;
  readonly params: Record<string, string>;
};
const changes: Change[] = [];
const reads: Change[] = [];
for (const [path, load] of Object.entries(catalogue)) {
  const module = await load();
  const params = Object.fromEntries([...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => [name, randomUUID()]));
  for (const method of METHODS) {
    const route = module[method];
    if (route) (method === "GET" ? reads : changes).push({ name: `${method} ${path}`, method, route, params });
  }
}

test("there are changing routes to try", () => expect(changes.length).toBeGreaterThan(20));

test.each(changes)(
  "$name is refused without an origin, from another site, from another port and from a sandbox",
  async ({ method, route, params }) => {
    const sources: Record<string, string>[] = [
      {},
      { origin: "https://elsewhere.example" },
      { origin: "http://localhost:3001" },
      { origin: "null" },
      { "sec-fetch-site": "cross-site", referer: `${ORIGIN}/plants` },
      { "sec-fetch-site": "same-site" },
      { "sec-fetch-site": "none" },
      { "x-middleware-subrequest": "proxy:proxy:proxy:proxy:proxy" },
    ];
    for (const source of sources) {
      const response = await call(route, { method, params, headers: { cookie, ...source }, body: {} });
      expect([response.status, source]).toEqual([403, source]);
    }
  },
);

test.each(changes.filter(({ route }) => route.declaration.body))(
  "$name takes no form and no plain text",
  async ({ method, route, params }) => {
    for (const type of ["application/x-www-form-urlencoded", "multipart/form-data; boundary=x", "text/plain"]) {
      const headers = { cookie: (await signedIn(await newTeam())).cookie, origin: ORIGIN, "content-type": type };
      const response = await call(route, { method, params, headers, body: "name=x" });
      expect([response.status, type]).toEqual([415, type]);
    }
  },
);

test.each(reads)("$name needs no origin, since it changes nothing", async ({ route, params }) => {
  const response = await call(route, { params, headers: { cookie, origin: "https://elsewhere.example" } });
  expect(response.status).not.toBe(403);
  expect(response.headers.has("access-control-allow-origin")).toBe(false);
});
