import type { APIRequestContext, Page } from "@playwright/test";
import type { DesignRevisionEntry, DesignSummary } from "@/lib/schemas/design";
import type { Draft } from "@/lib/schemas/draft";
import { inBothThemes } from "../helpers/axe-page";
import { told } from "../helpers/browser-requests";
import {
  designPath,
  figure,
  newestRevision,
  openDesign,
  press,
  reloadKept,
  sendDesignRevision,
  storedDesign,
  untilDraftSaved,
  untilSolved,
} from "../helpers/design-page";
import { expect, storedPlant, test } from "../helpers/team-test";

const DEVIATION = "Largest deviation of x1, m";
const EFFORT = "Accepted effort of F2, N";
const BACK = "Your unsaved changes are back.";
const NO_CONNECTION = "No connection: kept in this browser.";

const draftOf = async (request: APIRequestContext, plantId: string, subjectId: string) =>
  (await told<{ draft: Draft | null }>(request, `/api/v1/plants/${plantId}/drafts/${subjectId}`)).draft;

/** The limit is what a reader is promised: two seconds after the last key. */
async function untilOnServer(request: APIRequestContext, { plantId, id }: DesignSummary, text: string): Promise<void> {
  const kept = async () => JSON.stringify(await draftOf(request, plantId, id));
  await expect.poll(kept, { timeout: 2_000, intervals: [100] }).toContain(text);
}
const untilNoDraft = (request: APIRequestContext, plantId: string, subjectId: string) =>
  expect.poll(() => draftOf(request, plantId, subjectId), { timeout: 10_000 }).toBeNull();

const revisionsOf = async (request: APIRequestContext, designId: string) =>
  (await told<{ items: DesignRevisionEntry[] }>(request, `/api/v1/designs/${designId}/revisions`)).items.length;

async function setUp(request: APIRequestContext) {
  const plant = await storedPlant(request);
  return { plant, design: await storedDesign(request, plant) };
}

test.describe("a tab that is killed in the middle of an edit", () => {
  // A page that does not know of the other browser's draft is refused once, and asks.
  test.use({ expectedProblems: [/status of 412/] });

  test("loses nothing, neither in the same browser nor in another one, and no draft is written over", async ({
    page,
    context,
    team,
    anotherPerson,
  }) => {
    test.setTimeout(120_000);
    const { request } = team.lead;
    const { plant, design } = await setUp(request);
    await openDesign(page, designPath(design));
    await figure(page, DEVIATION).fill("0.00077");
    await untilDraftSaved(page);
    await untilOnServer(request, design, "0.00077");
    await page.close();

    const again = await context.newPage();
    await openDesign(again, designPath(design));
    await expect(figure(again, DEVIATION)).toHaveValue("0.00077");
    await expect(again.getByText(BACK)).toBeVisible();
    await press(again, "Go on with them");

    const elsewhere = await anotherPerson();
    await elsewhere.context().addCookies(await context.cookies());
    await openDesign(elsewhere, designPath(design));
    await expect(figure(elsewhere, DEVIATION)).toHaveValue("0.00077");
    await expect(elsewhere.getByText(/They were kept as your draft on/)).toBeVisible();
    await press(elsewhere, "Go on with them");
    await figure(elsewhere, EFFORT).fill("58.5");
    await untilOnServer(request, design, "58.5");

    // The first browser's page goes on with what it has; it is told, and both stay until somebody chooses.
    await figure(again, EFFORT).fill("61.5");
    await expect(again.getByText("You have another draft of this design.")).toBeVisible({ timeout: 10_000 });
    await expect(again.getByText("Draft not saved, kept in this browser")).toBeVisible();
    await untilOnServer(request, design, "58.5");
    await inBothThemes(again, "two drafts");
    await press(again, "Show that one");
    await expect(figure(again, EFFORT)).toHaveValue("58.5");
    await expect(figure(again, DEVIATION)).toHaveValue("0.00077");
    await press(again, "Undo");
    await expect(figure(again, EFFORT)).toHaveValue("61.5");
    await untilOnServer(request, design, "61.5");

    await press(again, "Discard them");
    await expect(figure(again, DEVIATION)).toHaveValue("0.001");
    await untilNoDraft(request, plant.id, design.id);
    await again.reload();
    await expect(figure(again, DEVIATION)).toHaveValue("0.001");
    await expect(again.getByText(BACK)).toBeHidden();
  });
});

test("a draft of a new design is back in another browser and gone once it is saved", async ({
  page,
  context,
  team,
  anotherPerson,
}) => {
  const { request } = team.lead;
  const plant = await storedPlant(request);
  const path = `/plants/${plant.id}/designs/new`;
  await openDesign(page, path);
  await figure(page, DEVIATION).fill("0.0033");
  await untilDraftSaved(page);
  await page.close();
  const elsewhere = await anotherPerson();
  await elsewhere.context().addCookies(await context.cookies());
  await openDesign(elsewhere, path);
  await expect(figure(elsewhere, DEVIATION)).toHaveValue("0.0033");
  await press(elsewhere, "Go on with them");
  await press(elsewhere, "Save design");
  const dialog = elsewhere.getByRole("dialog", { name: "Save the design" });
  await dialog.getByLabel("Name of the design").fill("From elsewhere");
  await press(dialog, "Save");
  await expect(elsewhere.getByRole("heading", { level: 1, name: "From elsewhere" })).toBeVisible({ timeout: 20_000 });
  await untilNoDraft(request, plant.id, plant.id);

  // The copy in the first browser was the same draft: it went with it.
  const again = await context.newPage();
  await openDesign(again, path);
  await expect(figure(again, DEVIATION)).toHaveValue("0.001");
  await expect(again.getByText(BACK)).toBeHidden();
});

test.describe("without a connection", () => {
  test.use({ expectedProblems: [/ERR_INTERNET_DISCONNECTED/] });

  test("work goes on, is kept, and a save that waits is made once when the connection is back", async ({
    page,
    context,
    team,
  }) => {
    test.setTimeout(120_000);
    const { request } = team.lead;
    const { plant, design } = await setUp(request);
    await openDesign(page, designPath(design));
    await figure(page, DEVIATION).fill("0.0021");
    await untilSolved(page);
    await untilDraftSaved(page);

    await context.setOffline(true);
    await figure(page, EFFORT).fill("47.5");
    await expect(page.getByText(NO_CONNECTION)).toBeVisible({ timeout: 10_000 });
    await expect(page.getByText("Draft not saved, kept in this browser")).toBeVisible();
    await untilSolved(page);
    await inBothThemes(page, "no connection");
    await context.setOffline(false);
    await untilOnServer(request, design, "47.5");
    await expect(page.getByText(NO_CONNECTION)).toBeHidden();

    await context.setOffline(true);
    await figure(page, EFFORT).fill("48.5");
    await sendDesignRevision(page, 2, "made on the train");
    const dialog = page.getByRole("dialog", { name: "Save revision 2" });
    await expect(dialog.getByText("No connection: this waits.")).toBeVisible();
    expect(await revisionsOf(request, design.id)).toBe(1);
    await context.setOffline(false);
    await expect(page.getByText("Revision 2 is saved.")).toBeVisible({ timeout: 40_000 });
    await expect(page.getByText(NO_CONNECTION)).toBeHidden();
    expect(await revisionsOf(request, design.id)).toBe(2);
    expect(await newestRevision(request, design.id)).toMatchObject({
      number: 2,
      note: "made on the train",
      recipe: { weights: { states: [0.0021, expect.anything(), expect.anything(), expect.anything()], inputs: [40, 48.5] } },
    });
    await untilNoDraft(request, plant.id, design.id);
  });

  test("a new design that waits is made once, and a save that is given up is not made", async ({ page, context, team }) => {
    const { request } = team.lead;
    const plant = await storedPlant(request);
    await openDesign(page, `/plants/${plant.id}/designs/new`);
    await untilSolved(page);
    await context.setOffline(true);
    const dialog = page.getByRole("dialog", { name: "Save the design" });
    const send = async (name: string) => {
      await press(page, "Save design");
      await dialog.getByLabel("Name of the design").fill(name);
      await press(dialog, "Save");
      await expect(dialog.getByText("No connection: this waits.")).toBeVisible();
    };
    await send("Given up");
    await press(dialog, "Go on editing");
    await send("Once");
    await context.setOffline(false);
    await expect(page.getByRole("heading", { level: 1, name: "Once", exact: true })).toBeVisible({ timeout: 40_000 });
    const { items } = await told<{ items: DesignSummary[] }>(request, `/api/v1/plants/${plant.id}/designs`);
    expect(items.map(({ name }) => name)).toEqual(["Once"]);
  });

  test("leaving asks only while the work is kept nowhere", async ({ page, context, team }) => {
    const { design } = await setUp(team.lead.request);
    await context.addInitScript(() => {
      const keep = Storage.prototype.setItem;
      Storage.prototype.setItem = function (this: Storage, key: string, value: string) {
        if (key.startsWith("gainwright:design:")) throw new DOMException("full", "QuotaExceededError");
        keep.call(this, key, value);
      };
    });
    await openDesign(page, designPath(design));
    await figure(page, DEVIATION).click(); // a page that nobody touched may not ask
    await context.setOffline(true);
    await figure(page, DEVIATION).fill("0.0019");
    await expect(page.getByText("Draft not saved: this browser keeps nothing either")).toBeVisible({ timeout: 10_000 });
    await expect(page.getByText("No connection, and this browser stores nothing.")).toBeVisible();
    const asked: string[] = [];
    page.on("dialog", (dialog) => {
      asked.push(dialog.type());
      void dialog.dismiss();
    });
    await page.close({ runBeforeUnload: true });
    await expect.poll(() => asked).toEqual(["beforeunload"]);
    await context.setOffline(false);
    await untilOnServer(team.lead.request, design, "0.0019");
    await expect(page.getByText("Draft saved", { exact: true })).toBeVisible();
    await reloadKept(page);
    await expect(figure(page, DEVIATION)).toHaveValue("0.0019");
  });
});

test.describe("an answer that is lost on its way", () => {
  test.use({ expectedProblems: [/status of 412|ERR_FAILED/] });

  test("leaves one revision, and nobody is asked about a conflict with themselves", async ({ page, team }) => {
    const { request } = team.lead;
    const { design } = await setUp(request);
    await openDesign(page, designPath(design));
    await figure(page, DEVIATION).fill("0.0017");
    const lost: number[] = [];
    await page.route(/\/api\/v1\/designs\/[^/]+\/revisions$/, async (route) => {
      if (route.request().method() !== "POST" || lost.length > 0) return route.continue();
      lost.push((await route.fetch()).status());
      await route.abort();
    });
    await sendDesignRevision(page, 2);
    await expect(page.getByText("Revision 2 is saved.")).toBeVisible({ timeout: 30_000 });
    expect(lost).toEqual([201]);
    expect(await revisionsOf(request, design.id)).toBe(2);
    await expect(page.getByRole("button", { name: "Save revision 3" })).toBeDisabled();
  });
});

test.describe("the keys of the bench", () => {
  /** Off every control. */
  const leave = (page: Page) => page.getByRole("heading", { level: 1 }).click();

  /** Keys that were left to the browser. */
  async function untakenKeys(page: Page): Promise<() => Promise<string[]>> {
    const keys = await page.evaluateHandle(() => {
      const left: string[] = [];
      const note = (event: KeyboardEvent) => setTimeout(() => event.defaultPrevented || left.push(event.key));
      window.addEventListener("keydown", note, { capture: true });
      return left;
    });
    return () => keys.jsonValue();
  }

  test("are shown by ?, which is a question mark inside a text field and can be switched off", async ({ page, team }) => {
    const { design } = await setUp(team.lead.request);
    await openDesign(page, designPath(design));
    const map = page.getByRole("dialog", { name: "Keyboard map" });
    await leave(page);
    await page.keyboard.press("?");
    await expect(map).toContainText("Ctrl+Enter");
    await expect(map.getByRole("region", { name: "On a pole in the plane" })).toContainText("Ten times as far");
    await inBothThemes(page, "keyboard map");
    await page.keyboard.press("Escape");
    await expect(map).toBeHidden();

    const reason = page.getByLabel("Reason for the state weights");
    await reason.fill("");
    await reason.pressSequentially("Why?");
    await expect(reason).toHaveValue("Why?");
    const deviation = figure(page, DEVIATION);
    await deviation.press("End");
    await deviation.press("?");
    await expect(deviation).toHaveValue("0.001?");
    await deviation.press("Backspace");
    // Right after the field can be read again.
    await page.keyboard.press("Control+s");
    await expect(page.getByRole("dialog", { name: "Save revision 2" })).toBeVisible();
    await page.keyboard.press("Escape");
    await expect(map).toBeHidden();

    await press(page, "Keys");
    await map.getByLabel("Open this map with the key ?").uncheck();
    await page.keyboard.press("Escape");
    await leave(page);
    await page.keyboard.press("?");
    await expect(map).toBeHidden();
    await reloadKept(page);
    await leave(page);
    await page.keyboard.press("?");
    await expect(map).toBeHidden();
  });

  test("undo, redo and save from anywhere on the page", async ({ page, team }) => {
    const { design } = await setUp(team.lead.request);
    await openDesign(page, designPath(design));
    for (const value of ["0.002", "0.003"]) {
      await figure(page, DEVIATION).fill(value);
      await figure(page, EFFORT).fill(value === "0.002" ? "50" : "60");
    }
    const shown = async () => [await figure(page, DEVIATION).inputValue(), await figure(page, EFFORT).inputValue()];
    await leave(page);
    for (const expected of [
      ["0.003", "50"],
      ["0.002", "50"],
      ["0.002", "40"],
      ["0.001", "40"],
    ]) {
      await page.keyboard.press("Control+z");
      await expect.poll(shown).toEqual(expected);
    }
    await expect(page.getByRole("button", { name: "Undo", exact: true })).toBeDisabled();
    await page.keyboard.press("Control+Shift+z");
    await page.keyboard.press("Control+y");
    await expect.poll(shown).toEqual(["0.002", "50"]);
    const untaken = await untakenKeys(page);
    await page.keyboard.press("Control+s");
    await expect(page.getByRole("dialog", { name: "Save revision 2" })).toBeVisible();
    await page.keyboard.press("Control+s");
    await page.keyboard.press("Escape");
    await expect(page.getByRole("dialog")).toBeHidden();
    expect(await untaken()).not.toContain("s");
  });
});
