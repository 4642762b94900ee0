import { randomUUID } from "node:crypto";
import type { Page } from "@playwright/test";
import type { DesignSummary } from "@/lib/schemas/design";
import { signUpAs } from "../helpers/browser-requests";
import { openDesign, part, press, shownMatrix, storedDesign } from "../helpers/design-page";
import { untilTakenOver } from "../helpers/matrix-page";
import { byPoles, byWeights, observers } from "../helpers/recipes";
import { expect, storedPlant, test } from "../helpers/team-test";

type Request = Parameters<typeof storedPlant>[0];

/** A plant with three designs: two weightings that differ in one state, and one by poles with an observer. */
async function threeDesigns(request: Request) {
  const plant = await storedPlant(request);
  const calm = { form: "deviations", states: [0.002, 0.001, 0.05, 0.05], inputs: [40, 40] } as const;
  const designs: DesignSummary[] = [];
  for (const [name, recipe] of [
    ["Stiff", byWeights()],
    ["Calm", byWeights({ weights: calm })],
    ["Placed", byPoles({ observer: observers.poles })],
  ] as const) {
    designs.push(await storedDesign(request, plant, { name, recipe }));
  }
  return { plant, designs };
}

const address = (plantId: string, designs: readonly DesignSummary[], more = "") =>
  `/plants/${plantId}/side-by-side?designs=${designs.map(({ currentRevision: { id } }) => id).join(",")}${more}`;

const table = (page: Page) => page.getByRole("table", { name: /^Designs side by side/ });
const row = (page: Page, name: string) =>
  table(page)
    .getByRole("row")
    .filter({ has: page.getByRole("rowheader", { name, exact: true }) });

async function open(page: Page, path: string, count = "Two"): Promise<void> {
  await page.goto(path);
  await expect(page.getByRole("heading", { level: 1, name: `${count} designs, side by side` })).toBeVisible();
  await untilTakenOver(page);
}

test("designs are chosen from the table and compared, what differs said in words, equal rows hidden in the address", async ({
  page,
  team,
}) => {
  const { plant } = await threeDesigns(team.lead.request);
  await page.goto(`/plants/${plant.id}?tab=designs`);
  const lay = page.getByRole("button", { name: "Lay side by side" });
  await page.getByRole("checkbox", { name: "Lay Stiff side by side" }).check();
  await expect(page.getByText("1 chosen, one more is needed.")).toBeVisible();
  await expect(lay).toBeDisabled();
  await page.getByRole("checkbox", { name: "Lay Calm side by side" }).check();
  await lay.click();
  await expect(page.getByRole("heading", { level: 1, name: "Two designs, side by side" })).toBeVisible();
  await untilTakenOver(page);
  await expect(table(page).getByRole("columnheader").getByRole("link")).toHaveText(["Stiff", "Calm"]);
  const accepted = row(page, "x1").first();
  await expect(accepted.getByRole("cell").first()).toHaveText("0.001 m");
  await expect(accepted.getByRole("cell").last()).toHaveText("differs from the first: 0.002 m");
  const same = row(page, "x2").first();
  await expect(same.getByRole("cell")).toHaveText(["0.001 m", "0.001 m"]);
  await expect(table(page)).toContainText("best");
  const before = await table(page).getByRole("row").count();
  await page.getByRole("checkbox", { name: "Hide equal rows" }).check();
  await expect(page).toHaveURL(/[?&]hide=equal/);
  await expect(page.getByRole("status").filter({ hasText: /^\d+ equal rows are hidden/ })).toBeVisible();
  await expect(accepted).toBeVisible();
  expect(await table(page).getByRole("row").count()).toBeLessThan(before);
  for (const cells of await table(page).locator("tbody tr:has(td)").all())
    await expect(cells).toContainText("differs from the first");
  await page.reload();
  await expect(page.getByRole("checkbox", { name: "Hide equal rows" })).toBeChecked();
  await expect(row(page, "x1").first()).toBeVisible();
});

test("gains stand side by side as stored, or minus the first's, with the cautions", async ({ page, team }) => {
  const { plant, designs } = await threeDesigns(team.lead.request);
  await openDesign(page, `/plants/${plant.id}/designs/${designs[1].id}`);
  const stored = await shownMatrix(page, "K");
  await open(page, address(plant.id, designs), "Three");
  const gains = part(page, "Gains");
  const titles = (name: string) =>
    gains
      .getByRole("table", { name, exact: true })
      .locator("tbody tr")
      .evaluateAll((rows) => rows.map((one) => [...one.querySelectorAll("td")].map((cell) => Number(cell.title))));
  expect(await titles("K · Calm")).toEqual(stored);
  const first = await titles("K · Stiff");
  await gains.getByRole("radio", { name: "difference to the first" }).check({ force: true });
  await expect(page).toHaveURL(/gains=difference/);
  await expect(gains.getByRole("table", { name: "K changed · Calm minus Stiff" })).toBeVisible();
  expect(await titles("K changed · Calm minus Stiff")).toEqual(
    stored.map((line, r) => line.map((value, c) => value - first[r][c])),
  );
  await expect(gains).toContainText("The machine itself was not tested.");
});

test.describe("an address of a comparison", () => {
  test.use({ expectedProblems: [/status of 404/] });

  test("shows a colleague the same view, and a stranger the same as nonsense", async ({
    page,
    team,
    colleague,
    anotherPerson,
  }) => {
    const { plant, designs } = await threeDesigns(team.lead.request);
    const path = address(plant.id, designs.slice(0, 2), "&hide=equal&commanded=enc2");
    await open(page, path);
    const seenBy = async (one: Page) => {
      await expect(one.getByRole("heading", { level: 2, name: "Responses to enc2 commanded 0.001 m" })).toBeVisible();
      return table(one).ariaSnapshot();
    };
    const mine = await seenBy(page);
    const reviewer = await colleague("reviewer");
    await open(reviewer, path);
    expect(await seenBy(reviewer)).toBe(mine);

    const stranger = await anotherPerson();
    await signUpAs(stranger.request, "Some Stranger");
    const answer = async (address: string) => {
      const reply = await stranger.goto(address);
      await expect(stranger.getByRole("heading", { level: 1, name: "Nothing is kept at this address" })).toBeVisible();
      return { status: reply?.status(), title: await stranger.title(), text: await stranger.locator("body").ariaSnapshot() };
    };
    const theirs = await answer(path);
    expect(theirs.status).toBe(404);
    expect(theirs).toEqual(await answer(`/plants/${randomUUID()}/side-by-side?designs=${randomUUID()},${randomUUID()}`));
    expect(theirs).toEqual(await answer(`/plants/${plant.id}/side-by-side?designs=none,at-all`));
  });
});

test.describe("a comparison", () => {
  test.use({ expectedProblems: [/status of 422/] });

  test("is saved with title and note by a reviewer too, listed, and opened again", async ({ page, team, colleague }) => {
    const { plant, designs } = await threeDesigns(team.lead.request);
    const reviewer = await colleague("reviewer");
    await open(reviewer, address(plant.id, designs), "Three");
    await press(reviewer, "Save comparison");
    const dialog = reviewer.getByRole("dialog", { name: "Save this comparison" });
    await press(dialog, "Save comparison");
    await expect(dialog.getByLabel("Title")).toBeFocused();
    await expect(dialog.getByLabel("Title")).toHaveAttribute("aria-invalid", "true");
    await dialog.getByLabel("Title").fill("Which weighting for the quiet beam");
    await dialog.getByLabel(/^Note/).fill("Placed reacts to the encoders' noise");
    await press(dialog, "Save comparison");
    await expect(reviewer.getByText("is saved below and with the designs of the plant.")).toBeVisible();
    const saved = part(reviewer, "Saved comparisons of this plant");
    await expect(saved.getByRole("link", { name: "Which weighting for the quiet beam" })).toBeVisible();

    await page.goto(`/plants/${plant.id}?tab=designs`);
    await expect(page.getByText("Placed reacts to the encoders' noise")).toBeVisible();
    await page.getByRole("link", { name: "Which weighting for the quiet beam" }).click();
    await expect(page.getByRole("heading", { level: 1, name: "Three designs, side by side" })).toBeVisible();
    await expect(table(page).getByRole("columnheader").getByRole("link")).toHaveText(["Stiff", "Calm", "Placed"]);
  });
});

test("the chart library is fetched only where curves are overlaid, and its curves stand in words and figures too", async ({
  page,
  team,
}) => {
  const { plant, designs } = await threeDesigns(team.lead.request);
  const scripts = new Map<string, number>();
  page.on("response", async (reply) => {
    if (reply.request().resourceType() === "script") scripts.set(reply.url(), (await reply.body().catch(() => "")).length);
  });
  const chartLibrary = () => [...scripts.values()].some((bytes) => bytes > 2_000_000);
  await openDesign(page, `/plants/${plant.id}/designs/${designs[0].id}`);
  await expect(page.getByRole("img", { name: /^enc1 commanded 0\.001 m: enc2 peak/ })).toBeVisible();
  await page.goto(`/plants/${plant.id}?tab=designs`);
  await expect(page.getByRole("checkbox", { name: "Lay Stiff side by side" })).toBeVisible();
  expect(chartLibrary()).toBe(false);

  await open(page, address(plant.id, designs), "Three");
  const overlays = page.getByRole("region", { name: "Responses to enc1 commanded 0.001 m" });
  await overlays.scrollIntoViewIfNeeded();
  const picture = overlays.getByRole("figure").first();
  await picture.scrollIntoViewIfNeeded();
  await expect(picture.locator("svg.main-svg").first()).toBeVisible({ timeout: 30_000 });
  expect(chartLibrary()).toBe(true);
  await expect(picture.getByRole("listitem").filter({ hasText: /^Stiff: largest deviation \S+ m.*settled after/ })).toBeVisible();
  await expect(picture.getByRole("listitem").filter({ hasText: /^Placed: largest deviation/ })).toBeVisible();
  await expect(picture.getByRole("listitem").filter({ hasText: /^Calm ?\(.+\)$/ })).toBeVisible();
  await picture
    .getByText(/in figures$/)
    .first()
    .click();
  const figures = picture.getByRole("table");
  await expect(figures.getByRole("columnheader")).toHaveText(["Time, s", "Stiff, m", "Calm, m", "Placed, m"]);
  await expect(figures.getByRole("row")).toHaveCount(12);
});

test("on paper the comparison has its facts and cautions and nothing to press", async ({ page, team }) => {
  const { plant, designs } = await threeDesigns(team.lead.request);
  await open(page, address(plant.id, designs.slice(0, 2)));
  await page.emulateMedia({ media: "print" });
  await expect(table(page)).toBeVisible();
  await expect(page.getByText("This control law is not a safety function.")).toBeVisible();
  for (const role of ["button", "checkbox", "radio", "combobox", "textbox"] as const) {
    const left = page.getByRole(role).filter({ visible: true });
    await expect(left, role).toHaveCount(0);
  }
  await expect(page.getByRole("navigation", { name: "Main" })).toBeHidden();
});
