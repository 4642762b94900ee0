import { afterAll, describe, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import type { PlantSummary } from "@/lib/schemas/plant";
import type { Context } from "@/lib/services/context";
import { type Api, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { EMPTY_MODEL, EMPTY_RECIPE } from "../helpers/filled-team";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(closePool);

type Page<T> = { readonly items: T[]; readonly nextCursor: string | null };
const admin = (statement: string, values: unknown[]) => withClient(adminUrl, (client) => client.query(statement, values));

/** Plants of these names, each saved one microsecond after the one before but for every third, which shares its time. */
const insertPlants = ({ teamId, userId }: Context, names: readonly string[]) =>
  admin(
    `with made as (
       insert into plants (team_id, created_by, name, updated_at)
       select $1, $2, name, timestamptz '2021-04-05 06:07:08' + (n - n % 3) * interval '1 microsecond'
       from unnest($3::text[]) with ordinality as given(name, n) returning id)
     insert into plant_revisions (team_id, created_by, plant_id, number, content, model)
     select $1, $2, id, 1, '{}', $4 from made`,
    [teamId, userId, names, EMPTY_MODEL],
  );

/** Every page of a list, with what happens between two of them. */
async function walk<T>(api: Api, path: string, limit: number, meanwhile: (page: number) => Promise<unknown> = async () => {}) {
  const seen: T[] = [];
  let next = "";
  for (let page = 1; page <= 100; page++) {
    const { items, nextCursor }: Page<T> = await api.get(`${path}${path.includes("?") ? "&" : "?"}limit=${limit}${next}`);
    expect(items.length).toBeLessThanOrEqual(limit);
    seen.push(...items);
    if (nextCursor === null) return seen;
    expect(items).toHaveLength(limit);
    next = `&cursor=${nextCursor}`;
    await meanwhile(page);
  }
  throw new Error("the list never ends");
}

const numbered = (count: number) => Array.from({ length: count }, (_, index) => `Plant ${String(index).padStart(3, "0")}`);

describe("pages of plants", () => {
  test.each([
    ["name", 1],
    ["-name", -1],
    ["updated", 1],
    ["-updated", -1],
  ])("by %s follow one another without a gap or a repeat, ties of time included", async (sort, sign) => {
    const { ctx, api } = await member();
    const names = numbered(50);
    await insertPlants(ctx, names);
    const seen = await walk<PlantSummary>(api, `/api/v1/plants?sort=${sort}`, 7);
    const shown = seen.map(({ name }) => name);
    expect([...shown].sort()).toEqual(names);
    if (sort.endsWith("name")) expect(shown).toEqual(sign === 1 ? names : [...names].reverse());
    const times = seen.map(({ updatedAt }) => sign * Date.parse(updatedAt));
    if (sort.endsWith("updated")) expect(times).toEqual([...times].sort((a, b) => a - b));
  });

  test("by name show every plant that stays once, while others come, go and are saved anew", async () => {
    const { ctx, api } = await member();
    const names = numbered(40);
    await insertPlants(ctx, names);
    const all = await walk<PlantSummary>(api, "/api/v1/plants?sort=name", 100);
    const seen = await walk<PlantSummary>(api, "/api/v1/plants?sort=name", 6, async (page) => {
      await insertPlants(ctx, [`Plant 000 early ${page}`, `Plant 999 late ${page}`]);
      await admin("update plants set updated_at = now(), version = version + 1 where team_id = $1", [ctx.teamId]);
      await admin("update plants set archived_at = now() where id = $1", [all[page].id]);
    });
    const ids = seen.map(({ id }) => id);
    expect(new Set(ids).size).toBe(ids.length);
    expect(ids).toEqual(expect.arrayContaining(all.map(({ id }) => id)));
    expect(seen.filter(({ name }) => name.includes("early"))).toEqual([]);
  });

  test("by last change never show a plant twice while plants are saved anew", async () => {
    const { ctx, api } = await member();
    await insertPlants(ctx, numbered(30));
    const seen = await walk<PlantSummary>(api, "/api/v1/plants", 5, (page) =>
      admin("update plants set updated_at = now() where team_id = $1 and name = $2", [ctx.teamId, `Plant 0${29 - page}`]),
    );
    expect(new Set(seen.map(({ id }) => id)).size).toBe(seen.length);
  });

  test("end at a name of 120 characters of any script, quotes and backslashes included", async () => {
    const { ctx, api } = await member();
    const long = ["龍".repeat(120), '"'.repeat(120), "\\".repeat(120), "𐀀".repeat(60), "é".repeat(120)];
    await insertPlants(ctx, long);
    const seen = await walk<PlantSummary>(api, "/api/v1/plants?sort=name", 1);
    expect(seen.map(({ name }) => name).sort()).toEqual([...long].sort());
  });
});

describe("a list", () => {
  test("finds what is typed as it is typed: % and _ and \\ look for themselves, capitals do not matter", async () => {
    const { ctx, api } = await member();
    await insertPlants(ctx, ["100 % gantry", "axis_2", "axisX2", "back\\slash", "Straße", "O'Brien's stage"]);
    const found = async (text: string) =>
      (await api.get<Page<PlantSummary>>(`/api/v1/plants?search=${encodeURIComponent(text)}`)).items
        .map(({ name }) => name)
        .sort();
    expect(await found("%")).toEqual(["100 % gantry"]);
    expect(await found("_")).toEqual(["axis_2"]);
    expect(await found("\\")).toEqual(["back\\slash"]);
    expect(await found("AXIS")).toEqual(["axisX2", "axis_2"].sort());
    expect(await found("straß")).toEqual(["Straße"]);
    expect(await found("'")).toEqual(["O'Brien's stage"]);
    expect(await found("nowhere")).toEqual([]);
  });

  test.each([
    "?limit=0",
    "?limit=101",
    "?limit=ten",
    "?limit=1.5",
    "?sort=created_at",
    "?sort=name;drop table plants",
    "?sort=constructor",
    "?archived=maybe",
    "?page=2",
    `?search=${"x".repeat(121)}`,
    "?sort=name&sort=name",
  ])("refuses %s, naming the field", async (query) => {
    const { api } = await member();
    const refusal = await problemIn(await api.ask("GET", `/api/v1/plants${query}`));
    expect(refusal).toMatchObject({ status: 422, code: "invalid" });
    expect(refusal.errors?.[0].pointer).toMatch(/^\/(limit|sort|archived|page|search)$/);
  });

  test("takes no cursor that is made up, cut, or from a list in another order", async () => {
    const { ctx, api } = await member();
    await insertPlants(ctx, ["a", "b", "c"]);
    const { nextCursor: byName } = await api.get<Page<PlantSummary>>("/api/v1/plants?sort=name&limit=1");
    const id = "0f0e0d0c-0b0a-4908-8706-050403020100";
    const made = (...place: unknown[]) => Buffer.from(JSON.stringify(place)).toString("base64url");
    const places = [
      byName,
      made("2031-02-30 00:00:00+00", id),
      made("infinity", id),
      made("99999999999999999", id),
      made("1", "no id"),
      made("1"),
      made(1, id),
      made("-1", id),
      "nonsense",
      "%00",
      "x".repeat(801),
    ];
    for (const cursor of places) {
      const response = await api.ask("GET", `/api/v1/plants?cursor=${cursor}`);
      expect([response.status === 422 || response.status === 400, cursor]).toEqual([true, cursor]);
    }
    const [{ id: plantId }] = (await api.get<Page<PlantSummary>>("/api/v1/plants?sort=name")).items;
    for (const cursor of [byName, made("9999999999", id), made("one", id)]) {
      const refusal = await problemIn(await api.ask("GET", `/api/v1/plants/${plantId}/revisions?cursor=${cursor}`));
      expect(refusal).toMatchObject({ status: 422, errors: [{ pointer: "/cursor" }] });
    }
  });
});

test("revisions, designs, comparisons and templates come in pages as well", async () => {
  const { ctx, api } = await member();
  const { teamId, userId } = ctx;
  await insertPlants(ctx, ["Gantry"]);
  const [{ id: plantId, currentRevision }] = (await api.get<Page<PlantSummary>>("/api/v1/plants")).items;
  const revision =
    "insert into plant_revisions (team_id, created_by, plant_id, number, content, model) select $1, $2, $3, n, '{}', $4 from generate_series(2, 11) n";
  await admin(revision, [teamId, userId, plantId, EMPTY_MODEL]);
  await admin(
    `with made as (insert into designs (team_id, created_by, plant_id, name, updated_at)
       select $1, $2, $3, 'Design ' || n, now() from generate_series(1, 11) n returning id)
     insert into design_revisions (team_id, created_by, plant_id, design_id, plant_revision_id, number, recipe, method_version)
     select $1, $2, $3, made.id, $4, k, $5, '1' from made, generate_series(1, 11) k`,
    [teamId, userId, plantId, currentRevision.id, EMPTY_RECIPE],
  );
  await admin(
    `insert into comparisons (team_id, created_by, plant_id, title, design_revision_ids)
     select $1, $2, $3, 'Comparison ' || n, (select array_agg(id) from (select id from design_revisions where team_id = $1 limit 2) two)
     from generate_series(1, 11) n`,
    [teamId, userId, plantId],
  );
  const template = { plant: { states: [] }, openParameters: [] };
  await admin(
    "insert into templates (team_id, created_by, name, content) select $1, $2, 'Same name', $3 from generate_series(1, 11)",
    [teamId, userId, template],
  );
  type Row = { id: string; number?: number };
  const designs = await walk<Row>(api, `/api/v1/plants/${plantId}/designs`, 4);
  const lists = [
    designs,
    await walk<Row>(api, `/api/v1/plants/${plantId}/revisions`, 4),
    await walk<Row>(api, `/api/v1/designs/${designs[0].id}/revisions`, 4),
    await walk<Row>(api, "/api/v1/comparisons", 4),
    await walk<Row>(api, `/api/v1/comparisons?plantId=${plantId}`, 4),
    await walk<Row>(api, "/api/v1/templates", 4),
  ];
  for (const list of lists) expect([list.length, new Set(list.map(({ id }) => id)).size]).toEqual([11, 11]);
  expect(lists[1].map(({ number }) => number)).toEqual([11, 10, 9, 8, 7, 6, 5, 4, 3, 2, 1]);
  expect(lists[2].map(({ number }) => number)).toEqual([11, 10, 9, 8, 7, 6, 5, 4, 3, 2, 1]);
});
