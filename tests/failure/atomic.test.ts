import { randomUUID } from "node:crypto";
import { afterAll, describe, expect, test, vi } from "vitest";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import { log } from "@/lib/log";
import { archiveComparison } from "@/lib/services/comparisons/archive";
import { saveComparison } from "@/lib/services/comparisons/save";
import type { Context } from "@/lib/services/context";
import { addDesignRevision } from "@/lib/services/designs/add-revision";
import { archiveDesign } from "@/lib/services/designs/archive";
import { createDesign } from "@/lib/services/designs/create";
import { duplicateDesign } from "@/lib/services/designs/duplicate";
import { renameDesign } from "@/lib/services/designs/rename";
import { addPlantRevision } from "@/lib/services/plants/add-revision";
import { archivePlant } from "@/lib/services/plants/archive";
import { createPlant } from "@/lib/services/plants/create";
import { duplicatePlant } from "@/lib/services/plants/duplicate";
import { renamePlant } from "@/lib/services/plants/rename";
import { archiveTemplate } from "@/lib/services/templates/archive";
import { publishTemplate } from "@/lib/services/templates/publish";
import { startFromTemplate } from "@/lib/services/templates/start";
import { apiOf } from "../helpers/api";
import { signedIn } from "../helpers/call-route";
import { checksum, eachFault } from "../helpers/fault-injection";
import { newTeam } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";
import { byPoles, byWeights, observers } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const content = twoCarriages();
// As the schema reads them: its types are not read-only.
const recipe = JSON.parse(JSON.stringify(byWeights({ observer: observers.noise })));
const poles = JSON.parse(JSON.stringify(byPoles()));
const openParameters = [{ name: "m", unit: "kg", lowest: 5, highest: 40, suggested: 12, help: "" }];
const note = "";

/** A plant with two designs and a template, in a team of their own. */
async function stocked() {
  const ctx = await newTeam();
  const plant = await createPlant(ctx, { name: "Gantry", content, note });
  const pinned = { plantRevisionId: plant.currentRevision.id, recipe, note };
  const one = await createDesign(ctx, plant.id, { name: "One", ...pinned });
  const two = await createDesign(ctx, plant.id, { name: "Two", ...pinned });
  const designRevisionIds = [one.currentRevision.id, two.currentRevision.id];
  const comparison = await saveComparison(ctx, { plantId: plant.id, title: "Both", note, designRevisionIds });
  const template = await publishTemplate(ctx, {
    name: "T",
    description: "",
    content: { plant: content, recipe, openParameters },
  });
  return { ctx, plant, pinned, one, designRevisionIds, comparison, template };
}
type Stock = Awaited<ReturnType<typeof stocked>>;

const verbs: [string, (stock: Stock) => Promise<unknown>][] = [
  ["creating a plant", ({ ctx }) => createPlant(ctx, { name: "New", content, note })],
  ["revising a plant", ({ ctx, plant }) => addPlantRevision(ctx, plant.id, 1, { content, note: "again" })],
  ["renaming a plant", ({ ctx, plant }) => renamePlant(ctx, plant.id, 1, "Other")],
  ["archiving a plant", ({ ctx, plant }) => archivePlant(ctx, plant.id, 1, true)],
  ["duplicating a plant", ({ ctx, plant }) => duplicatePlant(ctx, plant.id, { name: "Copy" })],
  ["creating a design", ({ ctx, plant, pinned }) => createDesign(ctx, plant.id, { ...pinned, name: "New", recipe: poles })],
  ["revising a design", ({ ctx, one, pinned }) => addDesignRevision(ctx, one.id, 1, { ...pinned, recipe: poles })],
  ["renaming a design", ({ ctx, one }) => renameDesign(ctx, one.id, 1, "Other")],
  ["archiving a design", ({ ctx, one }) => archiveDesign(ctx, one.id, 1, true)],
  ["duplicating a design", ({ ctx, one }) => duplicateDesign(ctx, one.id, "Copy")],
  [
    "saving a comparison",
    ({ ctx, plant, designRevisionIds }) => saveComparison(ctx, { plantId: plant.id, title: "New", note, designRevisionIds }),
  ],
  ["taking a comparison off the lists", ({ ctx, comparison }) => archiveComparison(ctx, comparison.id, 1)],
  [
    "publishing a template",
    ({ ctx }) => publishTemplate(ctx, { name: "New", description: "", content: { plant: content, recipe, openParameters } }),
  ],
  ["archiving a template", ({ ctx, template }) => archiveTemplate(ctx, template.id, 1, true)],
  [
    "starting from a template",
    ({ ctx, template }) => startFromTemplate(ctx, template.id, { plantName: "P", designName: "D", values: { m: 20 } }),
  ],
];

async function events({ teamId }: Context): Promise<number> {
  const { rows } = await withClient(adminUrl, (client) =>
    client.query("select count(*)::int as count from audit_events where team_id = $1", [teamId]),
  );
  return rows[0].count;
}

describe("a statement that fails leaves every table as it was, the audit trail too", () => {
  test.each(verbs)("%s", { timeout: 120_000 }, async (_, act) => {
    const stock = await stocked();
    const [before, told] = [await checksum(adminUrl), await events(stock.ctx)];
    const faults = await eachFault(
      () => act(stock),
      async (at) => {
        expect(await checksum(adminUrl), `after a fault in place of statement ${at}`).toBe(before);
      },
    );
    expect(faults).toBeGreaterThanOrEqual(4);
    expect(await checksum(adminUrl)).not.toBe(before);
    expect(await events(stock.ctx)).toBeGreaterThan(told);
  });
});

test("a create by its route is all or nothing with the reply that its key remembers", { timeout: 120_000 }, async () => {
  const { ctx, plant, pinned } = await stocked();
  const { headers } = apiOf(await signedIn(ctx));
  const api = apiOf({ ...headers, "idempotency-key": randomUUID() });
  await api.get("/api/v1/plants"); // the session's last use is noted now and not again within a minute
  const create = async () => {
    const path = `/api/v1/plants/${plant.id}/designs`;
    const response = await api.ask("POST", path, { body: { ...pinned, name: "Once" }, headers: api.headers });
    if (response.status !== 201) throw new Error(`answered ${response.status}`);
    return response;
  };
  const before = await checksum(adminUrl);
  const said = vi.spyOn(log, "error").mockReturnValue(undefined);
  const faults = await eachFault(create, async (at) => {
    expect(await checksum(adminUrl), `after a fault in place of statement ${at}`).toBe(before);
    await withClient(adminUrl, (client) => client.query("delete from rate_limits"));
  });
  expect(said).toHaveBeenCalledTimes(faults);
  said.mockRestore();
  expect(faults).toBeGreaterThan(10);
  const after = await checksum(adminUrl);
  expect(after).not.toBe(before);
  expect((await create()).status).toBe(201);
  expect(await checksum(adminUrl)).toBe(after);
});
