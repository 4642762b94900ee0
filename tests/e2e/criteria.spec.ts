import type { Page } from "@playwright/test";
import type { Criteria } from "@/lib/schemas/criteria";
import type { Plant } from "@/lib/schemas/plant";
import { told } from "../helpers/browser-requests";
import { designPath, evidence, openDesign, storedDesign, untilSolved } from "../helpers/design-page";
import { openPlant } from "../helpers/matrix-page";
import { changeEntry, openTab, saveRevision } from "../helpers/plant-page";
import { expect, storedPlant, test } from "../helpers/team-test";

const criterion = (page: Page, what: "Kind" | "Signal" | "Limit", place: number) =>
  page.getByLabel(`${what} of criterion ${place}`, { exact: true });
const add = (page: Page) => page.getByRole("button", { name: "Add criterion" });
const save = (page: Page) => page.getByRole("button", { name: "Save criteria" });
const saved = (page: Page) => page.getByText("The acceptance criteria are saved.");

type Requests = Parameters<typeof storedPlant>[0];
const current = (request: Requests, id: string) => told<Plant>(request, `/api/v1/plants/${id}`);
async function setCriteria(request: Requests, id: string, criteria: Criteria): Promise<Plant> {
  const { version } = await current(request, id);
  return told<Plant>(request, `/api/v1/plants/${id}/criteria`, { method: "PUT", data: { criteria }, version });
}

test.describe("criteria that are refused at first", () => {
  test.use({ expectedProblems: [/status of 422/] });

  test("criteria are written line by line, refused at their field, and saved with one press", async ({ page, team }) => {
    const { id } = await storedPlant(team.lead.request);
    await openPlant(page, `/plants/${id}`);
    await openTab(page, /^Acceptance criteria/);
    await expect(page.getByRole("heading", { name: "No acceptance criteria yet" })).toBeVisible();
    await add(page).click();
    await expect(criterion(page, "Kind", 1)).toHaveValue("settling");
    await criterion(page, "Signal", 1).selectOption("enc1");
    await criterion(page, "Limit", 1).fill("0");
    await add(page).click();
    await criterion(page, "Kind", 2).selectOption("settling");
    await criterion(page, "Signal", 2).selectOption("enc1");
    await criterion(page, "Limit", 2).fill("3");
    await save(page).click();
    await expect(criterion(page, "Limit", 1)).toHaveAccessibleDescription(/A limit above zero is needed here/);
    await expect(criterion(page, "Signal", 2)).toHaveAccessibleDescription(/Line 1 already limits this/);
    await expect(criterion(page, "Limit", 1)).toHaveAttribute("aria-invalid", "true");
    await expect(criterion(page, "Limit", 1)).toBeFocused();
    await criterion(page, "Limit", 1).fill("abc");
    await save(page).click();
    await expect(criterion(page, "Limit", 1)).toBeFocused();
    await expect(criterion(page, "Limit", 1)).toHaveAccessibleDescription(/This is not a number/);
    await criterion(page, "Limit", 1).fill("2.5");
    await criterion(page, "Kind", 2).selectOption("effort");
    await expect(criterion(page, "Signal", 2)).toHaveValue("");
    await criterion(page, "Signal", 2).selectOption("F2");
    await criterion(page, "Limit", 2).fill("80");
    await add(page).click();
    await page.getByRole("button", { name: "Remove criterion 3" }).click();
    await save(page).click();
    await expect(saved(page)).toBeVisible();
    await expect(save(page)).toBeDisabled();
    expect((await current(team.lead.request, id)).criteria).toEqual([
      { kind: "settling", signal: "enc1", limit: 2.5 },
      { kind: "effort", signal: "F2", limit: 80 },
    ]);
    await page.reload();
    await expect(criterion(page, "Limit", 2)).toHaveValue("80");
  });
});

test("the bench says what is met and not met, and follows the hand on a slider", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  const design = await storedDesign(team.lead.request, plant);
  await setCriteria(team.lead.request, plant.id, [
    { kind: "settling", signal: null, limit: 1000 },
    { kind: "effort", signal: "F1", limit: 0.001 },
    { kind: "overshoot", signal: "gone", limit: 5 },
  ]);
  await openDesign(page, designPath(design));
  await untilSolved(page);
  const acceptance = evidence(page, "Acceptance");
  const lines = acceptance.getByRole("list", { name: "Acceptance criteria" }).getByRole("listitem");
  await expect(lines).toHaveCount(3);
  await expect(lines.nth(0)).toContainText(/^Met, worst settling to 2 %/);
  await expect(lines.nth(1)).toContainText(/^Not met, peak effort of F1/);
  await expect(lines.nth(2)).toContainText("the plant has no commanded quantity gone");
  await expect(acceptance.getByRole("status")).toHaveText("Acceptance criteria: 1 of 3 met");
  const before = await lines.nth(1).textContent();
  const slider = page.getByRole("slider", { name: "Largest deviation of x1, slider" });
  await slider.focus();
  for (let press = 0; press < 10; press++) await page.keyboard.press("ArrowLeft");
  await untilSolved(page);
  await expect(lines.nth(1)).not.toHaveText(before ?? "");
  await expect(lines.nth(1)).toContainText(/^Not met/);
});

test("designs side by side say which criteria each of them meets", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  const designs = [
    await storedDesign(team.lead.request, plant, { name: "One" }),
    await storedDesign(team.lead.request, plant, { name: "Other" }),
  ];
  await setCriteria(team.lead.request, plant.id, [
    { kind: "settling", signal: null, limit: 1000 },
    { kind: "effort", signal: "F1", limit: 0.001 },
  ]);
  await page.goto(
    `/plants/${plant.id}/side-by-side?designs=${designs.map(({ currentRevision }) => currentRevision.id).join(",")}`,
  );
  const table = page.getByRole("table", { name: /^Designs side by side/ });
  const row = (name: RegExp) => table.getByRole("row").filter({ has: page.getByRole("rowheader", { name }) });
  await expect(row(/^criteria met/).getByRole("cell")).toHaveText([/1 of 2/, /1 of 2/]);
  await expect(row(/^worst settling to 2 %, at most 1000 s/).getByRole("cell")).toHaveText([/^met, .+ s$/, /^met, .+ s$/]);
  await expect(
    row(/^peak effort of F1/)
      .getByRole("cell")
      .first(),
  ).toHaveText(/^not met, .+ %$/);
});

test("a reviewer reads the criteria and cannot change them", async ({ team, colleague }) => {
  const { id } = await storedPlant(team.lead.request);
  const page = await colleague("reviewer");
  await openPlant(page, `/plants/${id}`);
  await openTab(page, /^Acceptance criteria/);
  await expect(page.getByRole("heading", { name: "No acceptance criteria yet" })).toBeVisible();
  await expect(add(page)).toBeHidden();
  await setCriteria(team.lead.request, id, [{ kind: "cross-peak", signal: "enc1", limit: 20 }]);
  await page.reload();
  const list = page.getByRole("list", { name: "Acceptance criteria" });
  await expect(list.getByRole("listitem")).toHaveText([/^cross-axis peak while enc1 is commanded\s*at most 20 %$/]);
  await expect(save(page)).toBeHidden();
});

test.describe("two people at once", () => {
  test.use({ expectedProblems: [/status of 412/] });

  test("criteria of somebody else are no conflict for the model, and are not overwritten without a look", async ({
    page,
    team,
  }) => {
    const { id } = await storedPlant(team.lead.request);
    await openPlant(page, `/plants/${id}`);
    await changeEntry(page, 3, 3, "-0.6");
    await setCriteria(team.lead.request, id, [{ kind: "overshoot", signal: null, limit: 9 }]);
    await saveRevision(page, 2);
    await openTab(page, /^Acceptance criteria/);
    await expect(criterion(page, "Limit", 1)).toHaveValue("9");
    await criterion(page, "Limit", 1).fill("8");
    await setCriteria(team.lead.request, id, [{ kind: "overshoot", signal: null, limit: 4 }]);
    await save(page).click();
    await expect(page.getByText("Somebody changed the criteria after you opened this plant.")).toBeVisible();
    await expect(page.getByRole("list", { name: "The criteria that they saved" })).toContainText("at most 4 %");
    await page.getByRole("button", { name: "Save mine over theirs" }).click();
    await expect(saved(page)).toBeVisible();
    const { criteria, currentRevision } = await current(team.lead.request, id);
    expect(criteria).toEqual([{ kind: "overshoot", signal: null, limit: 8 }]);
    expect(currentRevision.number).toBe(2);
  });
});
