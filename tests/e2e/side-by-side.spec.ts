import { randomUUID } from "node:crypto";
import type { Page } from "@playwright/test";
import type { DesignSummary } from "@/lib/schemas/design";
import { signUpAs, told } from "../helpers/browser-requests";
import { cellsOf } from "../helpers/csv-records";
import { newestRevision, openDesign, part, press, shownMatrix, storedDesign } from "../helpers/design-page";
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

const heads = (page: Page) => table(page).getByRole("columnheader").getByRole("link");

/** The names of the designs, the one that settles first foremost, as their stored figures say. */
async function bySettling(request: Request, designs: readonly DesignSummary[]): Promise<string[]> {
  const timed = [];
  for (const { id, name } of designs) {
    const { responses } = (await newestRevision(request, id)).evidence;
    if (responses.state !== "computed") throw new Error(`the responses of ${name} were refused`);
    timed.push({ name, settling: Number(responses.value.summary.fullState.worstSettling) });
  }
  return timed.sort((a, b) => a.settling - b.settling).map(({ name }) => name);
}

test("a figure that is pressed puts the designs in order of it: in the address, after a reload, in words, and back again", async ({
  page,
  team,
}) => {
  const { plant, designs } = await threeDesigns(team.lead.request);
  const order = await bySettling(team.lead.request, designs);
  await open(page, address(plant.id, designs), "Three");
  await expect(heads(page)).toHaveText(["Stiff", "Calm", "Placed"]);
  await expect(page.getByRole("status").filter({ hasText: "In the order chosen; Stiff is what the others" })).toBeVisible();
  const figure = table(page).getByRole("rowheader", { name: "settling, 2 %", exact: true }).first();
  await expect(figure).toHaveAttribute("aria-sort", "none");
  await figure.getByRole("button").click();
  await expect(page).toHaveURL(/[?&]sort=full-state(\+|%20)settling(&|$)/);
  await expect(heads(page)).toHaveText(order);
  await expect(figure).toHaveAttribute("aria-sort", "ascending");
  const said = page.getByRole("status").filter({ hasText: /^Sorted by/ });
  await expect(said).toHaveText(`Sorted by settling, 2 %, with the full state, least first: ${order.join(", ")}.`);
  await expect(
    table(page)
      .getByRole("row", { name: /^settling, 2 %/ })
      .first()
      .getByRole("cell")
      .first(),
  ).toContainText("best");

  await figure.getByRole("button").press("Enter");
  await expect(page).toHaveURL(/[?&]order=most(&|$)/);
  const turned = order.toReversed();
  await expect(heads(page)).toHaveText(turned);
  await page.reload();
  await expect(heads(page)).toHaveText(turned);
  await expect(said).toHaveText(`Sorted by settling, 2 %, with the full state, most first: ${turned.join(", ")}.`);
  const bought = part(page, "What each trade bought").getByRole("listitem");
  await expect(bought).toHaveCount(2);
  for (const name of turned.slice(1)) await expect(bought.filter({ hasText: name })).toContainText(turned[0]);

  await untilTakenOver(page);
  await press(page, "Back to the order chosen");
  await expect(heads(page)).toHaveText(["Stiff", "Calm", "Placed"]);
  await expect(page).not.toHaveURL(/[?&](sort|order)=/);
});

test("revisions of one design are chosen beside or instead of the newest, left out again, and laid side by side", async ({
  page,
  team,
}) => {
  const { request } = team.lead;
  const plant = await storedPlant(request);
  const first = await storedDesign(request, plant, { name: "Stiff" });
  const calm = { form: "deviations", states: [0.002, 0.001, 0.05, 0.05], inputs: [40, 40] } as const;
  await told(request, `/api/v1/designs/${first.id}/revisions`, {
    version: first.version,
    data: { plantRevisionId: plant.currentRevision.id, recipe: byWeights({ weights: calm }), note: "Twice the deviation" },
  });
  await page.goto(`/plants/${plant.id}/side-by-side`);
  await untilTakenOver(page);
  const earlier = page.getByRole("button", { name: "Earlier revisions of Stiff" });
  await earlier.click();
  await expect(earlier).toHaveAttribute("aria-expanded", "true");
  const old = page.getByRole("checkbox", { name: "Lay revision 1 of Stiff side by side" });
  await old.check();
  await page.getByRole("checkbox", { name: "Lay Stiff side by side" }).check();
  const chosen = page.getByRole("list", { name: "Chosen, in order" }).getByRole("listitem");
  await expect(chosen).toHaveText([/^1\. Stiff, revision 1/, /^2\. Stiff, revision 2/]);
  await press(page, "Leave out Stiff, revision 1");
  await expect(old).not.toBeChecked();
  await expect(page.getByText("1 chosen, one more is needed.")).toBeVisible();
  await old.check();
  await expect(chosen).toHaveText([/^1\. Stiff, revision 2/, /^2\. Stiff, revision 1/]);
  await press(page, "Lay side by side");
  await expect(page.getByRole("heading", { level: 1, name: "Two revisions of Stiff, side by side" })).toBeVisible();
  await expect(table(page).getByRole("columnheader")).toHaveText([/^Stiff ?revision 2,/, /^Stiff ?revision 1,/]);
  await expect(row(page, "x1").first().getByRole("cell")).toHaveText(["0.002 m", "differs from the first: 0.001 m"]);
  const bought = part(page, "What each trade bought").getByRole("listitem");
  await expect(bought).toHaveText(/^Against Stiff revision 2, Stiff revision 1 .+\.$/);
  await page.getByRole("link", { name: "Choose designs" }).click();
  await expect(chosen).toHaveText([/^1\. Stiff, revision 2/, /^2\. Stiff, revision 1/]);
});

test("the comparison is downloaded as a table with every fact, the words and the cautions", async ({ page, team }) => {
  const { plant, designs } = await threeDesigns(team.lead.request);
  await open(page, address(plant.id, designs), "Three");
  const [file] = await Promise.all([
    page.waitForEvent("download"),
    page.getByRole("link", { name: "Download CSV", exact: true }).click(),
  ]);
  expect(file.suggestedFilename()).toBe(`${plant.name} side by side.csv`);
  const chunks: Buffer[] = [];
  for await (const chunk of await file.createReadStream()) chunks.push(chunk as Buffer);
  const records = cellsOf(Buffer.concat(chunks).toString("utf8"));
  expect(records[0]).toEqual(["section", "item", "figure", "unit", "Stiff", "Calm", "Placed", "best", "worst"]);
  const accepted = records.find(([section, item]) => section === "Largest deviation accepted" && item === "x1");
  expect(accepted?.slice(3, 7)).toEqual(["m", "0.001", "0.002", ""]);
  const stored = (await newestRevision(team.lead.request, designs[2].id)).evidence.gains;
  if (stored.state !== "computed") throw new Error("the gains were refused");
  const entries = records.filter(([section]) => section === "K, state feedback").map((record) => Number(record[6]));
  expect(entries).toEqual(stored.value.K.flat());
  const words = records.find(([section]) => section === "What each trade bought");
  expect(words?.[5]).toMatch(/^(Against Stiff, Calm|Calm and Stiff) /);
  expect(records.filter(([section]) => section === "Caution")).toHaveLength(3);
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
  await expect(page.getByRole("link", { name: "Download CSV" })).toBeHidden();
  // What orders the designs on screen is a plain word on paper.
  await expect(table(page).getByRole("rowheader", { name: "settling, 2 %", exact: true }).first()).toBeVisible();
  await expect(part(page, "What each trade bought").getByRole("listitem")).toHaveCount(1);
});
