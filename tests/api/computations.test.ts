import { randomUUID } from "node:crypto";
import { afterAll, expect, test } from "vitest";
import { POST as checkContent } from "@/app/api/v1/checks/route";
import { twoTanks } from "@/app/api/v1/computations/example";
import { POST } from "@/app/api/v1/computations/route";
import { GET as checkRevision } from "@/app/api/v1/plants/[plantId]/revisions/[revisionId]/checks/route";
import { CAUTIONS } from "@/control/words/cautions";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { Computation } from "@/lib/schemas/design";
import type { PlantSummary } from "@/lib/schemas/plant";
import { createAccessToken } from "@/lib/services/account/access-tokens";
import type { Context } from "@/lib/services/context";
import { apiOf, member } from "../helpers/api";
import { call, problemIn } from "../helpers/call-route";
import { newTeam } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";
import { byPoles, observers } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

async function tokenOf(scope: "read" | "write", of?: Context) {
  const { secret } = await createAccessToken(of ?? (await newTeam()), { name: "Script", scope, expiresInDays: 1 });
  return { authorization: `Bearer ${secret}` };
}
const compute = (headers: Record<string, string>, body: unknown = POST.declaration.example) =>
  call(POST, { method: "POST", headers, body });

test("the worked request of the description is answered with checks, gains, responses and cautions, by token, without a page", async () => {
  const response = await compute(await tokenOf("read"));
  const reply = await response.json();
  expect([response.status, reply.detail]).toEqual([200, undefined]);
  expect(reply.evidence.gains.value.K).toHaveLength(2);
  expect(reply.evidence.gains.value.residual).toBeLessThanOrEqual(reply.evidence.gains.value.bound);
  expect(reply.checks.modes.value).toHaveLength(2);
  expect(reply.responses.length).toBeGreaterThan(0);
  expect(reply.cautions).toEqual([...CAUTIONS]);
});

test("a stored revision is computed like the same plant sent along, its words the same", async () => {
  const { ctx, api } = await member();
  const content = twoCarriages();
  const plant = await api.post<PlantSummary>("/api/v1/plants", { name: "Gantry", content });
  const token = apiOf(await tokenOf("read", ctx));
  const recipe = byPoles({ observer: observers.poles });
  const sent = await token.post<Computation>("/api/v1/computations", { plant: { content }, recipe });
  const { id } = plant.currentRevision;
  expect(await token.post("/api/v1/computations", { plant: { revisionId: id }, recipe })).toEqual(sent);
  expect(sent.checks).toEqual(await token.get(`/api/v1/plants/${plant.id}/revisions/${id}/checks`));
  expect(sent.checks).toEqual(await token.post("/api/v1/checks", { content }));
});

test("a token with the scope read computes and reads; it stores nothing, not even what its owner might", async () => {
  const { ctx, api } = await member();
  const [reader, writer] = [apiOf(await tokenOf("read", ctx)), apiOf(await tokenOf("write", ctx))];
  const body = { name: "Gantry", content: twoCarriages() };
  const refusal = await problemIn(await reader.ask("POST", "/api/v1/plants", { body }));
  expect(refusal).toMatchObject({ status: 403, code: "forbidden", detail: expect.stringContaining("scope") });
  expect(await reader.get("/api/v1/plants")).toEqual({ items: [], nextCursor: null });
  const plant = await writer.post<PlantSummary>("/api/v1/plants", body);
  expect(await api.get(`/api/v1/plants/${plant.id}`)).toEqual(plant);
  expect((await reader.ask("PATCH", `/api/v1/plants/${plant.id}`, { body: { name: "x" }, version: 1 })).status).toBe(403);
});

test("what cannot be computed points into the body, names the mode, and tells its facts", async () => {
  const headers = await tokenOf("read");
  const { plant, recipe } = twoTanks;
  const refused = async (body: unknown) => problemIn(await compute(headers, body));
  if (!("content" in plant)) throw new Error("the worked request names a stored plant");
  const { content } = plant;
  const typo = await refused({ plant: { content: { ...content, A: [["-pip", "pipe"], content.A[1]] } }, recipe });
  expect(typo).toMatchObject({ status: 422, errors: [{ pointer: "/plant/content/A/0/0" }] });
  const long = { ...recipe, test: { ...recipe.test, initialState: [1, 0, 0] } };
  expect(await refused({ plant, recipe: long })).toMatchObject({
    status: 422,
    errors: [{ pointer: "/recipe/test/initialState" }],
  });
  const unstable = {
    ...content,
    A: [
      ["0.1", "0"],
      ["0", "-0.1"],
    ],
    B: [
      ["0", "0"],
      ["0", "0.3"],
    ],
  };
  const stuck = await refused({ plant: { content: unstable }, recipe });
  expect(stuck).toMatchObject({ status: 422, code: "not-stabilizable", data: { pole: { re: 0.1, im: 0 }, state: 0 } });
  expect(stuck.detail).toContain("left level");
  expect(await refused({ plant: { revisionId: randomUUID() }, recipe })).toMatchObject({ status: 404 });
  expect(await refused({ plant: {}, recipe })).toMatchObject({ status: 422 });
  expect(await refused({ plant: { ...plant, revisionId: randomUUID() }, recipe })).toMatchObject({ status: 422 });
});

test("more than thirty computations a minute of one person are answered 429 with the wait", async () => {
  const headers = await tokenOf("read");
  const statuses: number[] = [];
  let last = await compute(headers, {});
  for (let count = 1; count <= 30; count++) {
    statuses.push(last.status);
    last = await compute(headers, {});
  }
  expect(new Set(statuses)).toEqual(new Set([422]));
  expect(last.status).toBe(429);
  expect(Number(last.headers.get("retry-after"))).toBeGreaterThan(0);
  expect(await problemIn(last)).toMatchObject({
    code: "too-many-requests",
    detail: expect.stringMatching(/^At most 30 computations a minute for you\. Wait \d+ s, then try again\.$/),
  });
});

test("looking at plants leaves the computations alone: sixty checks a minute are counted for themselves", async () => {
  const headers = await tokenOf("read");
  const asked = { plantId: randomUUID(), revisionId: randomUUID() };
  const statuses = new Set<number>();
  for (let count = 1; count <= 30; count++) {
    statuses.add((await call(checkRevision, { headers, params: asked })).status);
    statuses.add((await call(checkContent, { method: "POST", headers, body: {} })).status);
  }
  expect(statuses).toEqual(new Set([404, 422]));
  expect(await problemIn(await call(checkRevision, { headers, params: asked }))).toMatchObject({
    status: 429,
    detail: expect.stringContaining("60 checks of a plant a minute for you"),
  });
  expect((await compute(headers, {})).status).toBe(422);
});

test("a token that is none is refused, whatever cookie comes with it", async () => {
  const response = await compute({ authorization: "Bearer gw_made-up", cookie: "gainwright-session=x" });
  expect(await problemIn(response)).toMatchObject({ status: 401, code: "no-session" });
  expect(response.headers.get("www-authenticate")).toBe("Bearer");
});
