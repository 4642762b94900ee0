import type { APIRequestContext, Locator, Page } from "@playwright/test";
import type { Recipe } from "@/control/design/recipe";
import type { DesignRevision, DesignSummary } from "@/lib/schemas/design";
import type { PlantSummary } from "@/lib/schemas/plant";
import { told } from "./browser-requests";
import { expect } from "./browser-test";
import { untilTakenOver } from "./matrix-page";
import { byWeights } from "./recipes";

type Stored = { readonly name?: string; readonly recipe?: Recipe };

/** A stored design on the newest revision of `plant`. */
export function storedDesign(
  request: APIRequestContext,
  plant: PlantSummary,
  { name = "First weighting", recipe = byWeights() }: Stored = {},
): Promise<DesignSummary> {
  const data = { name, plantRevisionId: plant.currentRevision.id, recipe, note: "" };
  return told<DesignSummary>(request, `/api/v1/plants/${plant.id}/designs`, { data });
}

/** The newest revision of a design, as it is stored now. */
export async function newestRevision(request: APIRequestContext, designId: string): Promise<DesignRevision> {
  const { currentRevision } = await told<DesignSummary>(request, `/api/v1/designs/${designId}`);
  return told<DesignRevision>(request, `/api/v1/design-revisions/${currentRevision.id}`);
}

/** Opens the page of a design, or of a new one, once it listens. */
export async function openDesign(page: Page, path: string): Promise<void> {
  await page.goto(path);
  await expect(page.getByRole("heading", { level: 2, name: "Coupled response" })).toBeVisible();
  await untilTakenOver(page);
}

export const designPath = ({ plantId, id }: DesignSummary): string => `/plants/${plantId}/designs/${id}`;

export const figure = (page: Page, name: string): Locator => page.getByRole("textbox", { name, exact: true });

/** Presses a segment or radio button by what is written on it. */
export const choose = (page: Page, name: string | RegExp): Promise<void> =>
  page.getByRole("radio", { name, exact: typeof name === "string" }).check({ force: true });

export const press = (page: Page | Locator, name: string): Promise<void> =>
  page.getByRole("button", { name, exact: true }).first().click();

/** Until everything on the page belongs to the recipe as it stands. */
export async function untilSolved(page: Page): Promise<void> {
  await expect(page.getByText("Solved as it stands")).toBeVisible({ timeout: 20_000 });
  await expect(page.locator("[aria-busy=true]")).toHaveCount(0);
}

/** Solves whatever stands on the page and waits for the answer. */
export async function solve(page: Page): Promise<void> {
  await press(page, "Solve");
  await untilSolved(page);
}

export const part = (page: Page, name: string): Locator => page.getByRole("region", { name, exact: true });

/** A matrix of the gains at full precision, from the titles that its cells carry. */
export async function shownMatrix(page: Page, symbol: string): Promise<number[][]> {
  const rows = part(page, "Gains")
    .getByRole("table", { name: new RegExp(`^${symbol} · `) })
    .locator("tbody tr");
  await expect(rows.first()).toBeVisible();
  const titles = await rows.evaluateAll((all) => all.map((row) => [...row.querySelectorAll("td")].map((cell) => cell.title)));
  return titles.map((row) => row.map(Number));
}

/** Fills the list of wanted poles, two for each pair of frequency and damping. */
export async function wantPairs(page: Page, legend: string, pairs: readonly (readonly [string, string])[]): Promise<void> {
  const list = page.getByRole("group", { name: legend });
  for (const [index, [frequency, damping]] of pairs.entries()) {
    await press(list, "Add a pole");
    const entry = list.getByRole("listitem").nth(index);
    await entry.getByLabel("Frequency").fill(frequency);
    await entry.getByLabel("Damping", { exact: true }).fill(damping);
  }
}

/** One part of the evidence, by its heading. */
export const evidence = (page: Page, title: string | RegExp): Locator =>
  page
    .getByRole("region", { name: "Evidence", exact: true })
    .locator("section")
    .filter({ has: page.getByRole("heading", { level: 3, name: title, exact: typeof title === "string" }) });

/** Once the unsaved work is on the server; the limit is what a reader is promised. */
export async function untilDraftSaved(page: Page): Promise<void> {
  await expect(page.getByText("Draft saved", { exact: true })).toBeVisible({ timeout: 2_000 });
}

/** Leaves with unsaved work that is kept: nobody is asked, and the work is back afterwards. */
export async function reloadKept(page: Page): Promise<void> {
  const asked: string[] = [];
  page.on("dialog", (dialog) => {
    asked.push(dialog.type());
    void dialog.accept();
  });
  await page.reload();
  expect(asked).toEqual([]);
  await expect(page.getByText("Your unsaved changes are back.")).toBeVisible();
}

/** Saves the recipe on the page as a design of its own. */
export async function saveAsDesign(page: Page, name: string): Promise<void> {
  await press(page, "Save design");
  const dialog = page.getByRole("dialog", { name: "Save the design" });
  await dialog.getByLabel("Name of the design").fill(name);
  await press(dialog, "Save");
  await expect(page.getByRole("heading", { level: 1, name })).toBeVisible({ timeout: 20_000 });
}

/** Asks to save the next revision and sends, whatever comes of it. */
export async function sendDesignRevision(page: Page, revision: number, note = ""): Promise<void> {
  await press(page, `Save revision ${revision}`);
  const dialog = page.getByRole("dialog", { name: `Save revision ${revision}` });
  if (note) await dialog.getByLabel(/^Note for this revision/).fill(note);
  await press(dialog, `Save revision ${revision}`);
}

export async function saveDesignRevision(page: Page, revision: number, note = ""): Promise<void> {
  await sendDesignRevision(page, revision, note);
  await expect(page.getByText(`Revision ${revision} is saved.`)).toBeVisible({ timeout: 20_000 });
}
