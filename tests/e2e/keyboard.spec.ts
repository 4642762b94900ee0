import type { Locator, Page } from "@playwright/test";
import { untilSettled } from "../helpers/axe-page";
import { cellOf, onClipboard, untilTakenOver } from "../helpers/matrix-page";
import { expect, test } from "../helpers/team-test";

/** What has the focus, whether that is seen, and what covers it. */
const focusNow = (page: Page) =>
  page.evaluate(() => {
    const focused = document.activeElement;
    if (!focused || focused === document.body) return null;
    // A choice that is drawn as a segment shows its label in place of the browser's own mark.
    const element = (focused.clientWidth <= 1 && focused.closest("label")) || focused;
    const name = `${element.tagName.toLowerCase()} ${element.getAttribute("aria-label") ?? element.textContent?.slice(0, 40) ?? ""}`;
    const { outlineStyle, outlineWidth, boxShadow } = getComputedStyle(element);
    const marked = (outlineStyle !== "none" && Number.parseFloat(outlineWidth) >= 2) || boxShadow !== "none";
    const { left, top, width, height } = element.getBoundingClientRect();
    // A corner that is seen is enough (WCAG 2.4.11 asks that not all of it is hidden).
    const points = [
      [left + width / 2, top + height / 2],
      [left + 3, top + 3],
      [left + width - 3, top + height - 3],
    ];
    const seen = points.some(([x, y]) => {
      const there = document.elementFromPoint(x, y);
      return there !== null && (element.contains(there) || there.contains(element));
    });
    return { name, marked, seen };
  });

/** Goes on with Tab until `wanted` has the focus; each stop on the way must be marked and in sight. */
async function tabTo(page: Page, wanted: Locator, key = "Tab") {
  await expect(wanted).toBeVisible();
  for (let stops = 0; stops < 150; stops++) {
    await page.keyboard.press(key);
    const focus = await focusNow(page);
    if (focus) expect.soft(focus, `${key} stop ${stops}`).toEqual({ name: focus.name, marked: true, seen: true });
    if (await wanted.evaluate((element) => element === document.activeElement)) return;
  }
  throw new Error(`${wanted} was not reached by ${key}`);
}

test("the whole job is done by keys: a plant, its checks, a design, its responses and its gains", async ({ page, context }) => {
  test.setTimeout(240_000);
  await context.grantPermissions(["clipboard-read", "clipboard-write"]);
  await page.goto("/plants");
  await untilTakenOver(page);
  await untilSettled(page);
  await page.keyboard.press("Tab");
  await expect(page.getByRole("link", { name: "Skip to the content" })).toBeFocused();
  await page.keyboard.press("Enter");
  await tabTo(page, page.getByRole("link", { name: "Enter a plant" }));
  await page.keyboard.press("Enter");
  await tabTo(page, page.getByLabel("Name of the plant"));
  await page.keyboard.type("Beam by keys");
  await tabTo(page, cellOf(page, "A", 1, 1));
  await page.keyboard.press("ArrowDown");
  await page.keyboard.press("ArrowDown");
  await onClipboard(page, "-40\t12\t-0.4\t0\n12\t-40\t0\t-0.4");
  await page.keyboard.press("Control+v");
  await tabTo(page, page.getByRole("button", { name: "Check this plant" }));
  await page.keyboard.press("Enter");
  await expect(page.getByText("Every mode can be steered.")).toBeVisible();
  await tabTo(page, page.getByRole("button", { name: "Save plant" }), "Shift+Tab");
  await page.keyboard.press("Enter");
  await expect(page.getByRole("heading", { level: 1, name: "Beam by keys" })).toBeVisible();
  await untilSettled(page);
  await tabTo(page, page.getByRole("link", { name: "New design" }).first());
  await page.keyboard.press("Enter");
  await expect(page.getByRole("heading", { level: 1, name: "New design" })).toBeVisible();
  await untilTakenOver(page);
  await page.keyboard.press("Control+Enter");
  const responses = page.getByRole("region", { name: "Coupled response" });
  await expect(responses.getByRole("img").first()).toBeVisible({ timeout: 30_000 });
  await tabTo(page, page.getByRole("button", { name: "Save design" }));
  await page.keyboard.press("Enter");
  const dialog = page.getByRole("dialog");
  await tabTo(page, dialog.getByRole("textbox").first());
  await page.keyboard.type("By keys");
  await page.keyboard.press("Enter");
  await expect(page.getByRole("heading", { level: 1, name: "By keys" })).toBeVisible({ timeout: 30_000 });
  await untilSettled(page);
  await tabTo(page, page.getByRole("link", { name: /CSV/ }).first());
  const [download] = await Promise.all([page.waitForEvent("download"), page.keyboard.press("Enter")]);
  expect(download.suggestedFilename()).toMatch(/\.csv$/);
});

test("a menu and a dialog keep the focus inside and give it back", async ({ page }) => {
  await page.goto("/team");
  await untilTakenOver(page);
  const menu = page.getByRole("button", { name: /account menu$/ });
  await menu.focus();
  await page.keyboard.press("ArrowDown");
  await expect(page.getByRole("menuitem", { name: "Account" })).toBeFocused();
  await page.keyboard.press("End");
  await expect(page.getByRole("menuitem", { name: "Sign out" })).toBeFocused();
  await page.keyboard.press("ArrowDown");
  await expect(page.getByRole("menuitem", { name: "Account" })).toBeFocused();
  await page.keyboard.press("Escape");
  await expect(menu).toBeFocused();
  const rename = page.getByRole("button", { name: "Rename the team" });
  await rename.focus();
  await page.keyboard.press("Enter");
  const dialog = page.getByRole("dialog", { name: "Rename the team" });
  for (let stops = 0; stops < 8; stops++) {
    await page.keyboard.press("Tab");
    const inside = await dialog.evaluate(
      (element) => element.contains(document.activeElement) || document.activeElement === document.body,
    );
    expect(inside).toBe(true);
  }
  await page.keyboard.press("Escape");
  await expect(dialog).toBeHidden();
  await expect(rename).toBeFocused();
});
