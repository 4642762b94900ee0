import { expect, type Locator, type Page } from "@playwright/test";

/** A field at fault: focus went there, it says so to screen readers, and what to do is part of its description. */
export async function expectRefused(field: Locator, words: RegExp): Promise<void> {
  await expect(field).toBeFocused();
  await expect(field).toHaveAttribute("aria-invalid", "true");
  await expect(field).toHaveAccessibleDescription(words);
}

export const textbox = (page: Page | Locator, name: string | RegExp): Locator =>
  page.getByRole("textbox", { name, exact: typeof name === "string" });
