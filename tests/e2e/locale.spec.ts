import type { PlantRevision, PlantSummary } from "@/lib/schemas/plant";
import { told } from "../helpers/browser-requests";
import { cellOf, entriesOf, openPlant, pasteAt } from "../helpers/matrix-page";
import { changeEntry } from "../helpers/plant-page";
import { expect, storedDesign, storedPlant, test } from "../helpers/team-test";

/** The same four numbers as each language's spreadsheet puts them on the clipboard, and as its keyboard types them. */
const LANGUAGES = [
  { locale: "en-US", pasted: "-12.5\t1e-3\n1,234.5\t0.25", typed: "-0.75", deviation: "0.002" },
  { locale: "de-DE", pasted: "-12,5\t1e-3\n1.234,5\t0,25", typed: "-0,75", deviation: "0,002" },
  { locale: "fr-FR", pasted: "\u221212,5\t1e-3\n1\u202f234,5\t0,25", typed: "-0,75", deviation: "0,002" },
] as const;

test("the same plant is stored byte for byte whatever language the browser speaks", async ({ team, anotherPerson }) => {
  test.setTimeout(150_000);
  const stored: string[] = [];
  for (const { locale, pasted, typed, deviation } of LANGUAGES) {
    await test.step(locale, async () => {
      const page = await anotherPerson({ locale });
      await page.context().addCookies((await team.lead.request.storageState()).cookies);
      await openPlant(page, "/plants/new");
      expect(await page.evaluate(() => navigator.language)).toBe(locale);
      await page.getByLabel("Name of the plant").fill("The same everywhere");
      await pasteAt(page, cellOf(page, "A", 3, 1), pasted);
      await changeEntry(page, 3, 3, typed);
      expect((await entriesOf(page, "A"))[2]).toEqual(["-12.5", "1e-3", "-0.75", "0"]);
      await page.getByRole("tab", { name: /^Signals/ }).click();
      await page.getByRole("textbox", { name: /^Largest acceptable deviation of state 1/ }).fill(deviation);
      await page.getByRole("button", { name: "Save plant" }).click();
      await expect(page.getByRole("heading", { level: 1, name: "The same everywhere" })).toBeVisible();
      await page.getByRole("tab", { name: /^Signals/ }).click();
      await expect(page.getByRole("textbox", { name: /^Largest acceptable deviation of state 1/ })).toHaveValue("0.002");
    });
  }
  const { items } = await told<{ items: PlantSummary[] }>(team.lead.request, "/api/v1/plants");
  expect(items).toHaveLength(LANGUAGES.length);
  for (const { id, currentRevision } of items) {
    const path = `/api/v1/plants/${id}/revisions/${currentRevision.id}`;
    const { content, model } = await told<PlantRevision>(team.lead.request, path);
    expect(content.A[2]).toEqual(["-12.5", "1e-3", "-0.75", "0"]);
    expect(model.A[3]).toEqual([1234.5, 0.25, 0, 0]);
    stored.push(JSON.stringify({ content, model }));
  }
  expect(new Set(stored).size).toBe(1);
});

test("files of gains are the same bytes in every language", async ({ team, anotherPerson }) => {
  const plant = await storedPlant(team.lead.request);
  const { currentRevision } = await storedDesign(team.lead.request, plant);
  const files = new Set<string>();
  for (const { locale } of LANGUAGES) {
    const page = await anotherPerson({ locale });
    await page.context().addCookies((await team.lead.request.storageState()).cookies);
    for (const format of ["csv", "json"]) {
      const reply = await page.request.get(`/api/v1/design-revisions/${currentRevision.id}/gains?format=${format}`, {
        headers: { "accept-language": locale },
      });
      expect(reply.status()).toBe(200);
      files.add(`${format} ${(await reply.body()).toString("base64")}`);
    }
  }
  expect(files.size).toBe(2);
});

test("1,234 is asked about, in a field and in a cell, and the answer is what is stored", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  await openPlant(page, `/plants/${plant.id}`);
  await changeEntry(page, 3, 3, "1,234");
  const cell = cellOf(page, "A", 3, 3);
  await expect(cell).toHaveAttribute("aria-invalid", "true");
  await expect(page.getByRole("figure").filter({ hasText: "A · how" })).toContainText(
    "“1,234” may be 1.234 or 1234. Write the one you mean.",
  );
  await expect(page.getByRole("button", { name: "Save revision 2" })).toBeDisabled();
  await changeEntry(page, 3, 3, "-1.234");
  await expect(cell).not.toHaveAttribute("aria-invalid");
  await page.getByRole("tab", { name: /^Signals/ }).click();
  const field = page.getByRole("textbox", { name: /^Upper limit of input 1/ });
  await field.fill("1,234");
  await expect(field).toHaveAttribute("aria-invalid", "true");
  await expect(field).toHaveAccessibleDescription(/Is 1,234 meant as/);
  await page.getByRole("button", { name: "1234", exact: true }).click();
  await expect(field).toHaveValue("1234");
  await field.fill("1,234");
  await page.getByRole("button", { name: "1.234", exact: true }).click();
  await expect(field).toHaveValue("1.234");
  await expect(field).not.toHaveAttribute("aria-invalid");
});
