import type { Page } from "@playwright/test";
import { computeDesign } from "@/control/design/compute-design";
import type { PlantModel } from "@/control/plant/model";
import type { DesignSummary } from "@/lib/schemas/design";
import type { PlantRevision } from "@/lib/schemas/plant";
import { told } from "../helpers/browser-requests";
import {
  choose,
  designPath,
  evidence,
  figure,
  newestRevision,
  openDesign,
  part,
  press,
  shownMatrix,
  solve,
  storedDesign,
  untilSolved,
  wantPairs,
} from "../helpers/design-page";
import { byPoles, byWeights, observers } from "../helpers/recipes";
import { expectRefused } from "../helpers/refused-field";
import { expect, storedPlant, test } from "../helpers/team-test";

const weightCell = (page: Page, name: string, row: number, column: number) =>
  page.getByRole("grid", { name: new RegExp(`^${name} · `) }).locator(`[data-r="${row - 1}"][data-c="${column - 1}"]`);

test("a recipe of accepted deviations is solved and shows responses, figures, gains, sign equation and cautions", async ({
  page,
  team,
}) => {
  const plant = await storedPlant(team.lead.request);
  await openDesign(page, `/plants/${plant.id}/designs/new`);
  await expect(figure(page, "Largest deviation of x1, m")).toHaveValue("0.001");
  await figure(page, "Largest deviation of v2, m/s").fill("0,02");
  await figure(page, "Accepted effort of F1, N").fill("60");
  await page.keyboard.press("Control+Enter");
  await untilSolved(page);

  const responses = page.getByRole("figure", { name: "Coupled response to steps" });
  await expect(
    responses.getByRole("img", { name: /^enc1 commanded 0\.001 m: enc1 peak .* m.*at rest, settled after/ }),
  ).toBeVisible();
  await expect(responses.getByRole("img", { name: /^enc1 commanded 0\.001 m: enc2 peak \S+ m/ })).toBeVisible();
  await expect(
    responses.getByRole("img", { name: /^enc2 commanded 0\.001 m: F1 peak \S+ N.*within its limit of/ }),
  ).toBeVisible();
  await choose(page, "Disturbances");
  await expect(page).toHaveURL(/response=disturbance/);
  const disturbed = page.getByRole("figure", { name: "Coupled response to input disturbances" });
  await expect(disturbed.getByRole("img", { name: /^F1 disturbed by 4 N: enc2 peak \S+ m/ })).toBeVisible();

  const steps = evidence(page, "Steps, over all time").getByRole("table", { name: "enc1 commanded 0.001 m" });
  await expect(steps.getByRole("row", { name: /^Settling, 2 % \S+ m?s$/ })).toBeVisible();
  await expect(steps.getByRole("row", { name: /^Overshoot \S+ %$/ })).toBeVisible();
  await expect(steps.getByRole("row", { name: /^Cross-axis peak, enc2 \S+ m$/ })).toBeVisible();
  await expect(steps.getByRole("row", { name: /^Peak effort, F1 \S+ N ?\S+ % of limit$/ })).toBeVisible();
  await expect(evidence(page, "Set points")).toContainText("Every commanded quantity reaches its set point.");
  await expect(evidence(page, "Loop").getByRole("list", { name: "Closed-loop poles" })).toContainText("1/s");
  await expect(evidence(page, "Solved by")).toContainText(/Riccati equation.*Residual .*, within its bound of/);

  const gains = part(page, "Gains");
  await expect(gains).toContainText("u = -K x + F r, in deviations from the operating point");
  await expect(gains).toContainText("Continuous law: the gain holds for a controller that acts without sampling.");
  await expect(gains).toContainText("The machine itself was not tested.");
  await expect(gains).toContainText("This control law is not a safety function.");
  const K = gains.getByRole("table", { name: /^K · / });
  await expect(K.getByRole("columnheader")).toHaveText(["x1m", "x2m", "v1m/s", "v2m/s"]);
  await expect(K.getByRole("rowheader")).toHaveText(["F1 N", "F2 N"]);
  const { model } = await told<PlantRevision>(
    team.lead.request,
    `/api/v1/plants/${plant.id}/revisions/${plant.currentRevision.id}`,
  );
  const weights = { form: "deviations", states: [0.001, 0.001, 0.05, 0.02], inputs: [60, 40] } as const;
  const expected = computeDesign(model as PlantModel, byWeights({ weights }));
  expect(expected.gains.state === "computed" && expected.gains.value.K).toEqual(await shownMatrix(page, "K"));
});

test("full symmetric weights start from the deviations, mirror what is typed, and change the gain", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  await openDesign(page, `/plants/${plant.id}/designs/new`);
  await solve(page);
  const before = await shownMatrix(page, "K");
  await choose(page, "Full matrices");
  await expect(weightCell(page, "State weight", 1, 1)).toHaveAttribute("title", "1000000");
  await expect(weightCell(page, "Input weight", 2, 2)).toHaveAttribute("title", "0.000625");
  await solve(page);
  expect(await shownMatrix(page, "K")).toEqual(before);
  await weightCell(page, "State weight", 1, 2).click();
  await page.keyboard.type("-400000");
  await page.keyboard.press("Enter");
  await expect(weightCell(page, "State weight", 2, 1)).toHaveAttribute("title", "-400000");
  await untilSolved(page);
  expect(await shownMatrix(page, "K")).not.toEqual(before);
  await page.getByRole("checkbox", { name: "Cross weight between states and inputs" }).check();
  await weightCell(page, "Cross weight", 3, 1).click();
  await page.keyboard.type("0.1");
  await page.keyboard.press("Enter");
  await solve(page);
  const after = await shownMatrix(page, "K");
  expect(after).not.toEqual(before);
  await press(page, "Undo");
  await press(page, "Undo");
  await press(page, "Undo");
  await expect(weightCell(page, "State weight", 1, 2)).toHaveAttribute("title", "0");
  await solve(page);
  expect(await shownMatrix(page, "K")).toEqual(before);
});

test("poles are given by frequency and damping, and the loop has them", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  await openDesign(page, `/plants/${plant.id}/designs/new`);
  await choose(page, "Poles");
  await wantPairs(page, "Wanted closed-loop poles", [
    ["20", "0.7"],
    ["30", "0,8"],
  ]);
  await expect(page.getByText("4 of 4 poles for 4 states")).toBeVisible();
  await solve(page);
  const poles = evidence(page, "Loop").getByRole("list", { name: "Closed-loop poles" });
  await expect(poles.getByRole("listitem")).toHaveCount(2);
  await expect(poles).toContainText(/−14 ± 14\.28 i.*3\.18 Hz · damping 0\.7 · time constant 71\.4 ms/);
  await expect(poles).toContainText(/−24 ± 18 i.*4\.77 Hz · damping 0\.8 · time constant 41\.7 ms/);
  await expect(evidence(page, "Solved by")).toContainText(/Poles placed to/);
  const entry = page.getByRole("group", { name: "Wanted closed-loop poles" }).getByRole("listitem").first();
  await entry.getByLabel("Entry 1 is given as").selectOption("pair");
  await expect(entry.getByLabel("Real part")).toHaveValue("-14");
  await expect(entry.getByLabel(/^Imaginary part/)).toHaveValue("14.2829");
});

test("each kind of observer is solved, and states as they are stand beside states as estimated", async ({ page, team }) => {
  test.setTimeout(120_000);
  const plant = await storedPlant(team.lead.request);
  await openDesign(page, `/plants/${plant.id}/designs/new`);
  await solve(page);
  await page.getByRole("checkbox", { name: "States", exact: true }).check();
  await choose(page, "Initial state");
  const estimates = async (law: string, matrices: readonly string[]) => {
    await solve(page);
    const gains = part(page, "Gains");
    await expect(gains).toContainText(law);
    for (const symbol of matrices) await expect(gains.getByRole("table", { name: new RegExp(`^${symbol} · `) })).toBeVisible();
    const responses = page.getByRole("figure", { name: "Coupled response from the initial state" });
    await expect(responses.getByRole("img", { name: /: v1 peak/ })).toBeVisible();
    await expect(page.getByText("states: thick as they are, thin as estimated")).toBeVisible();
    const figures = responses.getByRole("table", { name: "let go from the initial state" });
    if (!(await figures.isVisible())) await page.getByText("These responses in words and figures").click();
    await expect(figures.getByRole("columnheader", { name: "v1, m/s", exact: true })).toBeVisible();
    await expect(figures.getByRole("columnheader", { name: "v1, estimated, m/s", exact: true })).toBeVisible();
    const steps = evidence(page, "Steps, over all time").getByRole("table", { name: "enc1 commanded 0.001 m" });
    await expect(steps.getByRole("columnheader")).toHaveText(["full state", "with observer"]);
  };
  await choose(page, /^By poles/);
  await press(page, "Propose four times as fast as the loop");
  await expect(page.getByText("4 of 4 poles")).toBeVisible();
  await estimates("xhat' = A xhat + B u + L (y - C xhat - D u)", ["K", "F", "L"]);
  await choose(page, /^From noise/);
  await expect(figure(page, "Noise on v1, (m/s)²/s")).not.toHaveValue("");
  await figure(page, "Noise of enc1, m²·s").fill("1e-12");
  await estimates("xhat' = A xhat + B u + L (y - C xhat - D u)", ["L"]);
  await choose(page, /^Reduced order/);
  await press(page, "Propose four times as fast as the loop");
  await expect(page.getByText("2 of 2 poles for the states that the outputs do not show")).toBeVisible();
  await estimates("w' = Fw w + Fy y + Fu u, xhat = Gw w + Gy (y - D u)", ["Fw", "Fy", "Fu", "Gw", "Gy"]);
  await expect(page.getByRole("heading", { name: "Observer of order 2" })).toBeVisible();
});

test("what is wrong with a recipe is said at its field, and nothing that was typed goes", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  await openDesign(page, `/plants/${plant.id}/designs/new`);
  const deviation = figure(page, "Largest deviation of x2, m");
  await deviation.fill("-0.002");
  await press(page, "Solve");
  await expectRefused(deviation, /The largest deviation of x2 must be above zero; leave it empty for no weight/);
  await expect(deviation).toHaveValue("-0.002");
  await expect(figure(page, "Accepted effort of F1, N")).toHaveValue("40");
  await deviation.fill("");
  await expect(deviation).not.toHaveAttribute("aria-invalid");
  const effort = figure(page, "Accepted effort of F2, N");
  await effort.fill("forty");
  await press(page, "Solve");
  await expectRefused(effort, /not a number/);
  await expect(effort).toHaveValue("forty");
  await effort.fill("40");
  await solve(page);

  await choose(page, "Poles");
  await wantPairs(page, "Wanted closed-loop poles", [["20", "0.7"]]);
  await press(page, "Save design");
  const list = page.getByRole("group", { name: "Wanted closed-loop poles" });
  await expect(list).toBeFocused();
  await expect(list).toContainText("4 poles are needed, one for each state; 2 are given (a pair counts as two)");
  await expect(page.getByRole("dialog")).toBeHidden();
  await expect(list.getByLabel("Frequency")).toHaveValue("20");
  await press(list, "Add a pole");
  await press(page, "Solve");
  await expectRefused(list.getByLabel("Frequency").nth(1), /Frequency of entry 2 is missing/);
});

test.describe("a recipe that the service refuses", () => {
  test.use({ expectedProblems: [/status of 422/] });

  test("keeps what was typed and names the assumption that does not hold, in the plant's own names, with one change to try", async ({
    page,
    team,
  }) => {
    test.setTimeout(180_000);
    const refusal = page.getByRole("alert").filter({ hasText: "What to try:" });
    const open = async (content: Parameters<typeof storedPlant>[1]) => {
      const plant = await storedPlant(team.lead.request, content);
      await openDesign(page, `/plants/${plant.id}/designs/new`);
    };
    await test.step("a mode that no input moves", async () => {
      await open({
        name: "Loose carriage",
        A: [
          ["0", "0", "1", "0"],
          ["0", "0", "0", "1"],
          ["-k/m", "0", "-0.4", "0"],
          ["0", "0", "0", "0"],
        ],
        B: [
          ["0", "0"],
          ["0", "0"],
          ["1/m", "1/m"],
          ["0", "0"],
        ],
      });
      await press(page, "Solve");
      await expect(refusal).toContainText("Cannot be stabilised.");
      await expect(refusal).toContainText(/No input moves .*mostly [xv]2.*no gain on F1 and F2 can hold it/);
      await expect(refusal).toContainText("What to try: Add an input that acts on this state");
    });
    await test.step("a mode that no output shows", async () => {
      await open({
        name: "Speeds only",
        C: [
          ["0", "0", "1", "0"],
          ["0", "0", "0", "1"],
        ],
      });
      await choose(page, /^From noise/);
      await press(page, "Solve");
      const observer = evidence(page, "Observer");
      await expect(observer).toContainText("Cannot be estimated.");
      await expect(observer).toContainText(/No output shows .*mostly x[12].*an estimate from enc1 and enc2 would drift away/);
      await expect(observer).toContainText("Add a sensor that sees this state");
    });
    await test.step("a mode on the boundary that no weight sees", async () => {
      await open({ name: "Unweighted" });
      for (const name of ["x1, m", "x2, m", "v1, m/s", "v2, m/s"]) await figure(page, `Largest deviation of ${name}`).fill("");
      await press(page, "Solve");
      await expect(refusal).toContainText("The weights overlook a mode.");
      await expect(refusal).toContainText(/mostly x[12]/);
      await figure(page, "Largest deviation of x1, m").fill("0.001");
      await solve(page);
      await expect(refusal).toBeHidden();
    });
    await test.step("an input weight that is not positive", async () => {
      await choose(page, "Full matrices");
      await weightCell(page, "Input weight", 2, 2).click();
      await page.keyboard.type("-1");
      await page.keyboard.press("Enter");
      await press(page, "Solve");
      await expect(refusal).toContainText("Weight not positive.");
      await expect(refusal).toContainText(/The input weight must cost something in every direction.*F2/);
      await expect(weightCell(page, "Input weight", 2, 2)).toHaveText("−1");
    });
    await test.step("poles that are not stable, or repeated too often", async () => {
      await choose(page, "Poles");
      const list = page.getByRole("group", { name: "Wanted closed-loop poles" });
      for (const [index, value] of ["-8", "-8", "-8", "3"].entries()) {
        await press(list, "Add a pole");
        await list.getByLabel(`Entry ${index + 1} is given as`).selectOption("real");
        await list.getByRole("listitem").nth(index).getByLabel("Pole", { exact: true }).fill(value);
      }
      await press(page, "Solve");
      await expect(refusal).toContainText(/The wanted pole 3 \(entry 4\) does not lie left of the imaginary axis/);
      await list.getByRole("listitem").nth(3).getByLabel("Pole", { exact: true }).fill("-20");
      await press(page, "Solve");
      await expect(refusal).toContainText("A pole is repeated too often.");
      await expect(refusal).toContainText(/−8 is asked for 3 times, but F1 and F2.* allow it 2 times/);
      await expect(refusal).toContainText(
        "What to try: Spread the repeated poles apart by a few percent, or allow dependent eigenvectors",
      );
    });
  });
});

test("every gain that is stored and shown is the core's own on the stored model, bit for bit", async ({ page, team }) => {
  const plant = await storedPlant(team.lead.request);
  const { model } = await told<PlantRevision>(
    team.lead.request,
    `/api/v1/plants/${plant.id}/revisions/${plant.currentRevision.id}`,
  );
  const recipes = [
    byWeights({ observer: observers.noise, degreeOfStability: 2 }),
    byPoles({ observer: observers.poles }),
    byPoles({ observer: observers.reduced, reference: { kind: "none" } }),
  ];
  const designs: DesignSummary[] = [];
  for (const [index, recipe] of recipes.entries()) {
    const design = await storedDesign(team.lead.request, plant, { name: `Design ${index + 1}`, recipe });
    designs.push(design);
    const { evidence } = await newestRevision(team.lead.request, design.id);
    const own = computeDesign(model as PlantModel, recipe);
    expect(own.gains.state).toBe("computed");
    expect(evidence.gains).toEqual(own.gains);
    expect(evidence.reference).toEqual(own.reference);
    expect(evidence.observer).toEqual(own.observer);
    expect(evidence.poles).toEqual(own.poles);
  }
  await openDesign(page, designPath(designs[0]));
  const own = computeDesign(model as PlantModel, recipes[0]);
  if (own.gains.state !== "computed" || own.observer.state !== "computed" || own.observer.value.kind !== "full") {
    throw new Error("the first recipe has no full observer");
  }
  expect(await shownMatrix(page, "K")).toEqual(own.gains.value.K);
  expect(await shownMatrix(page, "L")).toEqual(own.observer.value.L);
});
