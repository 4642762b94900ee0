import { expect, type Locator, type Page } from "@playwright/test";
import { cellOf } from "./matrix-page";

export async function openTab(page: Page, name: RegExp): Promise<void> {
  await page.getByRole("tab", { name }).click();
}

/** Changes one entry of A by keys. */
export async function changeEntry(page: Page, row: number, column: number, entry: string): Promise<void> {
  await cellOf(page, "A", row, column).click();
  await page.keyboard.type(entry);
  await page.keyboard.press("Enter");
}

export const saveButton = (page: Page, revision: number): Locator =>
  page.getByRole("button", { name: `Save revision ${revision}`, exact: true });

/** Asks to save and sends, whatever comes of it. */
export async function sendRevision(page: Page, revision: number, note = ""): Promise<void> {
  await saveButton(page, revision).click();
  const dialog = page.getByRole("dialog", { name: new RegExp(`^Save revision ${revision}`) });
  if (note) await dialog.getByLabel(/^What changed and why/).fill(note);
  await dialog.getByRole("button", { name: "Save", exact: true }).click();
}

export async function saveRevision(page: Page, revision: number, note = ""): Promise<void> {
  await sendRevision(page, revision, note);
  await expect(page.getByText(`Revision ${revision} is saved.`)).toBeVisible();
}

/** Once the changes are in the browser's own storage; the limit is what a reader is promised. */
export async function untilKept(page: Page, text: string): Promise<void> {
  const kept = () => page.evaluate((wanted) => Object.values(localStorage).some((value) => String(value).includes(wanted)), text);
  await expect.poll(kept, { timeout: 2_000, intervals: [100] }).toBe(true);
}

/** Leaves with unsaved work: the browser asks first, and the work is back afterwards. */
export async function reloadUnsaved(page: Page): Promise<void> {
  const asked: string[] = [];
  page.once("dialog", (dialog) => {
    asked.push(dialog.type());
    void dialog.accept();
  });
  await page.reload();
  expect(asked).toEqual(["beforeunload"]);
  await expect(page.getByText("Your unsaved changes are back.")).toBeVisible();
}
