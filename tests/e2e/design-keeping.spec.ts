import { randomUUID } from "node:crypto";
import { computeDesign } from "@/control/design/compute-design";
import type { PlantModel } from "@/control/plant/model";
import type { DesignSummary } from "@/lib/schemas/design";
import { PASSWORD, signInAs, signUpAs, told } from "../helpers/browser-requests";
import {
  designPath,
  figure,
  newestRevision,
  openDesign,
  part,
  press,
  reloadKept,
  saveAsDesign,
  saveDesignRevision,
  sendDesignRevision,
  shownMatrix,
  storedDesign,
  untilSolved,
} from "../helpers/design-page";
import { twoCarriages } from "../helpers/plant-content";
import { untilKept } from "../helpers/plant-page";
import { byWeights } from "../helpers/recipes";
import { expect, storedPlant, test } from "../helpers/team-test";

const DEVIATION = "Largest deviation of x1, m";
const EFFORT = "Accepted effort of F2, N";

/** What the newest revision accepts of x1 and of F2. */
async function accepted(request: Parameters<typeof newestRevision>[0], designId: string) {
  const { recipe } = await newestRevision(request, designId);
  if (recipe.method !== "weights" || recipe.weights.form !== "deviations") throw new Error("not a recipe of deviations");
  return [recipe.weights.states[0], recipe.weights.inputs[1]];
}

test("a design is saved with its reasons, is the same after a reload, and is revised with what changed", async ({
  page,
  team,
}) => {
  const plant = await storedPlant(team.lead.request);
  await openDesign(page, `/plants/${plant.id}/designs/new`);
  await press(page, "+ Reason for the state weights");
  await page.getByLabel("Reason for the state weights").fill("Half of the belt's backlash");
  await saveAsDesign(page, "Quiet beam");
  await expect(page).toHaveURL(/\/designs\/[0-9a-f-]{36}$/);
  const K = await shownMatrix(page, "K");
  await page.reload();
  await expect(page.getByLabel("Reason for the state weights")).toHaveValue("Half of the belt's backlash");
  await expect(page.getByText("as stored with revision 1")).toBeVisible();
  expect(await shownMatrix(page, "K")).toEqual(K);
  await expect(page.getByRole("button", { name: "Save revision 2" })).toBeDisabled();

  await figure(page, DEVIATION).fill("0.0005");
  await press(page, "Save revision 2");
  const dialog = page.getByRole("dialog", { name: "Save revision 2" });
  await expect(dialog.getByRole("table", { name: "Changed since revision 1" }).getByRole("row").nth(1)).toHaveText(
    /Largest deviation accepted.*x1.*0\.001 m.*5e−4 m/,
  );
  await dialog.getByLabel(/^Note for this revision/).fill("halved");
  await press(dialog, "Save revision 2");
  await expect(page.getByText("Revision 2 is saved.")).toBeVisible();
  const revisions = part(page, "Revisions").getByRole("listitem");
  await expect(revisions).toHaveCount(2);
  await expect(revisions.first()).toContainText(/Revision 2.*shown above · newest.*Lena Thorsen.*halved/);
  await revisions.last().getByRole("link", { name: "Revision 1" }).click();
  await expect(page.getByText("This is revision 1 of 2.")).toBeVisible();
  await expect(figure(page, DEVIATION)).toHaveValue("0.001");
  expect(await shownMatrix(page, "K")).toEqual(K);

  await figure(page, EFFORT).fill("44");
  await saveDesignRevision(page, 3);
  await expect(page).toHaveURL(/\/designs\/[0-9a-f-]{36}$/);
  await expect(page.getByText("as stored with revision 3")).toBeVisible();
  await expect(figure(page, EFFORT)).toHaveValue("44");
});

test("a design is renamed, duplicated, archived, and brought back from its message", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  const design = await storedDesign(team.lead.request, plant);
  await openDesign(page, designPath(design));
  const act = async (item: string) => {
    await page.getByRole("button", { name: "Design: rename, duplicate, archive" }).click();
    await page.getByRole("menuitem", { name: item }).click();
  };
  await act("Rename…");
  await page.getByRole("dialog").getByLabel("Name of the design").fill("Quiet beam");
  await press(page.getByRole("dialog"), "Rename");
  await expect(page.getByRole("heading", { level: 1, name: "Quiet beam", exact: true })).toBeVisible();
  await act("Duplicate…");
  await press(page.getByRole("dialog"), "Duplicate");
  await expect(page.getByRole("heading", { level: 1, name: "Quiet beam, copy" })).toBeVisible();
  expect(page.url()).not.toContain(design.id);
  await act("Archive");
  await expect(page.getByText("“Quiet beam, copy” is archived; it keeps everything.")).toBeVisible();
  await expect(page.getByRole("button", { name: /^Save revision/ })).toBeHidden();
  await press(page, "Undo");
  await expect(page.getByText("“Quiet beam, copy” is back in use.")).toBeVisible();
  await figure(page, DEVIATION).fill("0.002");
  await saveDesignRevision(page, 2);
  await act("Archive");
  await expect(page.getByText("archived", { exact: true })).toBeVisible();
  await page.goto(`/plants/${plant.id}?tab=designs`);
  const designs = page.getByRole("table", { name: /^Designs of this plant/ });
  await expect(designs.getByRole("rowheader")).toHaveText(["Quiet beam"]);
  await page.getByLabel("Show").selectOption("archived");
  await expect(designs.getByRole("rowheader")).toHaveText([/^Quiet beam, copy/]);
});

test("an unsaved recipe is back after a reload and can be let go", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  const design = await storedDesign(team.lead.request, plant);
  await openDesign(page, designPath(design));
  await figure(page, DEVIATION).fill("0.00077");
  await untilKept(page, "0.00077");
  await reloadKept(page);
  await expect(figure(page, DEVIATION)).toHaveValue("0.00077");
  await press(page, "Discard them");
  await expect(figure(page, DEVIATION)).toHaveValue("0.001");
  await page.reload();
  await expect(figure(page, DEVIATION)).toHaveValue("0.001");
  await expect(page.getByText("Your unsaved changes are back.")).toBeHidden();
});

test.describe("a session that ended during work", () => {
  test.use({ expectedProblems: [/status of 401/] });

  test("is renewed in place, and the design is made once", async ({ anotherPerson }) => {
    const page = await anotherPerson();
    const email = await signUpAs(page.request, "Nils Abendroth");
    const plant = await storedPlant(page.request);
    await openDesign(page, `/plants/${plant.id}/designs/new`);
    await figure(page, EFFORT).fill("33");
    const elsewhere = await anotherPerson();
    await signInAs(elsewhere.request, email);
    await told(elsewhere.request, "/api/v1/account/sessions", { method: "DELETE", data: { which: "others" } });
    const creates: number[] = [];
    page.on("response", (reply) => {
      if (reply.request().method() === "POST" && reply.url().endsWith("/designs")) creates.push(reply.status());
    });
    await press(page, "Save design");
    await page.getByRole("dialog").getByLabel("Name of the design").fill("Through the night");
    await press(page.getByRole("dialog", { name: "Save the design" }), "Save");
    const again = page.getByRole("dialog", { name: "Sign in again to go on" });
    await expect(again.getByLabel("E-mail address")).toHaveValue(email);
    await again.getByRole("textbox", { name: "Password" }).fill(PASSWORD);
    await press(again, "Sign in");
    await expect(page.getByRole("heading", { level: 1, name: "Through the night" })).toBeVisible({ timeout: 20_000 });
    expect(creates).toEqual([401, 201]);
    const { items } = await told<{ items: DesignSummary[] }>(elsewhere.request, `/api/v1/plants/${plant.id}/designs`);
    expect(items.map(({ name }) => name)).toEqual(["Through the night"]);
    expect(await accepted(elsewhere.request, items[0].id)).toEqual([0.001, 33]);
  });
});

test.describe("two people who revise one design", () => {
  test.use({ expectedProblems: [/status of 412/] });

  test("both keep what they did: the later one sees what differs and chooses", async ({ page, team, colleague }) => {
    test.setTimeout(180_000);
    const { request } = team.lead;
    const plant = await storedPlant(request);
    const design = await storedDesign(request, plant);
    const engineer = await colleague("engineer");
    const conflict = page.getByRole("dialog", { name: /was saved while you were editing$/ });
    await openDesign(engineer, designPath(design));

    await test.step("mine: saved on top of theirs, which stays a revision", async () => {
      await openDesign(page, designPath(design));
      await figure(engineer, DEVIATION).fill("0.002");
      await saveDesignRevision(engineer, 2, "calmer");
      await figure(page, EFFORT).fill("55");
      await sendDesignRevision(page, 2, "harder push");
      await expect(conflict).toContainText(/Emil Varga saved it on .*“calmer”/);
      const rows = conflict.getByRole("table", { name: "What differs" }).getByRole("row");
      await expect(rows.filter({ hasText: "x1" })).toHaveText(/0\.002 m.*0\.001 m/);
      await expect(rows.filter({ hasText: "F2" })).toHaveText(/40 N.*55 N/);
      await press(conflict, "Keep mine as revision 3");
      await expect(page.getByText("Yours is saved as revision 3.")).toBeVisible({ timeout: 20_000 });
      await expect(conflict).toBeHidden();
      expect(await accepted(request, design.id)).toEqual([0.001, 55]);
      await expect(part(page, "Revisions")).toContainText("calmer");
    });

    await test.step("theirs: the page shows what is stored and asks nothing more", async () => {
      await openDesign(engineer, designPath(design));
      await figure(engineer, DEVIATION).fill("0.003");
      await saveDesignRevision(engineer, 4);
      await figure(page, DEVIATION).fill("0.004");
      await sendDesignRevision(page, 4);
      await press(conflict, "Take theirs, drop mine");
      await expect(page.getByText("Revision 4 is shown. Yours was dropped.")).toBeVisible();
      await expect(figure(page, DEVIATION)).toHaveValue("0.003");
      await expect(page.getByRole("button", { name: "Save revision 5" })).toBeDisabled();
    });

    await test.step("copy: mine becomes a design of its own, theirs stays", async () => {
      await figure(engineer, EFFORT).fill("66");
      await saveDesignRevision(engineer, 5);
      await figure(page, EFFORT).fill("77");
      await sendDesignRevision(page, 5);
      await press(conflict, "Save mine as a copy");
      const dialog = page.getByRole("dialog", { name: "Save as a new design" });
      await dialog.getByLabel("Name of the design").fill("My own way");
      await press(dialog, "Save");
      await expect(page.getByRole("heading", { level: 1, name: "My own way" })).toBeVisible({ timeout: 20_000 });
      await expect(figure(page, EFFORT)).toHaveValue("77");
      expect(await accepted(request, design.id)).toEqual([0.003, 66]);
    });
  });
});

test("a newer plant revision outdates the design, whose recipe is carried over, solved at once and saved when asked", async ({
  page,
  team,
}) => {
  const { request } = team.lead;
  const plant = await storedPlant(request);
  const design = await storedDesign(request, plant);
  const content = twoCarriages();
  const [, x2, , v2] = content.states;
  // The states change places: each value must follow its signal by name.
  const heavier = {
    ...content,
    parameters: content.parameters.map((parameter) => (parameter.name === "m" ? { ...parameter, expression: "20" } : parameter)),
    states: [content.states[2], x2, content.states[0], v2],
    A: [
      ["-0.4", "k/m", "-k/m", "0"],
      ["0", "0", "0", "1"],
      ["1", "0", "0", "0"],
      ["0", "-k/m", "k/m", "-0.4"],
    ],
    B: [
      ["1/m", "0"],
      ["0", "0"],
      ["0", "0"],
      ["0", "1/m"],
    ],
    C: [
      ["0", "0", "1", "0"],
      ["0", "1", "0", "0"],
    ],
  };
  await told(request, `/api/v1/plants/${plant.id}/revisions`, { version: plant.version, data: { content: heavier, note: "" } });
  await openDesign(page, designPath(design));
  await expect(page.getByText("Outdated: this stands on plant revision 1, the newest is 2.")).toBeVisible();
  await press(page, "Carry the recipe over to plant revision 2");
  await untilSolved(page);
  await expect(page.getByText(/^Outdated/)).toBeHidden();
  await expect(figure(page, "Largest deviation of v1, m/s")).toHaveValue("0.05");
  await expect(figure(page, DEVIATION)).toHaveValue("0.001");
  const carried = byWeights({
    weights: { form: "deviations", states: [0.05, 0.001, 0.001, 0.05], inputs: [40, 40] },
    test: { horizon: null, initialState: [0, 0, 0.001, 0], inputDisturbance: [4, 0] },
  });
  await saveDesignRevision(page, 2, "heavier carriages");
  const stored = await newestRevision(request, design.id);
  expect(stored.plantRevision.number).toBe(2);
  expect(stored.recipe).toEqual(carried);
  const own = computeDesign(stored.model as PlantModel, carried);
  expect(stored.evidence.gains).toEqual(own.gains);
  expect(await shownMatrix(page, "K")).toEqual(own.gains.state === "computed" && own.gains.value.K);
});

test("gains leave as text, CSV and JSON with names, units, sign equation, time base and cautions, at full precision", async ({
  page,
  team,
}) => {
  const plant = await storedPlant(team.lead.request, { name: "=Carriages" });
  const design = await storedDesign(team.lead.request, plant);
  const { evidence } = await newestRevision(team.lead.request, design.id);
  const K = evidence.gains.state === "computed" ? evidence.gains.value.K : [];
  await page.context().grantPermissions(["clipboard-read", "clipboard-write"]);
  await openDesign(page, designPath(design));
  await press(page, "Copy with names and units");
  await expect(page.getByText("Copied", { exact: true })).toBeAttached();
  const copied = await page.evaluate(() => navigator.clipboard.readText());
  expect(copied).toMatch(/^'=Carriages, revision 1; First weighting, revision 1\n/);
  expect(copied).toContain("u = -K x + F r, in deviations from the operating point");
  expect(copied).toContain("K\tx1 [m]\tx2 [m]\tv1 [m/s]\tv2 [m/s]");
  expect(copied).toContain(`F1 [N]\t${K[0].map(String).join("\t")}\n`);
  expect(copied).toContain("Caution: These results hold for the linear model about its operating point");

  const download = async (label: string) => {
    const [file] = await Promise.all([
      page.waitForEvent("download"),
      part(page, "Gains").getByRole("link", { name: label }).click(),
    ]);
    const chunks: Buffer[] = [];
    for await (const chunk of await file.createReadStream()) chunks.push(chunk as Buffer);
    return { name: file.suggestedFilename(), text: Buffer.concat(chunks).toString("utf8") };
  };
  const csv = await download("Download CSV");
  expect(csv.name).toMatch(/First weighting r1 gain\.csv$/);
  expect(csv.text).toContain("'=Carriages");
  expect(csv.text).toContain("K,state feedback gain,x1,x2,v1,v2");
  expect(csv.text).toContain(`F1,N,${K[0].map(String).join(",")}`);
  expect(csv.text).toContain("This control law is not a safety function.");
  const json = await download("Download JSON");
  const document = JSON.parse(json.text);
  expect(document.law).toMatch(/^u = -K x \+ F r/);
  expect(document.timeBaseInWords).toMatch(/^Continuous law/);
  expect(document.cautions.join(" ")).toContain("The machine itself was not tested.");
  expect(document.matrices[0]).toMatchObject({ symbol: "K", columns: [{ name: "x1", unit: "m" }, {}, {}, {}], entries: K });
});

test("a reviewer reads recipe, responses, evidence and gains, and finds nothing to edit", async ({ team, colleague }) => {
  const plant = await storedPlant(team.lead.request);
  const design = await storedDesign(team.lead.request, plant);
  const page = await colleague("reviewer");
  await openDesign(page, designPath(design));
  const recipe = page.getByRole("region", { name: "Largest deviation accepted" });
  await expect(recipe).toContainText(/x1.*0\.001 m/);
  await expect(page.getByText("Half of the belt's backlash")).toBeVisible();
  await expect(page.getByRole("img", { name: /^enc1 commanded 0\.001 m: enc2 peak/ })).toBeVisible();
  await expect(page.getByRole("region", { name: "Evidence" })).toContainText("Settling, 2 %");
  expect(await shownMatrix(page, "K")).toHaveLength(2);
  await expect(page.getByRole("link", { name: "Download CSV" })).toBeVisible();
  for (const name of [/^Solve/, /^Save/, /^Undo/, /^Redo/, /^Design: rename/]) {
    await expect(page.getByRole("button", { name })).toHaveCount(0);
  }
  await expect(page.getByRole("textbox")).toHaveCount(0);
  await page.keyboard.press("Control+Enter");
  await expect(page.getByText("as stored with revision 1")).toBeVisible();
  await page.goto(`/plants/${plant.id}/designs/new`);
  await expect(page).toHaveURL(/\/plants\/[0-9a-f-]{36}\?tab=designs$/);
  await expect(page.getByRole("link", { name: "New design" })).toHaveCount(0);
});

test.describe("another team's design", () => {
  test.use({ expectedProblems: [/status of 404/] });

  test("is answered to a stranger exactly like one that never was", async ({ team, anotherPerson }) => {
    const plant = await storedPlant(team.lead.request);
    const design = await storedDesign(team.lead.request, plant, { name: "Kept secret" });
    const stranger = await anotherPerson();
    await signUpAs(stranger.request, "Some Stranger");
    const own = await storedPlant(stranger.request);
    const answer = async (address: string) => {
      const reply = await stranger.goto(address);
      await expect(stranger.getByRole("heading", { level: 1, name: "Nothing is kept at this address" })).toBeVisible();
      return { status: reply?.status(), title: await stranger.title(), text: await stranger.locator("body").ariaSnapshot() };
    };
    const theirs = await answer(designPath(design));
    expect(theirs.status).toBe(404);
    expect(theirs).toEqual(await answer(`/plants/${own.id}/designs/${design.id}`));
    expect(theirs).toEqual(await answer(`/plants/${own.id}/designs/${randomUUID()}`));
    const started = await answer(`/plants/${plant.id}/designs/new`);
    expect(started.status).toBe(404);
    expect(started).toEqual(await answer(`/plants/${randomUUID()}/designs/new`));
  });
});
