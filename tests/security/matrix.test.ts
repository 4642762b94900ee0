import { afterAll, beforeAll, describe, expect, test, vi } from "vitest";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import { createAccessToken } from "@/lib/services/account/access-tokens";
import type { Context } from "@/lib/services/context";
import { removeMember } from "@/lib/services/team/members";
import { ask } from "../helpers/api";
import { ORIGIN, signedIn } from "../helpers/call-route";
import { everyRoute, requestTo, send } from "../helpers/every-route";
import { memberOf, newTeam, someone } from "../helpers/people";
import { type Stock, stockedTeam } from "../helpers/stocked-team";
import { testDatabase } from "../helpers/test-database";

vi.mock("node:crypto", async (original) => (await import("../helpers/quick-crypto")).quickCrypto(await original()));

const { adminUrl } = await testDatabase();
process.env.GAINWRIGHT_DEMO = "yes"; // or the page of mails is nobody's
afterAll(async () => {
  delete process.env.GAINWRIGHT_DEMO;
  await closeNumericPool();
  await closePool();
});

const ACTORS = ["nobody", "stranger", "removed", "reviewer", "engineer", "lead", "read token", "write token"] as const;
type Actor = (typeof ACTORS)[number];
type Cells = Readonly<Record<Actor, "done" | 401 | 403 | 404>>;

/** `stranger` is the lead of another team, `removed` was a member, both tokens are of a lead. */
const cells = (stranger: Cells["stranger"], members: readonly Actor[]): Cells => {
  const of = (actor: Actor) => (members.includes(actor) ? "done" : 403);
  const team = { reviewer: of("reviewer"), engineer: of("engineer"), lead: of("lead") } as const;
  const tokens = { "read token": of("read token"), "write token": of("write token") } as const;
  return { nobody: 401, removed: 401, stranger, ...team, ...tokens };
};
const everybody = ["reviewer", "engineer", "lead", "read token", "write token"] as const;
const builders = ["engineer", "lead", "write token"] as const;

/** Where no id is named a stranger is given, or makes, what is their own team's. */
const RULES: Readonly<Record<string, Cells>> = {
  anybody: Object.fromEntries(ACTORS.map((actor) => [actor, "done"])) as Cells,
  "nothing there": Object.fromEntries(ACTORS.map((actor) => [actor, 404])) as Cells,
  "own account": { ...cells("done", ["reviewer", "engineer", "lead"]), "read token": 401, "write token": 401 },
  "own tokens": cells("done", ["reviewer", "engineer", "lead"]),
  "own token": cells(404, ["reviewer", "engineer", "lead"]),
  "reads own team": cells("done", everybody),
  reads: cells(404, everybody),
  "compares in own team": cells("done", ["reviewer", ...builders]),
  compares: cells(404, ["reviewer", ...builders]),
  "builds in own team": cells("done", builders),
  builds: cells(404, builders),
  "publishes in own team": cells("done", ["lead", "write token"]),
  publishes: cells(404, ["lead", "write token"]),
  "leads own team": cells("done", ["lead"]),
  leads: cells(404, ["lead"]),
};

/** Each route file under `app/api`, with its methods. One that is missing here fails. */
const TABLE: Readonly<Record<string, Readonly<Record<string, keyof typeof RULES>>>> = {
  "/api/health": { GET: "anybody" },
  "/api/health/ready": { GET: "anybody" },
  "/api/v1/openapi.json": { GET: "anybody" },
  "/api/v1/{...rest}": Object.fromEntries(["GET", "POST", "PUT", "PATCH", "DELETE"].map((method) => [method, "nothing there"])),
  "/api/v1/sign-up": { POST: "anybody" },
  "/api/v1/invitations/join": { POST: "anybody" },
  "/api/v1/password-resets": { POST: "anybody" },
  "/api/v1/password-resets/use": { POST: "anybody" },
  "/api/v1/account": { GET: "own account", PATCH: "own account" },
  "/api/v1/account/password": { POST: "own account" },
  "/api/v1/account/sessions": { DELETE: "own account" },
  "/api/v1/account/team": { POST: "own account", PUT: "own account" },
  "/api/v1/invitations/accept": { POST: "own account" },
  "/api/v1/account/tokens": { GET: "own tokens", POST: "own tokens" },
  "/api/v1/account/tokens/{tokenId}": { DELETE: "own token" },
  "/api/v1/checks": { POST: "reads own team" },
  "/api/v1/computations": { POST: "reads own team" },
  "/api/v1/comparisons": { GET: "reads own team", POST: "compares" },
  "/api/v1/comparisons/{comparisonId}": { GET: "reads", DELETE: "compares" },
  "/api/v1/design-revisions/{revisionId}": { GET: "reads" },
  "/api/v1/design-revisions/{revisionId}/gains": { GET: "reads" },
  "/api/v1/design-revisions/{revisionId}/responses": { GET: "reads" },
  "/api/v1/designs/{designId}": { GET: "reads", PATCH: "builds" },
  "/api/v1/designs/{designId}/archive": { POST: "builds" },
  "/api/v1/designs/{designId}/duplicate": { POST: "builds" },
  "/api/v1/designs/{designId}/revisions": { GET: "reads", POST: "builds" },
  "/api/v1/plants": { GET: "reads own team", POST: "builds in own team" },
  "/api/v1/plants/{plantId}": { GET: "reads", PATCH: "builds" },
  "/api/v1/plants/{plantId}/archive": { POST: "builds" },
  "/api/v1/plants/{plantId}/criteria": { PUT: "builds" },
  "/api/v1/plants/{plantId}/designs": { GET: "reads", POST: "builds" },
  "/api/v1/plants/{plantId}/difference": { GET: "reads" },
  "/api/v1/plants/{plantId}/drafts/{subjectId}": { GET: "builds", PUT: "builds", DELETE: "builds" },
  "/api/v1/plants/{plantId}/duplicate": { POST: "builds" },
  "/api/v1/plants/{plantId}/revisions": { GET: "reads", POST: "builds" },
  "/api/v1/plants/{plantId}/revisions/{revisionId}": { GET: "reads" },
  "/api/v1/plants/{plantId}/revisions/{revisionId}/checks": { GET: "reads" },
  "/api/v1/plants/{plantId}/side-by-side": { GET: "reads" },
  "/api/v1/team": { GET: "reads own team", PATCH: "leads own team" },
  "/api/v1/team/audit": { GET: "reads own team" },
  "/api/v1/team/invitations": { GET: "leads own team", POST: "leads own team" },
  "/api/v1/team/invitations/{invitationId}": { DELETE: "leads" },
  "/api/v1/team/members": { GET: "reads own team" },
  "/api/v1/team/members/{userId}": { PATCH: "leads", DELETE: "leads" },
  "/api/v1/team/outbox": { GET: "leads own team" },
  "/api/v1/templates": { GET: "reads own team", POST: "publishes in own team" },
  "/api/v1/templates/{templateId}": { GET: "reads" },
  "/api/v1/templates/{templateId}/archive": { POST: "publishes" },
  "/api/v1/templates/{templateId}/start": { POST: "builds" },
};
/** Held by tests/security/session: it answers with pages of its own. */
const ELSEWHERE = ["/api/auth/{...nextauth}"];

const routes = (await everyRoute()).filter(({ address }) => !ELSEWHERE.includes(address));
let stock: Stock;
const tokens = new Map<Actor, string>();
beforeAll(async () => {
  stock = await stockedTeam(adminUrl);
  for (const scope of ["read", "write"] as const) {
    const owner = await memberOf(stock.ctx.teamId, "lead");
    const { secret } = await createAccessToken(owner, { name: "Script", scope, expiresInDays: 1 });
    tokens.set(`${scope} token`, secret);
  }
});

/** Somebody new for every cell, so that what one route does to a person never colours another cell. */
async function actorOf(actor: Actor) {
  const { teamId } = stock.ctx;
  const bearer = tokens.get(actor);
  const named = { ...stock.ctx, email: "nobody@saltmarsh.example" };
  if (bearer) return { asker: named, headers: { origin: ORIGIN, authorization: `Bearer ${bearer}` } };
  if (actor === "nobody") return { asker: named, headers: { origin: ORIGIN } };
  const who = await someone();
  const home = actor === "stranger" ? (await newTeam()).teamId : teamId;
  const role = actor === "reviewer" || actor === "engineer" ? actor : "lead";
  const ctx: Context = await memberOf(home, role, who);
  const headers = await signedIn(ctx);
  if (actor === "removed") await removeMember(stock.ctx, who.userId);
  return { asker: { ...ctx, email: who.email }, headers };
}

test("the table names every route and method under app/api, and nothing that is not there", () => {
  const named = Object.entries(TABLE).flatMap(([address, methods]) =>
    Object.keys(methods).map((method) => `${method} ${address}`),
  );
  expect(routes.map(({ name }) => name).sort()).toEqual(named.sort());
});

describe("who may do what", () => {
  test.each(routes)("$name", { timeout: 60_000 }, async (route) => {
    const outcomes: Record<string, unknown> = {};
    for (const actor of ACTORS) {
      await withClient(adminUrl, (client) => client.query("delete from rate_limits"));
      const { asker, headers } = await actorOf(actor);
      const response = await send(route, stock, headers, await requestTo(route, stock, asker));
      outcomes[actor] = response.status < 300 ? "done" : response.status;
      if (response.status === 422 || response.status >= 500) outcomes[actor] = await response.text();
    }
    expect(outcomes).toEqual(RULES[TABLE[route.address][route.method]]);
  });
});

test("anybody leaves their team by the address at which only a lead removes somebody else", async () => {
  const [leaver, colleague] = [await memberOf(stock.ctx.teamId, "engineer"), await memberOf(stock.ctx.teamId, "reviewer")];
  const leave = async (userId: string) => (await ask(await signedIn(leaver), "DELETE", `/api/v1/team/members/${userId}`)).status;
  expect([await leave(colleague.userId), await leave(leaver.userId)]).toEqual([403, 204]);
});
