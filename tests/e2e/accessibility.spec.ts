import type { Page } from "@playwright/test";
import { inBothThemes, untilSettled } from "../helpers/axe-page";
import { cellOf, openPlant, pasteAt, untilTakenOver } from "../helpers/matrix-page";
import { type Listed, PUBLIC_PAGES, teamPages } from "../helpers/page-list";
import { changeEntry } from "../helpers/plant-page";
import { expect, storedPlant, test } from "../helpers/team-test";

async function everyPage(page: Page, pages: readonly Listed[]) {
  for (const { name, path } of pages) {
    await test.step(name, async () => {
      await page.goto(path);
      await untilTakenOver(page);
      await untilSettled(page);
      await inBothThemes(page, name);
    });
  }
}

test.describe("axe finds nothing, in light and in dark,", () => {
  test("on the pages for visitors", async ({ anotherPerson }) => {
    test.setTimeout(240_000);
    await everyPage(await anotherPerson(), PUBLIC_PAGES);
  });

  test("on the pages of a team that has everything", async ({ page, team }) => {
    test.setTimeout(400_000);
    await everyPage(page, await teamPages(team.lead.request));
  });

  test("on the pages of an empty team", async ({ page }) => {
    test.setTimeout(120_000);
    await everyPage(
      page,
      ["/plants", "/templates", "/outbox"].map((path) => ({ name: `empty ${path}`, path })),
    );
  });

  test.describe("on", () => {
    test.use({ expectedProblems: [/status of (404|422|401|503)/] });

    test("pages that say what went wrong", async ({ page, context, team }) => {
      test.setTimeout(180_000);
      await everyPage(page, [
        { name: "nothing here", path: "/plants/none" },
        { name: "no such page", path: "/none" },
      ]);
      await openPlant(page, "/plants/new");
      await pasteAt(page, cellOf(page, "A", 1, 1), "1\t#DIV/0!\n3\tno_such");
      await page.getByRole("tab", { name: /^Signals/ }).click();
      await page.getByRole("button", { name: "Add state" }).click();
      await expect(page.getByRole("textbox", { name: /^Unit of state 5/ })).toHaveAttribute("aria-invalid", "true");
      await inBothThemes(page, "signals in error");
      await page.getByRole("tab", { name: "Model" }).click();
      await inBothThemes(page, "matrix in error");
      await context.route("**/api/v1/plants?*", (route) => route.fulfill({ status: 503, body: "" }));
      await page.goto("/plants");
      await expect(page.getByText("The plants could not be loaded.")).toBeVisible({ timeout: 20_000 });
      await inBothThemes(page, "list that failed");
      const plant = await storedPlant(team.lead.request);
      await openPlant(page, `/plants/${plant.id}`);
      await changeEntry(page, 3, 3, "-0.6");
      await page.reload();
      await expect(page.getByText("Your unsaved changes are back.")).toBeVisible();
      await inBothThemes(page, "draft that came back");
      await context.clearCookies();
      await page.getByRole("button", { name: "Save revision 2" }).click();
      await inBothThemes(page, "dialog to save");
      await page.getByRole("dialog").getByRole("button", { name: "Save", exact: true }).click();
      await expect(page.getByRole("dialog", { name: "Sign in again to go on" })).toBeVisible();
      await inBothThemes(page, "dialog to sign in again");
    });
  });

  test.describe("and on", () => {
    test.use({ expectedProblems: [/./] });

    test("a page whose making failed, which keeps the header and tries again", async ({ page, context }) => {
      await context.route("**/api/v1/plants?*", (route) => route.fulfill({ json: { items: [{}], nextCursor: null } }));
      await page.goto("/plants");
      await expect(page.getByRole("heading", { level: 1, name: "This page could not be shown" })).toBeVisible();
      await expect(page.getByRole("button", { name: /account menu$/ })).toBeVisible();
      await inBothThemes(page, "page that failed");
      await context.unroute("**/api/v1/plants?*");
      await page.getByRole("button", { name: "Try again" }).click();
      await expect(page.getByRole("heading", { level: 1, name: "Plants" })).toBeVisible();
    });
  });

  test("on open menus and dialogs", async ({ page, team }) => {
    test.setTimeout(180_000);
    const plant = await storedPlant(team.lead.request);
    await openPlant(page, `/plants/${plant.id}`);
    await untilSettled(page);
    await page.getByRole("button", { name: /account menu$/ }).click();
    await inBothThemes(page, "account menu");
    await page.keyboard.press("Escape");
    await page.getByRole("button", { name: /^More for/ }).click();
    await inBothThemes(page, "menu of the plant");
    await page.getByRole("menuitem", { name: "Rename…" }).click();
    await inBothThemes(page, "dialog to rename");
    await page.keyboard.press("Escape");
    await page.getByRole("button", { name: "Save as template" }).click();
    await inBothThemes(page, "dialog to publish");
    await page.goto("/account");
    await untilTakenOver(page);
    await page.getByRole("button", { name: "Sign out everywhere", exact: true }).click();
    await inBothThemes(page, "dialog to sign out everywhere");
  });
});

/** What sticks out to the right of the page; boxes that scroll by themselves are exempt with all that they hold. */
const sticksOut = (page: Page) =>
  page.evaluate(() => {
    const width = document.documentElement.clientWidth;
    if (document.documentElement.scrollWidth <= width) return [];
    const scrolls = (element: Element | null): boolean =>
      element !== null && (/auto|scroll|hidden/.test(getComputedStyle(element).overflowX) || scrolls(element.parentElement));
    return [...document.body.querySelectorAll("*")]
      .filter((element) => element.getBoundingClientRect().right > width + 1 && !scrolls(element.parentElement))
      .map((element) => `${element.tagName} ${element.className} ${element.textContent?.slice(0, 40)}`);
  });

for (const width of [820, 320]) {
  test(`no page is wider than a screen of ${width} pixels, grids aside`, async ({ page, team, anotherPerson }) => {
    test.setTimeout(240_000);
    const visitor = await anotherPerson();
    const all = [
      ...PUBLIC_PAGES.map((listed) => ({ ...listed, seenBy: visitor })),
      ...(await teamPages(team.lead.request)).map((listed) => ({ ...listed, seenBy: page })),
    ];
    for (const { name, path, seenBy } of all) {
      await seenBy.setViewportSize({ width, height: 1000 });
      await seenBy.goto(path);
      await untilSettled(seenBy);
      expect.soft(await sticksOut(seenBy), name).toEqual([]);
    }
  });
}
