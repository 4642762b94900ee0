import type { DesignSummary } from "@/lib/schemas/design";
import type { PlantRevision, PlantSummary } from "@/lib/schemas/plant";
import type { Template } from "@/lib/schemas/template";
import { ask, told } from "../helpers/browser-requests";
import { figure, newestRevision, press, shownMatrix, storedDesign } from "../helpers/design-page";
import { openPlant, untilTakenOver } from "../helpers/matrix-page";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights } from "../helpers/recipes";
import { expectRefused } from "../helpers/refused-field";
import { expect, storedPlant, test } from "../helpers/team-test";

const mass = { name: "m", unit: "kg", lowest: 8, highest: 40, suggested: 12, help: "Weigh one carriage" };

/** Published through the service, for tests of what comes after. */
function storedTemplate(request: Parameters<typeof told>[0], name: string): Promise<Template> {
  const content = { plant: twoCarriages(), recipe: byWeights(), openParameters: [mass] };
  return told<Template>(request, "/api/v1/templates", { data: { name, description: "", content } });
}

test("a lead publishes a plant with a recipe, and an engineer starts from it: out of range is refused, in range it is designed", async ({
  page,
  team,
  colleague,
}) => {
  const plant = await storedPlant(team.lead.request);
  await storedDesign(team.lead.request, plant, { name: "Quiet beam" });

  await test.step("the lead opens a parameter and says its range", async () => {
    await openPlant(page, `/plants/${plant.id}`);
    await press(page, "Save as template");
    const dialog = page.getByRole("dialog", { name: "Save Two carriages as a template" });
    await dialog.getByLabel("Name of the template").fill("Carriage pair");
    await dialog.getByRole("checkbox", { name: /^m/ }).check();
    await dialog.getByRole("textbox", { name: "Lowest m" }).fill("8");
    await press(dialog, "Publish the template");
    await expectRefused(dialog.getByRole("textbox", { name: "Highest m" }), /Highest m is missing/);
    await dialog.getByRole("textbox", { name: "Highest m" }).fill("40");
    await dialog.getByRole("textbox", { name: "How to find m" }).fill("Weigh one carriage");
    await expect(dialog).toContainText(/Computed from others, and so never filled in: k/);
    await press(dialog, "Publish the template");
    await expect(page.getByText("“Carriage pair” is published: the team can start from it.")).toBeVisible({ timeout: 20_000 });
  });

  const engineer = await colleague("engineer");
  await engineer.goto("/templates");
  await engineer.getByRole("table", { name: "Templates of the team" }).getByRole("link", { name: "Carriage pair" }).click();
  await expect(engineer.getByRole("heading", { level: 1, name: "Carriage pair" })).toBeVisible();
  await untilTakenOver(engineer);
  const value = engineer.getByRole("textbox", { name: "m", exact: true });

  await test.step("a value out of range is refused at its field and kept", async () => {
    await expect(value).toHaveValue("12");
    await expect(value).toHaveAccessibleDescription(/8 to 40 kg\. Weigh one carriage/);
    await engineer.getByLabel("Name of the plant").fill("Line 7");
    await value.fill("55");
    await press(engineer, "Start the plant and its design");
    await expectRefused(value, /m lies above the allowed 40 kg/);
    await expect(value).toHaveValue("55");
    await expect(engineer.getByLabel("Name of the plant")).toHaveValue("Line 7");
  });

  await test.step("in range it becomes a plant and its first design, computed for this machine", async () => {
    await value.fill("25");
    await press(engineer, "Start the plant and its design");
    await expect(engineer.getByRole("heading", { level: 1, name: "First design" })).toBeVisible({ timeout: 20_000 });
    await expect(engineer.getByRole("link", { name: "Line 7" })).toBeVisible();
    const { items } = await told<{ items: PlantSummary[] }>(team.lead.request, "/api/v1/plants?search=Line");
    const started = items[0];
    const path = `/api/v1/plants/${started.id}/revisions/${started.currentRevision.id}`;
    const { content, model } = await told<PlantRevision>(team.lead.request, path);
    expect(content.parameters.find(({ name }) => name === "m")?.expression).toBe("25");
    expect(model.B[2][0]).toBe(1 / 25);
    const designs = await told<{ items: DesignSummary[] }>(team.lead.request, `/api/v1/plants/${started.id}/designs`);
    const { evidence, recipe } = await newestRevision(team.lead.request, designs.items[0].id);
    expect(recipe).toEqual(byWeights());
    expect(evidence.gains.state === "computed" && evidence.gains.value.K).toEqual(await shownMatrix(engineer, "K"));
    await expect(figure(engineer, "Largest deviation of x1, m")).toHaveValue("0.001");
  });
});

test.describe("a value that only the service sees", () => {
  test("is refused by it with the place, and nothing is stored", async ({ team }) => {
    const { id } = await storedTemplate(team.lead.request, "Carriage pair");
    const data = { plantName: "Line 8", designName: "First", values: { m: 41 } };
    const reply = await ask(team.lead.request, `/api/v1/templates/${id}/start`, { data });
    expect(reply.status()).toBe(422);
    expect((await reply.json()).errors).toEqual([{ pointer: "/values/m", detail: "m must lie between 8 and 40 kg" }]);
    const { items } = await told<{ items: PlantSummary[] }>(team.lead.request, "/api/v1/plants");
    expect(items).toEqual([]);
  });
});

test("an archived template starts nothing, and can be brought back from its message", async ({ page, team, colleague }) => {
  const template = await storedTemplate(team.lead.request, "Carriage pair");
  const engineer = await colleague("engineer");
  await page.goto(`/templates/${template.id}`);
  await untilTakenOver(page);
  await press(page, "Archive");
  await expect(page.getByText("“Carriage pair” is archived: nobody can start from it.")).toBeVisible();
  await expect(page.getByText("This template is out of use.")).toBeVisible();
  await engineer.goto("/templates");
  await expect(engineer.getByRole("heading", { name: "No template yet" })).toBeVisible();
  await engineer.goto(`/templates/${template.id}`);
  await expect(engineer.getByText("This template is out of use.")).toBeVisible();
  await expect(engineer.getByRole("button", { name: "Start the plant and its design" })).toHaveCount(0);
  const data = { plantName: "Line 9", designName: "First", values: { m: 20 } };
  const reply = await ask(engineer.request, `/api/v1/templates/${template.id}/start`, { data });
  expect(reply.status()).toBe(409);
  await press(page, "Undo");
  await expect(page.getByText("“Carriage pair” is in use again.")).toBeVisible();
  await engineer.reload();
  await expect(engineer.getByRole("button", { name: "Start the plant and its design" })).toBeVisible();
});

test("a reviewer reads a template and can neither start from it, archive it nor publish one", async ({ team, colleague }) => {
  const template = await storedTemplate(team.lead.request, "Carriage pair");
  const plant = await storedPlant(team.lead.request);
  await storedDesign(team.lead.request, plant);
  const reviewer = await colleague("reviewer");
  await reviewer.goto(`/templates/${template.id}`);
  await expect(reviewer.getByRole("table", { name: /^A · / })).toBeVisible();
  await expect(reviewer.getByText("A lead or an engineer of the team starts plants and designs from it.")).toBeVisible();
  await expect(reviewer.getByRole("main").getByRole("textbox")).toHaveCount(0);
  await expect(reviewer.getByRole("button", { name: /Archive|Start/ })).toHaveCount(0);
  await openPlant(reviewer, `/plants/${plant.id}`);
  await expect(reviewer.getByRole("button", { name: "Save as template" })).toHaveCount(0);
  const data = { plantName: "Line 9", designName: "First", values: { m: 20 } };
  expect((await ask(reviewer.request, `/api/v1/templates/${template.id}/start`, { data })).status()).toBe(403);
});
