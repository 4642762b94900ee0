import type { Page } from "@playwright/test";
import { untilSettled } from "../helpers/axe-page";
import { untilTakenOver } from "../helpers/matrix-page";
import { expect, storedPlant, test } from "../helpers/team-test";

/** What stands where nothing is yet: a heading or sentence, and the one thing to do. */
async function expectEmpty(page: Page, path: string, words: string | RegExp, action: string | RegExp | null) {
  await page.goto(path);
  await untilTakenOver(page);
  await untilSettled(page);
  const main = page.getByRole("main");
  await expect(main.getByText(words).first(), path).toBeVisible();
  if (action === null) return;
  const way = main
    .getByRole("link", { name: action })
    .or(main.getByRole("button", { name: action }))
    .first();
  await expect(way, path).toBeVisible();
  await expect(way, path).toBeEnabled();
}

test("every list of an empty team says what belongs there and offers one thing to do", async ({ page, team }) => {
  test.setTimeout(120_000);
  await expectEmpty(page, "/plants", "Your first plant", "Enter a plant");
  await expectEmpty(page, "/templates", "No template yet", "Go to the plants");
  await expectEmpty(page, "/outbox", "No mail yet", "Look again");
  await expectEmpty(page, "/team", "No invitation is open.", "Invite");
  await expectEmpty(page, "/account", "You have no access token in this team.", "Make an access token");
  const plant = await storedPlant(team.lead.request);
  await expectEmpty(page, "/plants?search=nothing-like-it", "No plant matches", "Show all plants");
  await expectEmpty(page, "/plants?archived=yes", "No plant matches", "Show all plants");
  await expectEmpty(page, `/plants/${plant.id}?tab=designs`, /No design|first design/i, /design/i);
  await expectEmpty(page, `/plants/${plant.id}?tab=criteria`, "No acceptance criteria yet", "Add criterion");
  await expectEmpty(page, `/plants/${plant.id}?tab=parameters`, "Parameters", "Add parameter");
  await expectEmpty(page, `/plants/${plant.id}/side-by-side`, /design/i, /design/i);
});

test("a search without hits is left by its own button, and the list is back", async ({ page, team }) => {
  await storedPlant(team.lead.request);
  await page.goto("/plants");
  await untilTakenOver(page);
  await page.getByLabel("Search by name").fill("gyroscope");
  await expect(page.getByText("No name here contains “gyroscope”.")).toBeVisible();
  await expect(page).toHaveURL(/search=gyroscope/);
  await page.getByRole("button", { name: "Show all plants" }).click();
  await expect(page.getByRole("link", { name: "Two carriages" })).toBeVisible();
  await expect(page.getByLabel("Search by name")).toHaveValue("");
});

test("a reviewer of an empty team is told who fills it", async ({ colleague }) => {
  const page = await colleague("reviewer");
  await expectEmpty(page, "/plants", "No plant yet", null);
  await expect(page.getByText(/A lead or an engineer of the team enters it/)).toBeVisible();
  await expect(page.getByRole("link", { name: "Enter a plant" })).toHaveCount(0);
  await expectEmpty(page, "/templates", "No template yet", null);
  await expect(page.getByText(/A lead of the team publishes them/)).toBeVisible();
});
