import { afterAll, describe, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { DesignRevision, DesignSummary } from "@/lib/schemas/design";
import type { Plant, PlantRevision, PlantSummary } from "@/lib/schemas/plant";
import type { Template, TemplateSummary } from "@/lib/schemas/template";
import { type Api, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights, observers } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const mass = { name: "m", unit: "kg", lowest: 5, highest: 40, suggested: 12, help: "Each carriage with its load" };
const frequency = { name: "wn", unit: "rad/s", lowest: 1, highest: 60, suggested: 20, help: "" };
const content = (changes: Partial<Template["content"]> = {}) => ({
  plant: twoCarriages(),
  recipe: byWeights({ observer: observers.noise }),
  openParameters: [mass, frequency],
  ...changes,
});
const publish = (api: Api, changes = {}, name = "Two carriages") =>
  api.post<Template>("/api/v1/templates", { name, description: "For belts", content: content(changes) });
const start = (api: Api, { id }: Template, values: Record<string, number>) =>
  api.ask("POST", `/api/v1/templates/${id}/start`, { body: { plantName: "Line 4", designName: "First", values } });
const everything = async (api: Api) => api.get<{ items: PlantSummary[] }>("/api/v1/plants?archived=all");

describe("publishing a template", () => {
  test("keeps plant, open parameters and recipe, and lists it by name", async () => {
    const { ctx, api } = await member();
    const made = await publish(api);
    expect(made).toMatchObject({ name: "Two carriages", version: 1, order: 4, openParameterCount: 2, archivedAt: null });
    expect(made.content).toEqual(content());
    const junior = (await member(ctx.teamId, "engineer")).api;
    expect(await junior.get(`/api/v1/templates/${made.id}`)).toEqual(made);
    await publish(api, {}, "A first one");
    const { items } = await junior.get<{ items: TemplateSummary[] }>("/api/v1/templates");
    expect(items.map(({ name }) => name)).toEqual(["A first one", "Two carriages"]);
    expect(items[0]).not.toHaveProperty("content");
  });

  test("points at what does not fit, in the body that was sent", async () => {
    const { api } = await member();
    const refused = async (changes: Partial<Template["content"]>) => {
      const body = { name: "Wrong", content: content(changes) };
      const problem = await problemIn(await api.ask("POST", "/api/v1/templates", { body }));
      expect(problem.status).toBe(422);
      return problem.errors?.map(({ pointer }) => pointer);
    };
    const at = "/content/openParameters";
    expect(await refused({ openParameters: [{ ...mass, name: "mass" }] })).toEqual([`${at}/0/name`]);
    expect(await refused({ openParameters: [mass, mass] })).toEqual([`${at}/1/name`]);
    expect(await refused({ openParameters: [] })).toEqual([at]);
    expect(await refused({ openParameters: [{ ...mass, lowest: 40, highest: 5 }] })).toEqual([
      `${at}/0/highest`,
      `${at}/0/suggested`,
    ]);
    expect(await refused({ openParameters: [{ ...mass, suggested: 41 }] })).toEqual([`${at}/0/suggested`]);
    const A = [["0", "0", "oops", "0"], ...twoCarriages().A.slice(1)];
    expect(await refused({ plant: twoCarriages({ A }) })).toEqual(["/content/plant/A/0/2"]);
    const weights = { form: "deviations" as const, states: [1], inputs: [1, 1] };
    expect(await refused({ recipe: byWeights({ weights }) as Template["content"]["recipe"] })).toEqual([
      "/content/recipe/weights/states",
    ]);
    expect((await api.get<{ items: unknown[] }>("/api/v1/templates?archived=all")).items).toEqual([]);
  });

  test("whose suggested values give no design is refused like a design", async () => {
    const { api } = await member();
    const alone = ["0", "0", "0", "-0.4"];
    const plant = twoCarriages({
      A: [...twoCarriages().A.slice(0, 2), ["0", "0", "-0.4", "0"], alone],
      B: [
        ["0", "0"],
        ["0", "0"],
        ["1/m", "0"],
        ["0", "0"],
      ],
    });
    const response = await api.ask("POST", "/api/v1/templates", { body: { name: "Stuck", content: content({ plant }) } });
    expect(await problemIn(response)).toMatchObject({ status: 422, code: "not-stabilizable" });
  });
});

describe("starting from a template", () => {
  test("makes a plant with the values filled in and a computed design, for an engineer", async () => {
    const { ctx, api } = await member();
    const template = await publish(api);
    const junior = (await member(ctx.teamId, "engineer")).api;
    const response = await start(junior, template, { m: 15.5 });
    const { plantId, designId } = await response.json();
    expect([response.status, response.headers.get("location")]).toEqual([201, `/api/v1/designs/${designId}`]);
    const plant = await junior.get<PlantSummary>(`/api/v1/plants/${plantId}`);
    const revision = await junior.get<PlantRevision>(`/api/v1/plants/${plantId}/revisions/${plant.currentRevision.id}`);
    expect(revision.note).toBe("From template Two carriages");
    expect(revision.content.parameters.map(({ name, expression }) => [name, expression])).toEqual([
      ["m", "15.5"],
      ["k", "m*wn^2"],
      ["wn", "20"],
    ]);
    expect(revision.model.B[2][0]).toBe(1 / 15.5);
    const design = await junior.get<DesignSummary>(`/api/v1/designs/${designId}`);
    expect(design).toMatchObject({ name: "First", plantId, observer: "noise", outdated: false });
    const stored = await junior.get<DesignRevision>(`/api/v1/design-revisions/${design.currentRevision.id}`);
    expect(stored.recipe).toEqual(template.content.recipe);
    expect(stored.evidence.gains.state).toBe("computed");
  });

  test("refuses values out of range, unknown ones and none at all, each at its own field, and makes nothing", async () => {
    const { api } = await member();
    const template = await publish(api);
    const refusal = await problemIn(await start(api, template, { m: 41, wn: 0.5, "k/2~x": 1, constructor: 2 }));
    expect(refusal).toMatchObject({ status: 422, code: "invalid" });
    expect(refusal.errors).toEqual([
      { pointer: "/values/k~12~0x", detail: expect.stringContaining("no open parameter") },
      { pointer: "/values/constructor", detail: expect.stringContaining("no open parameter") },
      { pointer: "/values/m", detail: "m must lie between 5 and 40 kg" },
      { pointer: "/values/wn", detail: "wn must lie between 1 and 60 rad/s" },
    ]);
    const shapeless = { plantName: "x", designName: "y", values: { m: "12" } };
    const typed = await api.ask("POST", `/api/v1/templates/${template.id}/start`, { body: shapeless });
    expect(await problemIn(typed)).toMatchObject({ status: 422, errors: [{ pointer: "/values/m" }] });
    expect((await everything(api)).items).toEqual([]);
  });

  test("at the ends of the range is allowed; values that make the plant impossible are refused at the values", async () => {
    const { api } = await member();
    const A = [...twoCarriages().A.slice(0, 2), ["-1/(m-40)", "k/m", "-0.4", "0"], twoCarriages().A[3]];
    const template = await publish(api, { plant: twoCarriages({ A }) });
    expect((await start(api, template, { m: 5, wn: 60 })).status).toBe(201);
    const refusal = await problemIn(await start(api, template, { m: 40 }));
    expect(refusal).toMatchObject({
      status: 422,
      errors: [{ pointer: "/values", detail: expect.stringContaining("/A/2/0") }],
    });
    expect((await everything(api)).items).toHaveLength(1);
  });

  test("is over once it is archived, and possible again when it is brought back", async () => {
    const { api } = await member();
    const template = await publish(api);
    const path = `/api/v1/templates/${template.id}/archive`;
    expect(await api.post(path, { archived: true }, 1)).toMatchObject({ version: 2, archivedAt: expect.any(String) });
    expect(await problemIn(await start(api, template, {}))).toMatchObject({ status: 409, code: "conflict" });
    expect((await api.get<{ items: unknown[] }>("/api/v1/templates")).items).toEqual([]);
    expect((await api.get<{ items: unknown[] }>("/api/v1/templates?archived=yes")).items).toHaveLength(1);
    const stale = await api.ask("POST", path, { body: { archived: false }, version: 1 });
    expect(await problemIn(stale)).toMatchObject({ status: 412, current: 2 });
    await api.post(path, { archived: false }, 2);
    expect((await start(api, template, {})).status).toBe(201);
  });
});

test("acceptance criteria go along with the plant, and without any the plant has none", async () => {
  const { api } = await member();
  const criteria = [
    { kind: "settling", signal: "enc1", limit: 4 },
    { kind: "effort", signal: null, limit: 90 },
  ] as const;
  const startedFrom = async (template: Template) => {
    const { plantId } = await (await start(api, template, { m: 8, wn: 20 })).json();
    return (await api.get<Plant>(`/api/v1/plants/${plantId}`)).criteria;
  };
  const made = await publish(api, { criteria });
  expect(made.content.criteria).toEqual(criteria);
  expect(await startedFrom(made)).toEqual(criteria);
  expect(await startedFrom(await publish(api))).toEqual([]);
});
