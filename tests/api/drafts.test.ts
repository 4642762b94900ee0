import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { DesignSummary } from "@/lib/schemas/design";
import { DRAFT_LIMIT, type FoundDraft, type KeepDraft, type KeptDraft } from "@/lib/schemas/draft";
import type { PlantSummary } from "@/lib/schemas/plant";
import { spend } from "@/lib/services/limits/spend";
import { type Api, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

let teamId: string;
let api: Api;
let plant: PlantSummary;
let design: DesignSummary;
beforeAll(async () => {
  const { ctx, api: lead } = await member();
  [teamId, api] = [ctx.teamId, lead];
  plant = await api.post<PlantSummary>("/api/v1/plants", { name: "Gantry", content: twoCarriages() });
  const body = { name: "First", plantRevisionId: plant.currentRevision.id, recipe: byWeights() };
  design = await api.post<DesignSummary>(`/api/v1/plants/${plant.id}/designs`, body);
});

const pathOf = (subjectId: string, plantId = plant.id) => `/api/v1/plants/${plantId}/drafts/${subjectId}`;
const baseOf = ({ version, currentRevision }: DesignSummary) => ({ version, revisionId: currentRevision.id });
const draftOf = (more: Partial<KeepDraft> = {}): KeepDraft => ({
  mark: randomUUID(),
  plantRevisionId: plant.currentRevision.id,
  base: baseOf(design),
  form: { method: "weights", weights: { states: [0.001, null, 5e-324], matrix: [["1/", "½"]] }, reasons: {} },
  ...more,
});
const found = async (who: Api, subjectId: string) => (await who.get<FoundDraft>(pathOf(subjectId))).draft;
const refusal = async (who: Api, subjectId: string, body: unknown) => {
  const { status, code } = await problemIn(await who.ask("PUT", pathOf(subjectId), { body }));
  return [status, code];
};
/** Somebody of the same team with no drafts yet. */
const colleague = async () => (await member(teamId, "engineer")).api;

test("a draft comes back as it was typed, one for each design, older revision and new design", async () => {
  const who = await colleague();
  for (const subjectId of [design.id, design.currentRevision.id, plant.id]) {
    expect(await found(who, subjectId)).toBeNull();
    const sent = draftOf(subjectId === plant.id ? { base: null, form: { new: true } } : {});
    const kept = await who.put<KeptDraft>(pathOf(subjectId), sent);
    expect(kept.mark).toBe(sent.mark);
    expect(await found(who, subjectId)).toEqual({ ...sent, updatedAt: kept.updatedAt });
  }
  expect((await found(who, plant.id))?.form).toEqual({ new: true });
});

test("it is replaced by whoever knows its mark, and a page that does not is told so and changes nothing", async () => {
  const who = await colleague();
  const first = draftOf();
  await who.put(pathOf(design.id), first);
  const second = draftOf({ replaces: [randomUUID(), first.mark], form: { at: "second" } });
  await who.put(pathOf(design.id), second);
  // Sent again after a lost answer: the same write, not a later one.
  await who.put(pathOf(design.id), second);
  for (const replaces of [[], [first.mark], [randomUUID()]])
    expect(await refusal(who, design.id, draftOf({ replaces, form: { at: "stale" } }))).toEqual([412, "stale-version"]);
  expect(await found(who, design.id)).toMatchObject({ mark: second.mark, form: { at: "second" } });
});

test("of many first writes at once one is kept", async () => {
  const who = await colleague();
  const replies = await Promise.all(Array.from({ length: 8 }, () => who.ask("PUT", pathOf(design.id), { body: draftOf() })));
  expect(replies.map(({ status }) => status).sort()).toEqual([200, ...Array.from({ length: 7 }, () => 412)]);
});

test("it is removed by its mark and by no other, and removing what is gone is no error", async () => {
  const who = await colleague();
  const sent = draftOf();
  await who.put(pathOf(design.id), sent);
  const remove = async (...marks: string[]) => (await who.ask("DELETE", `${pathOf(design.id)}?marks=${marks.join(",")}`)).status;
  expect(await remove(randomUUID())).toBe(412);
  expect(await found(who, design.id)).not.toBeNull();
  expect(await remove(randomUUID(), sent.mark)).toBe(204);
  expect(await found(who, design.id)).toBeNull();
  expect(await remove(sent.mark)).toBe(204);
  expect(await remove("no-mark")).toBe(422);
});

test("nobody sees or touches somebody else's: a colleague has a draft of their own, a stranger finds nothing", async () => {
  const [one, two] = [await colleague(), await colleague()];
  const [mine, yours] = [draftOf({ form: { of: "one" } }), draftOf({ form: { of: "two" } })];
  await one.put(pathOf(design.id), mine);
  expect(await found(two, design.id)).toBeNull();
  await two.put(pathOf(design.id), { ...yours, replaces: [mine.mark] });
  expect([(await found(one, design.id))?.form, (await found(two, design.id))?.form]).toEqual([{ of: "one" }, { of: "two" }]);
  expect((await two.ask("DELETE", `${pathOf(design.id)}?marks=${mine.mark}`)).status).toBe(412);

  const stranger = (await member()).api;
  for (const subjectId of [design.id, design.currentRevision.id, plant.id]) {
    expect(await refusal(stranger, subjectId, draftOf())).toEqual([404, "not-found"]);
    expect((await stranger.ask("GET", pathOf(subjectId))).status).toBe(404);
    expect((await stranger.ask("DELETE", `${pathOf(subjectId)}?marks=${mine.mark}`)).status).toBe(404);
  }
  const reviewer = (await member(teamId, "reviewer")).api;
  expect((await reviewer.ask("GET", pathOf(design.id))).status).toBe(403);
  expect(await refusal(reviewer, design.id, draftOf())).toEqual([403, "forbidden"]);
  expect((await found(one, design.id))?.mark).toBe(mine.mark);
});

test("it stands on a revision of its plant and on one of its design, or on none", async () => {
  const who = await colleague();
  const absent = [404, "not-found"];
  const other = await api.post<PlantSummary>("/api/v1/plants", { name: "Other", content: twoCarriages() });
  const second = await api.post<DesignSummary>(`/api/v1/plants/${plant.id}/designs`, {
    name: "Second",
    plantRevisionId: plant.currentRevision.id,
    recipe: byWeights(),
  });
  expect(await refusal(who, design.id, draftOf({ plantRevisionId: other.currentRevision.id }))).toEqual(absent);
  expect(await refusal(who, design.id, draftOf({ plantRevisionId: randomUUID() }))).toEqual(absent);
  expect(await refusal(who, design.id, draftOf({ base: baseOf(second) }))).toEqual(absent);
  expect(await refusal(who, plant.id, draftOf())).toEqual(absent);
  expect(await refusal(who, randomUUID(), draftOf({ base: null }))).toEqual(absent);
  expect((await who.ask("PUT", pathOf(design.id, other.id), { body: draftOf() })).status).toBe(404);
  await who.put(pathOf(design.currentRevision.id), draftOf({ base: baseOf(design) }));
});

test("what is too large, nested without end or no form is refused, and the largest bench there is fits", async () => {
  const who = await colleague();
  expect(await refusal(who, design.id, draftOf({ form: { text: "x".repeat(DRAFT_LIMIT) } }))).toEqual([413, "too-large"]);
  expect(await refusal(who, design.id, { ...draftOf(), form: ["a"] })).toEqual([422, "invalid"]);
  expect(await refusal(who, design.id, { ...draftOf(), form: { many: Array.from({ length: 60_001 }, () => 1) } })).toEqual([
    422,
    "invalid",
  ]);
  const rows = (count: number, columns: number) =>
    Array.from({ length: count }, () => Array.from({ length: columns }, () => "-0.12345678901234567e-12"));
  const form = { state: rows(60, 60), process: rows(60, 60), cross: rows(60, 12), input: rows(12, 12), measured: rows(12, 12) };
  await who.put(pathOf(design.id), draftOf({ form }));
  expect((await found(who, design.id))?.form).toEqual(form);
});

test("drafts that a page keeps by itself use up nothing that a person's own changes need", async () => {
  const { ctx, api: who } = await member(teamId, "engineer");
  for (let sent = 0; sent < 120; sent++) await spend(ctx, "draft");
  expect(await refusal(who, design.id, draftOf())).toEqual([429, "too-many-requests"]);
  expect(
    (await who.ask("PATCH", `/api/v1/designs/${design.id}`, { body: { name: "Still" }, version: design.version })).status,
  ).toBe(200);
});
