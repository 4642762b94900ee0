import type { PlantRevision, PlantSummary } from "@/lib/schemas/plant";
import { PASSWORD, signInAs, signUpAs, told } from "../helpers/browser-requests";
import { cellOf, openPlant } from "../helpers/matrix-page";
import { changeEntry, reloadUnsaved, saveRevision, sendRevision, untilKept } from "../helpers/plant-page";
import { expect, storedPlant, test } from "../helpers/team-test";

test.describe("what was typed and not yet saved", () => {
  test("is back after a reload, which asks first, and can be let go", async ({ page, team }) => {
    const plant = await storedPlant(team.lead.request);
    await openPlant(page, `/plants/${plant.id}`);
    await changeEntry(page, 3, 3, "-0.77");
    await reloadUnsaved(page);
    await expect(cellOf(page, "A", 3, 3)).toHaveText("−0.77");
    await page.getByRole("button", { name: "Discard them" }).click();
    await expect(cellOf(page, "A", 3, 3)).toHaveText("−0.4");
    await expect(page.getByText("unsaved changes")).toBeHidden();
    await page.reload();
    await expect(cellOf(page, "A", 3, 3)).toHaveText("−0.4");
    await expect(page.getByText("Your unsaved changes are back.")).toBeHidden();
  });

  test("is back after the tab was killed, the name of a new plant too", async ({ page, context }) => {
    await openPlant(page, "/plants/new");
    await page.getByLabel("Name of the plant").fill("Interrupted");
    await changeEntry(page, 3, 1, "-40.25");
    await untilKept(page, "-40.25");
    await page.close();
    const again = await context.newPage();
    await openPlant(again, "/plants/new");
    await expect(again.getByText("Your unsaved changes are back.")).toBeVisible();
    await expect(again.getByLabel("Name of the plant")).toHaveValue("Interrupted");
    await again.getByRole("button", { name: "Go on with them" }).click();
    await expect(again.getByText("Your unsaved changes are back.")).toBeHidden();
    await expect(cellOf(again, "A", 3, 1)).toHaveText("−40.25");
    await again.getByRole("button", { name: "Save plant" }).click();
    await expect(again.getByRole("heading", { level: 1, name: "Interrupted" })).toBeVisible();
    await openPlant(again, "/plants/new");
    await expect(again.getByLabel("Name of the plant")).toHaveValue("");
  });

  test("of one person stays out of another's browser session on the same machine", async ({ page, context, team }) => {
    const plant = await storedPlant(team.lead.request);
    await openPlant(page, `/plants/${plant.id}`);
    await changeEntry(page, 3, 3, "-0.77");
    await untilKept(page, "-0.77");
    await page.close();
    await context.clearCookies();
    const other = await context.newPage();
    await signUpAs(context.request, "Shared Machine");
    await openPlant(other, "/plants/new");
    await expect(other.getByText("Your unsaved changes are back.")).toBeHidden();
    await expect(cellOf(other, "A", 3, 3)).toHaveAccessibleName(/: 0$/);
  });
});

test.describe("without a connection", () => {
  test.use({ expectedProblems: [/ERR_INTERNET_DISCONNECTED/] });

  test("a save says so, keeps everything, and is done once when the line is back", async ({ page, context, team }) => {
    const plant = await storedPlant(team.lead.request);
    await openPlant(page, `/plants/${plant.id}`);
    await changeEntry(page, 3, 3, "-0.55");
    await context.setOffline(true);
    await sendRevision(page, 2, "typed in the hall");
    const dialog = page.getByRole("dialog");
    await expect(dialog.getByRole("alert")).toContainText("The service did not answer. What you typed is kept");
    await expect(dialog.getByLabel(/^What changed/)).toHaveValue("typed in the hall");
    await context.setOffline(false);
    await dialog.getByRole("button", { name: "Save", exact: true }).click();
    await expect(page.getByText("Revision 2 is saved.")).toBeVisible();
    const { items } = await told<{ items: { note: string }[] }>(team.lead.request, `/api/v1/plants/${plant.id}/revisions`);
    expect(items.map(({ note }) => note)).toEqual(["typed in the hall", ""]);
  });
});

test.describe("a session that ended during work", () => {
  test.use({ expectedProblems: [/status of 401/] });

  test("is renewed in place and the action is carried out once", async ({ anotherPerson }) => {
    const page = await anotherPerson();
    const email = await signUpAs(page.request, "Nils Abendroth");
    await openPlant(page, "/plants/new");
    await page.getByLabel("Name of the plant").fill("Worked through the night");
    await changeEntry(page, 3, 1, "-9");
    const elsewhere = await anotherPerson();
    await signInAs(elsewhere.request, email);
    await told(elsewhere.request, "/api/v1/account/sessions", { method: "DELETE", data: { which: "others" } });
    const creates: number[] = [];
    page.on("response", (reply) => {
      if (reply.request().method() === "POST" && reply.url().endsWith("/api/v1/plants")) creates.push(reply.status());
    });
    await page.getByRole("button", { name: "Save plant" }).click();
    const dialog = page.getByRole("dialog", { name: "Sign in again to go on" });
    await expect(dialog.getByLabel("E-mail address")).toHaveValue(email);
    await dialog.getByRole("textbox", { name: "Password" }).fill("not the password");
    await dialog.getByRole("button", { name: "Sign in" }).click();
    await expect(dialog.getByRole("alert")).toContainText("The address or the password is not right.");
    await dialog.getByRole("textbox", { name: "Password" }).fill(PASSWORD);
    await dialog.getByRole("button", { name: "Sign in" }).click();
    await expect(page.getByRole("heading", { level: 1, name: "Worked through the night" })).toBeVisible();
    expect(creates).toEqual([401, 201]);
    const { items } = await told<{ items: PlantSummary[] }>(elsewhere.request, "/api/v1/plants");
    expect(items.map(({ name }) => name)).toEqual(["Worked through the night"]);
  });

  test("leaves the work alone when nobody signs in again", async ({ page, context, team }) => {
    const plant = await storedPlant(team.lead.request);
    await openPlant(page, `/plants/${plant.id}`);
    await changeEntry(page, 3, 3, "-0.55");
    await context.clearCookies();
    await sendRevision(page, 2);
    const again = page.getByRole("dialog", { name: "Sign in again to go on" });
    await expect(again).toBeVisible();
    await page.keyboard.press("Escape");
    await expect(again).toBeHidden();
    await expect(page.getByRole("dialog").getByRole("alert")).toContainText("Sign in");
    await page.keyboard.press("Escape");
    await expect(cellOf(page, "A", 3, 3)).toHaveText("−0.55");
    await untilKept(page, "-0.55");
  });
});

test.describe("two people who change one plant", () => {
  test.use({ expectedProblems: [/status of 412/] });

  test("both keep what they did: the later one sees what differs and chooses", async ({ page, team, colleague }) => {
    test.setTimeout(120_000);
    const plant = await storedPlant(team.lead.request);
    const engineer = await colleague("engineer");
    const stored = async (id: string) => {
      const { currentRevision } = await told<PlantSummary>(team.lead.request, `/api/v1/plants/${id}`);
      return told<PlantRevision>(team.lead.request, `/api/v1/plants/${id}/revisions/${currentRevision.id}`);
    };
    const conflict = page.getByRole("dialog", { name: "Somebody saved this plant after you opened it" });
    await openPlant(engineer, `/plants/${plant.id}`);

    await test.step("mine: saved on top of theirs, which stays a revision", async () => {
      await openPlant(page, `/plants/${plant.id}`);
      await changeEntry(engineer, 3, 3, "-0.6");
      await saveRevision(engineer, 2, "damper measured again");
      await changeEntry(page, 4, 4, "-0.7");
      await sendRevision(page, 2, "stiffer mount");
      await expect(conflict).toContainText("Emil Varga saved revision 2: damper measured again");
      await expect(conflict.getByRole("table")).toContainText(/A, row v1, column v1\s*-0\.4\s*-0\.6/);
      await conflict.getByRole("button", { name: "Save mine as revision 3" }).click();
      await expect(page.getByText("Revision 3 is saved.")).toBeVisible();
      expect((await stored(plant.id)).content.A.map((row, index) => row[index])).toEqual(["0", "0", "-0.4", "-0.7"]);
    });

    await test.step("theirs: the page shows what is stored and asks nothing more", async () => {
      await openPlant(engineer, `/plants/${plant.id}`);
      await changeEntry(engineer, 3, 3, "-0.8");
      await saveRevision(engineer, 4);
      await changeEntry(page, 3, 3, "-0.9");
      await sendRevision(page, 4);
      const asked: string[] = [];
      page.on("dialog", (dialog) => {
        asked.push(dialog.type());
        void dialog.accept();
      });
      await conflict.getByRole("button", { name: "Take theirs, drop mine" }).click();
      await expect(page.getByText("Revision 4", { exact: true })).toBeVisible();
      await expect(cellOf(page, "A", 3, 3)).toHaveText("−0.8");
      await expect(page.getByText("Your unsaved changes are back.")).toBeHidden();
      expect(asked).toEqual([]);
    });

    await test.step("copy: mine becomes a plant of its own, theirs stays", async () => {
      await openPlant(page, `/plants/${plant.id}`);
      await changeEntry(engineer, 4, 4, "-1.1");
      await saveRevision(engineer, 5);
      await changeEntry(page, 4, 4, "-1.2");
      await sendRevision(page, 5);
      await conflict.getByRole("button", { name: "Keep mine as a plant of its own" }).click();
      await expect(page.getByRole("heading", { level: 1, name: "Two carriages (my changes)" })).toBeVisible();
      await expect(cellOf(page, "A", 4, 4)).toHaveText("−1.2");
      expect((await stored(plant.id)).content.A[3][3]).toBe("-1.1");
      await openPlant(page, `/plants/${plant.id}`);
      await expect(cellOf(page, "A", 4, 4)).toHaveText("−1.1");
      await expect(page.getByText("Your unsaved changes are back.")).toBeHidden();
    });
  });
});
