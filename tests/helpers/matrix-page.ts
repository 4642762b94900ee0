import { expect, type Locator, type Page } from "@playwright/test";

export type MatrixName = "A" | "B" | "C" | "D" | "E" | "H" | "J";

export const gridOf = (page: Page, name: MatrixName): Locator => page.getByRole("grid", { name: new RegExp(`^${name} · `) });

/** Counted from one, as the page itself counts. */
export const cellOf = (page: Page, name: MatrixName, row: number, column: number): Locator =>
  gridOf(page, name).locator(`[data-r="${row - 1}"][data-c="${column - 1}"]`);

/** What the cell under the focus is called. */
export const heldCell = (page: Page): Promise<string | null> =>
  page.evaluate(() => document.activeElement?.getAttribute("aria-label") ?? null);

/** Entries as typed, from the names that screen readers get. */
export function entriesOf(page: Page, name: MatrixName): Promise<string[][]> {
  return gridOf(page, name)
    .locator("tbody tr")
    .evaluateAll((rows) =>
      rows.map((row) =>
        [...row.querySelectorAll("td")].map((cell) => {
          const [, said = ""] = /^[^:]*: (.*)$/s.exec(cell.getAttribute("aria-label") ?? "") ?? [];
          return said.includes(", written ") ? said.slice(said.indexOf(", written ") + 10) : said;
        }),
      ),
    );
}

/** Puts text on the clipboard as another program does. */
export async function onClipboard(page: Page, text: string): Promise<void> {
  await page.context().grantPermissions(["clipboard-read", "clipboard-write"]);
  await page.evaluate((content) => navigator.clipboard.writeText(content), text);
}

export async function pasteAt(page: Page, cell: Locator, text: string): Promise<void> {
  await cell.click();
  await onClipboard(page, text);
  await page.keyboard.press("Control+v");
}

/** Until then a click may find no one listening: React marks the elements it has taken over. */
export async function untilTakenOver(page: Page): Promise<void> {
  await page.waitForFunction(
    () => {
      const main = document.querySelector("main");
      const part = main?.querySelector("button, input, [role=grid], a") ?? main;
      return part !== null && Object.keys(part).some((key) => key.startsWith("__reactProps"));
    },
    undefined,
    { timeout: 30_000 },
  );
}

export async function openPlant(page: Page, path: string): Promise<void> {
  await page.goto(path);
  await expect(gridOf(page, "A")).toBeVisible();
  await untilTakenOver(page);
}
