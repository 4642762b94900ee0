import { fileURLToPath } from "node:url";
import { afterAll, beforeEach, describe, expect, test, vi } from "vitest";
import { z } from "zod";
import { closePool } from "@/db/client";
import { fileReply } from "@/lib/api/file-reply";
import { route } from "@/lib/api/route";
import { withClient } from "@/lib/commands/databases.mjs";
import { NumericPool } from "@/lib/jobs/numeric-pool";
import { log } from "@/lib/log";
import type { PlantSummary } from "@/lib/schemas/plant";
import { createAccessToken } from "@/lib/services/account/access-tokens";
import { ask, member } from "../helpers/api";
import { signInByForm } from "../helpers/auth-requests";
import { call, signedIn } from "../helpers/call-route";
import { checksum, eachFault } from "../helpers/fault-injection";
import { memberOf, newTeam, PASSWORD, someone, visitor } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(closePool);
beforeEach(() => withClient(adminUrl, (client) => client.query("delete from rate_limits")));
// What goes wrong here goes wrong on purpose; the log is looked at elsewhere.
for (const level of ["error", "warn"] as const) vi.spyOn(log, level).mockImplementation(() => undefined);

/** Of a statement, a stack, a file of ours or of a package, a role or table of the database, or the fault's own words. */
const LEAK =
  /\b(select|insert into|update \w+ set|delete from|set_config)\b|Failed query|statement \d+ failed|\bat \w+ ?\(|\.(ts|js|mjs|sql):?\b|node_modules|\/(srv|root|home|work|tmp)\/|gainwright_(app|owner)|\b(users|memberships|sessions)\b|SQLSTATE|secret-of-the-fault/i;

async function refusedQuietly(response: Response, at: string): Promise<void> {
  const text = await response.clone().text();
  expect(response.status, `${at}: ${text}`).toBe(500);
  expect(text, at).not.toMatch(LEAK);
  expect(Object.keys(JSON.parse(text)).sort(), at).toEqual([
    "code",
    "detail",
    "instance",
    "requestId",
    "status",
    "title",
    "type",
  ]);
  for (const [name, value] of response.headers) expect(`${name}: ${value}`, at).not.toMatch(LEAK);
}

const lead = await member();
const content = twoCarriages();
const plant = await lead.api.post<PlantSummary>("/api/v1/plants", { name: "Gantry", content });
const { userId } = await memberOf(lead.ctx.teamId, "engineer");
const { secret } = await createAccessToken(lead.ctx, { name: "Script", scope: "write", expiresInDays: 1 });
const token = { authorization: `Bearer ${secret}` };
// Its use is noted once a minute, apart from what it is used for.
await ask(token, "GET", "/api/v1/plants");
const { headers } = lead.api;
const { id, currentRevision } = plant;
const removal = `/api/v1/team/members/${userId}`;
const requests = [
  ["reading a plant", () => ask(headers, "GET", `/api/v1/plants/${id}`)],
  ["reading a plant with an access token", () => ask(token, "GET", `/api/v1/plants/${id}`)],
  ["reading lists", () => ask(headers, "GET", "/api/v1/plants?search=a")],
  ["reading the members", () => ask(headers, "GET", "/api/v1/team/members")],
  ["renaming with an access token", () => ask(token, "PATCH", `/api/v1/plants/${id}`, { body: { name: "x" }, version: 1 })],
  ["changing a role", () => ask(headers, "PATCH", removal, { body: { role: "reviewer" } })],
  [
    "computing",
    () =>
      ask(headers, "POST", "/api/v1/computations", { body: { plant: { revisionId: currentRevision.id }, recipe: byWeights() } }),
  ],
] as const;

describe("whichever statement of a request fails, it is denied, changes nothing and tells nothing", () => {
  test.each(requests)("%s", { timeout: 60_000 }, async (_, send) => {
    const before = await checksum(adminUrl);
    let response: Response | undefined;
    const faults = await eachFault(
      async () => {
        response = await send();
      },
      async (at) => {
        if (!response) throw new Error("no reply");
        await refusedQuietly(response, `statement ${at}`);
        expect(await checksum(adminUrl), `statement ${at}`).toBe(before);
      },
    );
    expect(faults).toBeGreaterThanOrEqual(6);
    expect(response?.status).toBeLessThan(300);
  });
});

test("a sign-in during which a statement fails signs nobody in and tells nothing", { timeout: 60_000 }, async () => {
  const { email } = await someone();
  let reply: Response | undefined;
  const faults = await eachFault(
    async () => {
      reply = (await signInByForm(email, PASSWORD, visitor().address)).reply;
    },
    async (at) => {
      if (!reply) throw new Error("no reply");
      const text = await reply.text();
      expect(text, `statement ${at}`).not.toMatch(LEAK);
      expect(reply.status, `statement ${at}: ${text}`).toBe(500);
      expect(reply.headers.getSetCookie().filter((line) => line.startsWith("gainwright-session="))).toEqual([]);
    },
  );
  expect(faults).toBeGreaterThanOrEqual(4);
  expect(reply?.status).toBe(200);
});

describe("whatever a handler does", () => {
  const cyclic = new Error("select secret-of-the-fault from users");
  cyclic.cause = cyclic;
  const thrown: [string, unknown][] = [
    [
      "an error with a statement in it",
      new Error("Failed query: select secret-of-the-fault\nparams: a", { cause: new Error("x") }),
    ],
    ["an error that is its own cause", cyclic],
    ["several errors at once", new AggregateError([new Error("secret-of-the-fault")], "at pool (/srv/app/db/client.ts:1:2)")],
    ["a text", "secret-of-the-fault"],
    ["an object that pretends to be a refusal", { code: "forbidden", message: "secret-of-the-fault", status: 403, data: {} }],
    ["an object without a prototype", Object.assign(Object.create(null), { message: "secret-of-the-fault" })],
    ["nothing", undefined],
  ];
  test.each(thrown)("when it throws %s, only the request id is told", async (_, what) => {
    const broken = route({ summary: "Fail", reply: null }, async () => {
      throw what;
    });
    await refusedQuietly(await call(broken, { headers }), "thrown");
  });

  test("when its reply is not what it declares, nothing of it is sent", async () => {
    const reply = z.strictObject({ count: z.int() });
    const bodies = [{ count: "secret-of-the-fault" }, { count: 1, passwordHash: "secret-of-the-fault" }, { count: Number.NaN }];
    for (const body of bodies) {
      const broken = route({ summary: "Lie", reply }, async () => ({ body: body as { count: number } }));
      await refusedQuietly(await call(broken, { headers }), JSON.stringify(body));
    }
    const file = route({ summary: "Lie", reply: fileReply("text/csv") }, async () => ({
      file: { name: "x.html", type: "text/html", content: "<p>secret-of-the-fault" },
    }));
    await refusedQuietly(await call(file, { headers }), "a file");
  });
});

test("a numeric thread that fails, or answers something else, is told by the request id alone", async () => {
  const script = fileURLToPath(new URL("../helpers/odd-worker.mjs", import.meta.url));
  const kept = globalThis as typeof globalThis & { gainwrightNumericPool?: Promise<NumericPool> };
  const before = kept.gainwrightNumericPool;
  const pool = new NumericPool(1, script);
  kept.gainwrightNumericPool = Promise.resolve(pool);
  try {
    const { api } = await member();
    await refusedQuietly(await api.ask("POST", "/api/v1/checks", { body: { content: twoCarriages() } }), "checks");
  } finally {
    kept.gainwrightNumericPool = before;
    await pool.close();
  }
});

test("a person whose membership is gone, or holds a role that is none, is denied", async () => {
  const lead = await newTeam();
  const engineer = await memberOf(lead.teamId, "engineer");
  const headers = await signedIn(engineer);
  expect((await ask(headers, "GET", "/api/v1/plants")).status).toBe(200);
  const change = (statement: string) =>
    withClient(adminUrl, (client) => client.query(statement, [lead.teamId, engineer.userId]).then(({ rowCount }) => rowCount));
  await expect(change("update memberships set role = 'owner' where team_id = $1 and user_id = $2")).rejects.toThrow(
    "memberships_role",
  );
  expect(await change("update memberships set removed_at = now() where team_id = $1 and user_id = $2")).toBe(1);
  expect((await ask(headers, "GET", "/api/v1/plants")).status).toBe(401);
});
