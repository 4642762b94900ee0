import { randomUUID } from "node:crypto";
import type { PlantRevision, PlantSummary } from "@/lib/schemas/plant";
import { ask, signUpAs, told } from "../helpers/browser-requests";
import { cellOf, entriesOf, onClipboard, openPlant, pasteAt } from "../helpers/matrix-page";
import { twoCarriages } from "../helpers/plant-content";
import { changeEntry, openTab, saveButton, saveRevision } from "../helpers/plant-page";
import { expect, storedPlant, test } from "../helpers/team-test";

test("a plant is entered from nothing by keys and paste, judged in words, and stored", async ({ page, team }) => {
  await openPlant(page, "/plants/new");
  await page.getByLabel("Name of the plant").focus();
  await page.keyboard.type("Beam with two drives");
  await page.keyboard.press("Tab");
  await page.keyboard.type("left, right");
  await page.keyboard.press("Enter");
  await page.getByRole("tab", { name: "Model" }).focus();
  await page.keyboard.press("End");
  await page.getByRole("button", { name: "Add parameter" }).press("Enter");
  await page.getByLabel("Name of parameter 1").fill("m");
  await page.getByLabel("Value or expression of parameter 1").fill("12");
  await page.getByLabel("Unit of parameter 1").fill("kg");
  await page.getByRole("button", { name: "Add parameter" }).press("Enter");
  await page.getByLabel("Name of parameter 2").fill("k");
  await page.getByLabel("Value or expression of parameter 2").fill("m*(2*pi*3)^2");
  await page.getByLabel("Unit of parameter 2").fill("N/m");
  await expect(page.getByRole("row", { name: /parameter 2|4264/ }).last()).toContainText("4264 N/m");
  await page.getByRole("tab", { name: /^Parameters/ }).focus();
  await page.keyboard.press("Home");
  await cellOf(page, "A", 1, 1).focus();
  await onClipboard(page, "0\t0\t1\t0\n0\t0\t0\t1\n-k/m\tk/m\t-0.4\t0\nk/m\t-k/m\t0\t-0.4");
  await page.keyboard.press("Control+v");
  await pasteAt(page, cellOf(page, "B", 3, 1), "1/m\t0\n0\t1/m");
  await expect(cellOf(page, "A", 3, 1)).toHaveText("−355.3");
  await page.getByRole("button", { name: "Check this plant" }).press("Enter");
  const checks = page.getByRole("region", { name: "Checks" });
  await expect(checks.getByText("Every mode can be steered.")).toBeVisible();
  await expect(checks).toContainText("On the stability boundary without feedback.");
  await expect(checks).toContainText(/oscillation at 4\.24 Hz, mostly x1, x2 and v1/);
  await expect(checks.getByRole("table", { name: "Modes of the plant" })).toContainText("−0.2 ± 26.66 i");
  await page.getByRole("button", { name: "Save plant" }).press("Enter");
  await expect(page.getByRole("heading", { level: 1, name: "Beam with two drives" })).toBeVisible();
  await expect(page).toHaveURL(/\/plants\/[0-9a-f-]{36}$/);
  const { items } = await told<{ items: PlantSummary[] }>(team.lead.request, "/api/v1/plants");
  expect(items).toHaveLength(1);
  expect(items[0]).toMatchObject({ name: "Beam with two drives", order: 4, inputCount: 2, outputCount: 2 });
  await page.getByRole("link", { name: "Plants" }).first().click();
  await expect(page.getByRole("table", { name: "Plants of the team" })).toContainText("Beam with two drives");
});

test("what is wrong is said at its cell or field while it is typed, and keeps the plant from being saved", async ({ page }) => {
  await openPlant(page, "/plants/new");
  const save = page.getByRole("button", { name: "Save plant" });
  await expect(save).toBeEnabled();
  for (const [entry, words] of [
    ["-q/m", /"q" is not a parameter of this plant\. Correct the name, or add it to the parameters/],
    ["1/0", /gives no finite number/],
    ["2 x1", /Two factors stand side by side without a sign/],
    ["(1", /A parenthesis is open on one side/],
    ["1e999", /finite|too large/i],
  ] as const) {
    await changeEntry(page, 3, 1, entry);
    await expect(cellOf(page, "A", 3, 1), entry).toHaveAttribute("aria-invalid", "true");
    await expect(page.getByRole("figure").filter({ hasText: "A · how" }), entry).toContainText(words);
    await expect(page.getByText("One field needs a change before this can be saved."), entry).toBeVisible();
    await expect(save, entry).toBeDisabled();
  }
  await changeEntry(page, 3, 1, "-4");
  await expect(save).toBeEnabled();
  await openTab(page, /^Signals/);
  const fields = [
    ["Name of state 2", "x1", /"x1" already names state 1/],
    ["Name of input 1", "", /Name this input/],
    ["Unit of output 2", "", /y2 needs a unit; write 1 for a pure number/],
  ] as const;
  for (const [label, value, words] of fields) {
    const field = page.getByLabel(new RegExp(`^${label}`));
    const before = await field.inputValue();
    await field.fill(value);
    await expect(field).toHaveAttribute("aria-invalid", "true");
    await expect(field).toHaveAccessibleDescription(words);
    await expect(save).toBeDisabled();
    await page.getByLabel(new RegExp(`^${label}`)).fill(before);
    await expect(field).not.toHaveAttribute("aria-invalid");
  }
  await page.getByRole("button", { name: "Add state" }).click();
  await expect(page.getByLabel(/^Unit of state 5/)).toHaveAccessibleDescription(/needs a unit/);
  await page.getByLabel(/^Unit of state 5/).fill("m");
  await expect(save).toBeEnabled();
  await openTab(page, /^Model/);
  expect((await entriesOf(page, "A")).map((row) => row.length)).toEqual([5, 5, 5, 5, 5]);
});

test("a matrix of the wrong shape is refused by the service at its row", async ({ team }) => {
  const content = { ...twoCarriages(), A: [["0", "0", "1", "0"], ["0", "0"], ["0"], []], B: [["1", "2"]] };
  const reply = await ask(team.lead.request, "/api/v1/plants", { data: { name: "Bent", content, note: "" } });
  expect(reply.status()).toBe(422);
  const { errors } = await reply.json();
  expect(errors).toContainEqual({
    pointer: "/content/A/1",
    detail: expect.stringContaining("Row 2 of A needs 4 entries; it has 2"),
  });
  expect(errors).toContainEqual({ pointer: "/content/B", detail: expect.stringContaining("B needs 4 rows; it has 1") });
});

test("an input that moves nothing and an output that reads nothing are pointed out and can still be saved", async ({ page }) => {
  await openPlant(page, "/plants/new");
  await page.getByLabel("Name of the plant").fill("Half wired");
  await pasteAt(page, cellOf(page, "B", 4, 2), "0");
  await expect(page.getByText("Input F2 moves nothing: its whole column is zero").first()).toBeVisible();
  await page.getByRole("button", { name: "Save plant" }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Half wired" })).toBeVisible();
  await expect(page.getByRole("region", { name: "Checks" })).toContainText(/cannot be steered|no input/i);
});

test.describe("a plant without a name", () => {
  test.use({ expectedProblems: [/status of 422/] });

  test("is asked for it at its field, with everything else kept", async ({ page }) => {
    await openPlant(page, "/plants/new");
    await changeEntry(page, 3, 1, "-4");
    await page.getByRole("button", { name: "Save plant" }).click();
    const name = page.getByLabel("Name of the plant");
    await expect(name).toBeFocused();
    await expect(name).toHaveAttribute("aria-invalid", "true");
    await expect(name).toHaveAccessibleDescription(/Write a name here/);
    await expect(cellOf(page, "A", 3, 1)).toHaveText("−4");
  });
});

test("a change becomes a revision with its note, and the history says what differs", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  await openPlant(page, `/plants/${plant.id}`);
  await expect(saveButton(page, 2)).toBeDisabled();
  await changeEntry(page, 3, 3, "-0.6");
  await expect(page.getByText("Revision 1 · unsaved changes")).toBeVisible();
  await saveRevision(page, 2, "more damping on the left");
  await expect(page.getByText("Revision 2", { exact: true })).toBeVisible();
  await expect(saveButton(page, 3)).toBeDisabled();
  await changeEntry(page, 4, 4, "-0.5");
  await saveRevision(page, 3);
  await openTab(page, /^History/);
  const revisions = page.getByRole("table", { name: "Revisions", exact: true });
  await expect(revisions.getByRole("row", { name: /more damping on the left Lena Thorsen/ })).toBeVisible();
  await page.getByLabel("From revision").selectOption({ label: "1" });
  const differences = page.getByRole("table", { name: "What differs between revisions 1 and 3" });
  await expect(differences.getByRole("row")).toHaveCount(3);
  await expect(differences).toContainText(/A, row v1, column v1\s*-0\.4\s*-0\.6/);
  await expect(differences).toContainText(/A, row v2, column v2\s*-0\.4\s*-0\.5/);
  const address = page.url();
  await page.goto(address);
  await expect(differences.getByRole("row")).toHaveCount(3);
});

test("the same save after a rename is no conflict", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  await openPlant(page, `/plants/${plant.id}`);
  await page.getByRole("button", { name: /^More for/ }).click();
  await page.getByRole("menuitem", { name: "Rename…" }).click();
  const dialog = page.getByRole("dialog", { name: "Rename Two carriages" });
  await dialog.getByLabel("Name of the plant").fill("Renamed carriages");
  await dialog.getByRole("button", { name: "Rename" }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Renamed carriages" })).toBeVisible();
  await expect(page.getByText("unsaved changes")).toBeHidden();
  await expect(saveButton(page, 2)).toBeDisabled();
  await changeEntry(page, 3, 3, "-0.6");
  await saveRevision(page, 2);
});

test("a plant is duplicated, archived, and brought back from its message", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  await openPlant(page, `/plants/${plant.id}`);
  const more = page.getByRole("button", { name: /^More for/ });
  await more.click();
  await page.getByRole("menuitem", { name: "Duplicate…" }).click();
  await page.getByRole("dialog").getByRole("button", { name: "Duplicate" }).click();
  await expect(page.getByRole("heading", { level: 1, name: "Two carriages (copy)" })).toBeVisible();
  await expect(page.getByRole("dialog")).toBeHidden();
  expect(page.url()).not.toContain(plant.id);
  await more.click();
  await page.getByRole("menuitem", { name: "Archive" }).click();
  await expect(page.getByText("Two carriages (copy) is archived.")).toBeVisible();
  await expect(page.getByText("archived", { exact: true })).toBeVisible();
  await expect(page.getByRole("button", { name: /^Save revision/ })).toBeHidden();
  await page.getByRole("button", { name: "Undo", exact: true }).click();
  await expect(page.getByText("Two carriages (copy) is back in use.")).toBeVisible();
  await expect(saveButton(page, 2)).toBeVisible();
  await changeEntry(page, 3, 3, "-0.6");
  await saveRevision(page, 2);
  await more.click();
  await page.getByRole("menuitem", { name: "Archive" }).click();
  await expect(page.getByText("archived", { exact: true })).toBeVisible();
  await page.goto("/plants");
  const plants = page.getByRole("table", { name: "Plants of the team" });
  await expect(plants.getByRole("link")).toHaveText(["Two carriages"]);
  await page.getByLabel("Show").selectOption("archived");
  await expect(plants.getByRole("link")).toHaveText(["Two carriages (copy)"]);
  await expect(page).toHaveURL(/archived=yes/);
});

test.describe("another team's plant", () => {
  test.use({ expectedProblems: [/status of 404/] });

  test("is answered to a stranger exactly like one that never was", async ({ page, team, anotherPerson }) => {
    const plant = await storedPlant(team.lead.request, { name: "Kept secret" });
    await page.goto(`/plants/${plant.id}`);
    await expect(page.getByRole("heading", { level: 1, name: "Kept secret" })).toBeVisible();
    const stranger = await anotherPerson();
    await signUpAs(stranger.request, "Some Stranger");
    const seen = async (id: string) => {
      const reply = await stranger.goto(`/plants/${id}`);
      await expect(stranger.getByRole("heading", { level: 1, name: "Nothing is kept at this address" })).toBeVisible();
      return { status: reply?.status(), title: await stranger.title(), text: await stranger.locator("body").ariaSnapshot() };
    };
    const theirs = await seen(plant.id);
    expect(theirs.status).toBe(404);
    expect(theirs).toEqual(await seen(randomUUID()));
    expect(theirs).toEqual(await seen("no-plant-at-all"));
    const answer = async (id: string) => {
      const reply = await ask(stranger.request, `/api/v1/plants/${id}`);
      const { requestId: _, instance: __, ...body } = await reply.json();
      return { status: reply.status(), body };
    };
    expect(await answer(plant.id)).toEqual(await answer(randomUUID()));
  });
});

test("every figure of a revision that was stored is the page's own evaluation, bit for bit", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  const path = `/api/v1/plants/${plant.id}/revisions/${plant.currentRevision.id}`;
  const { model } = await told<PlantRevision>(team.lead.request, path);
  await openPlant(page, `/plants/${plant.id}`);
  for (const [row, column] of [
    [3, 1],
    [3, 2],
    [4, 2],
  ] as const) {
    await expect(cellOf(page, "A", row, column)).toHaveAttribute("title", String(model.A[row - 1][column - 1]));
  }
});
