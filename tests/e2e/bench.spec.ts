import {
  choose,
  designPath,
  evidence,
  figure,
  openDesign,
  press,
  shownMatrix,
  storedDesign,
  untilSolved,
} from "../helpers/design-page";
import { expect, storedPlant, test } from "../helpers/team-test";

test("a slider moves its figure by the same factor, the loop follows, and both ways back lead to where it started", async ({
  page,
  team,
}) => {
  const plant = await storedPlant(team.lead.request);
  await openDesign(page, designPath(await storedDesign(team.lead.request, plant)));
  await untilSolved(page);
  const before = await shownMatrix(page, "K");
  const slider = page.getByRole("slider", { name: "Largest deviation of x1, slider" });
  await slider.focus();
  for (let press = 0; press < 10; press++) await page.keyboard.press("ArrowLeft");
  const deviation = figure(page, "Largest deviation of x1, m");
  await expect(deviation).toHaveValue("0.000631");
  await expect(slider).toHaveAttribute("aria-valuetext", /6\.31e.4 m/);
  await untilSolved(page);
  const after = await shownMatrix(page, "K");
  expect(Math.abs(after[0][0])).toBeGreaterThan(Math.abs(before[0][0]));
  await expect(page.getByText(/^twice the weight: settling .*%/).first()).toBeVisible();
  await page.getByRole("button", { name: "Largest deviation of x1: back to 0.001 m" }).click();
  await expect(deviation).toHaveValue("0.001");
  await untilSolved(page);
  expect(await shownMatrix(page, "K")).toEqual(before);
  await press(page, "Undo");
  await untilSolved(page);
  await press(page, "Redo");
  await untilSolved(page);
  expect(await shownMatrix(page, "K")).toEqual(before);
});

test("what is shown while the hand is on a slider is solved in the page, without a request", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  const asked: string[] = [];
  page.on("request", (request) => {
    if (request.url().includes("/api/v1/computations")) asked.push(request.url());
  });
  await openDesign(page, `/plants/${plant.id}/designs/new`);
  await untilSolved(page);
  await figure(page, "Accepted effort of F1, N").fill("55");
  await untilSolved(page);
  await expect(page.getByText(/Solved as it stands, in \S+ ms/)).toBeVisible();
  expect(asked).toEqual([]);
});

test("a point of the trade curve becomes the recipe", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  await openDesign(page, `/plants/${plant.id}/designs/new`);
  await untilSolved(page);
  await page.getByText("What speed costs: sweep the recipe").click();
  await press(page, "Sweep");
  const curve = page.getByRole("figure", { name: "Settling against effort" });
  await expect(curve).toBeVisible({ timeout: 30_000 });
  await expect(curve.getByRole("button")).toHaveCount(11);
  await curve.getByRole("button", { name: /^Use 1.58 times: settles in .* effort \S+ % of a limit/ }).click();
  await expect(figure(page, "Accepted effort of F1, N")).toHaveValue("63.4");
  await untilSolved(page);
  await page.getByText("The same in words").click();
  await expect(page.getByRole("listitem").filter({ hasText: /^1 times: settles in/ })).toBeVisible();
});

test("poles start from a published set, are moved by keys, and the loop has them", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  await openDesign(page, `/plants/${plant.id}/designs/new`);
  await choose(page, "Poles");
  await page.getByText("Take a published set").click();
  await page.getByLabel("Frequency of left, order 2").fill("20");
  await page.getByLabel("Frequency of right, order 2").fill("26");
  await press(page, "Use these poles");
  await expect(page.getByText("4 of 4 poles")).toBeVisible();
  await expect(page.getByLabel("Reason for the poles")).toHaveValue(/^Bessel, left: order 2 at 20 rad\/s/);
  await untilSolved(page);
  const poles = evidence(page, "Loop").getByRole("list", { name: "Closed-loop poles" });
  await expect(poles).toContainText("−17.32 ± 10 i");
  await page.getByRole("button", { name: /^Move entry 1/ }).press("Shift+ArrowLeft");
  await untilSolved(page);
  await expect(poles).not.toContainText("−17.32 ± 10 i");
  await press(page, "Undo");
  await untilSolved(page);
  await expect(poles).toContainText("−17.32 ± 10 i");
});

test("a cell of the responses is enlarged, with its words and figures", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  await openDesign(page, `/plants/${plant.id}/designs/new`);
  await untilSolved(page);
  await page.getByRole("button", { name: "Enlarge enc1 commanded 0.001 m: enc2" }).press("Enter");
  const dialog = page.getByRole("dialog", { name: "enc1 commanded 0.001 m: enc2" });
  await expect(dialog.locator("svg.main-svg").first()).toBeVisible({ timeout: 30_000 });
  await expect(dialog.getByRole("listitem").filter({ hasText: /^enc1 commanded 0\.001 m: enc2 peak/ })).toBeVisible();
  await page.keyboard.press("Escape");
  await expect(dialog).toBeHidden();
});
