import { describe, expect, test } from "vitest";
import { baseOf, isDirty, isStale, startedFrom, withDesign } from "@/components/designs/bench/bench-base";
import { cellProblems, problemAt, shownProblems } from "@/components/designs/bench/recipe-problems-at";
import { recipeRefusal } from "@/components/designs/bench/recipe-refusal";
import { fitsPlant } from "@/components/designs/drafts/draft-store";
import { poleFigureText, referenceText, slowFirst } from "@/components/designs/evidence/evidence-words";
import type { EvidenceReply } from "@/components/designs/evidence/figures-reply";
import { stepFigureRows } from "@/components/designs/evidence/step-figure-rows";
import { gainMatrices } from "@/components/designs/gains/gain-matrices";
import { gainText, plainCell } from "@/components/designs/gains/gain-text";
import { percentText } from "@/components/designs/percent-text";
import { readForm } from "@/components/designs/recipe/read-form";
import { formOf } from "@/components/designs/recipe/recipe-form";
import { gainUnit, noiseUnit, squaredUnit, weightUnit } from "@/components/designs/unit-text";
import { computeDesign } from "@/control/design/compute-design";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { Recipe } from "@/control/design/recipe";
import { CAUTIONS } from "@/control/words/cautions";
import { RequestProblem } from "@/lib/client/request";
import type { DesignSummary } from "@/lib/schemas/design";
import { evidenceReply, evidenceRows } from "@/lib/services/designs/evidence-reply";
import { coupledModel } from "../helpers/coupled-model";

const model = coupledModel();
const recipe = defaultRecipe(model);
const observed: Recipe = {
  ...recipe,
  observer: {
    kind: "poles",
    poles: [
      { kind: "damping", frequency: 200, damping: 0.8 },
      { kind: "damping", frequency: 260, damping: 0.8 },
    ],
  },
};
const shown = (of: Recipe): EvidenceReply => {
  const evidence = computeDesign(model, of);
  return evidenceReply(evidenceRows(evidence), evidence.methodVersion, model);
};
const evidence = shown(observed);
const figures = evidence.responses.state === "computed" ? evidence.responses.value.figures : [];
const ground = { plantRevision: { id: "p1", number: 1 }, model };

describe("units of matrices", () => {
  test("say what an entry is counted in", () => {
    expect([squaredUnit("m"), squaredUnit("m/s"), weightUnit("m", "m"), weightUnit("m", "N")]).toEqual([
      "m²",
      "(m/s)²",
      "1/m²",
      "1/(m·N)",
    ]);
    expect([gainUnit("N", "m"), gainUnit("m", "m"), gainUnit("N", undefined), gainUnit(undefined, "m")]).toEqual([
      "N per m",
      "1",
      "N",
      "1/m",
    ]);
    expect([noiseUnit("m", "m", "rate", false), noiseUnit("m", "m", "value", false), noiseUnit("m", "m", "rate", true)]).toEqual([
      "m²/s",
      "m²·s",
      "m²",
    ]);
  });
});

describe("gains for the clipboard", () => {
  const matrices = gainMatrices(evidence, model);
  const text = gainText({
    title: "Beam, revision 1; Quiet, revision 2",
    law: "u = -K xhat + F r",
    observerLaw: "xhat' = A xhat",
    timeBase: "Continuous law",
    matrices,
  });

  test("hold K, F and L with names, units, the law, the time base and every caution", () => {
    expect(matrices.map(({ symbol }) => symbol)).toEqual(["K", "F", "L"]);
    for (const part of ["Beam, revision 1", "u = -K xhat + F r", "Continuous law", "x1 [m]", "F2 [N]", "enc1 [m]", ...CAUTIONS])
      expect(text).toContain(part);
  });

  test("come back as the same doubles", () => {
    const lines = text.split("\n");
    const head = lines.findIndex((line) => line.startsWith("K\t"));
    const read = lines.slice(head + 1, head + 3).map((line) => line.split("\t").slice(1).map(Number));
    expect(read).toEqual(matrices[0].values);
  });

  test("of a reduced observer hold its five matrices", () => {
    const reduced = shown({ ...recipe, observer: { kind: "reduced", poles: [{ kind: "pair", re: -90, im: 30 }] } });
    expect(gainMatrices(reduced, model).map(({ symbol }) => symbol)).toEqual(["K", "F", "Fw", "Fy", "Fu", "Gw", "Gy"]);
  });

  test.each(["=1+1", " +2", "-x", "@sum", "\u{ff1d}1"])("never start a formula: %s", (name) => {
    expect(plainCell(name).startsWith("'")).toBe(true);
  });
  test("keep a name within its cell and line", () => {
    expect(plainCell("a\tb\r\nc")).toBe("a b c");
  });
});

describe("evidence in words", () => {
  test("lists slow poles first and says what the trade reads off", () => {
    const reports = [
      { pole: { re: -100, im: 0 }, naturalFrequency: 100, damping: 1, timeConstant: 0.01, mainState: 2 },
      { pole: { re: -3, im: 4 }, naturalFrequency: 5, damping: 0.6, timeConstant: 1 / 3, mainState: 0 },
      { pole: { re: 0, im: 0 }, naturalFrequency: 0, damping: null, timeConstant: null, mainState: 1 },
    ];
    expect(slowFirst(reports).map(({ mainState }) => mainState)).toEqual([1, 0, 2]);
    expect(reports.map(poleFigureText)).toEqual([
      "time constant 10 ms",
      "0.796 Hz · damping 0.6 · time constant 0.333 s",
      "does not decay",
    ]);
  });

  test("says which set points are reached and why others are not", () => {
    const reference = (reached: boolean[], obstacle: "too-few-inputs" | "zero-at-rest" | "rank" | null) => ({
      F: [],
      steadyState: [],
      reached,
      obstacle,
    });
    expect(referenceText(reference([true, true], null), ["x", "y"])).toBe("Every commanded quantity reaches its set point.");
    expect(referenceText(reference([true, false], "zero-at-rest"), ["x", "y"])).toMatch(
      /^x reaches its set point; y does not reach its set point: the plant has a zero/,
    );
    expect(referenceText(reference([false, false], "too-few-inputs"), ["x", "y"])).toMatch(
      /^x and y do not reach their set points: there are fewer inputs/,
    );
  });

  test("gives each step its figures for both loops and marks effort beyond a limit", () => {
    const steps = figures.filter(({ source }) => source === 0);
    const rows = stepFigureRows(steps, model);
    expect(rows.map(({ label }) => label)).toEqual([
      "Settling, 2 %",
      "Rise, 10–90 %",
      "Overshoot",
      "Cross-axis peak, x2",
      "Peak effort, F1",
      "Peak effort, F2",
    ]);
    for (const { cells } of rows) expect(cells).toHaveLength(2);
    const beyond = steps.map((step) => ({
      ...step,
      effort: [
        { peak: 150, at: 0, overLimit: 1.5 },
        { peak: 5, at: 0, overLimit: null },
      ],
    }));
    const [effort, free] = stepFigureRows(beyond, model).slice(-2);
    expect(effort.cells[0]).toEqual({ text: "150 N", note: "150 % of limit", beyond: true });
    expect(free.cells[0].note).toBe("no limit given");
  });

  test("does not write out percents that no machine shows", () => {
    expect([percentText(7.3e-7), percentText(-2e-9), percentText(0), percentText(4.567)]).toEqual([
      "< 0.01 %",
      "< 0.01 %",
      "0 %",
      "4.57 %",
    ]);
  });
});

describe("what is unsaved and what is outdated", () => {
  const design = { id: "d", version: 4, currentRevision: { id: "r2", number: 2 } } as DesignSummary;
  const base = baseOf({ design, revision: null, recipe, ground });
  const reading = readForm(formOf(recipe, model), model);

  test("a page opened and not touched is neither", () => {
    expect(isDirty(base, ground, reading)).toBe(false);
    expect(isStale({ recipe, ground, evidence, source: { kind: "stored", revisionId: "r2", number: 2 } }, ground, reading)).toBe(
      false,
    );
    expect(isStale(null, ground, reading)).toBe(false);
  });

  test("another figure, an unreadable one and another plant revision are unsaved", () => {
    const form = formOf(recipe, model);
    const other = readForm({ ...form, degreeOfStability: 3 }, model);
    const unreadable = readForm({ ...form, degreeOfStability: -3 }, model);
    const moved = { ...ground, plantRevision: { id: "p2", number: 2 } };
    for (const [on, read] of [
      [ground, other],
      [ground, unreadable],
      [moved, reading],
    ] as const) {
      expect(isDirty(base, on, read)).toBe(true);
      expect(isStale({ recipe, ground, evidence, source: { kind: "computed", milliseconds: null, curves: [] } }, on, read)).toBe(
        true,
      );
    }
  });

  test("a rename moves a fresh edit's start on, and leaves that of a restored draft where it was", () => {
    const renamed = { ...design, version: 5 };
    expect(withDesign(base, renamed).from).toEqual({ version: 5, revisionId: "r2" });
    const restored = { ...base, from: { version: 2, revisionId: "r1" } };
    expect(withDesign(restored, renamed).from).toEqual({ version: 2, revisionId: "r1" });
    expect(startedFrom(null)).toBeNull();
  });
});

describe("a draft from the browser's storage", () => {
  const form = formOf(observed, model);
  test("fits the plant it was written for", () => {
    expect(fitsPlant(JSON.parse(JSON.stringify(form)), model)).toBe(true);
  });
  test.each([
    null,
    7,
    "text",
    [],
    {},
    { ...form, weights: null },
    { ...form, cross: [["0"]] },
    { ...form, poles: 3 },
    { ...form, test: { ...form.test, initialState: [1] } },
  ])("is left alone when it is not of this plant's shape: %j", (odd) => {
    expect(fitsPlant(odd as unknown as typeof form, model)).toBe(false);
  });
  test("of another order does not fit", () => {
    expect(fitsPlant(form, coupledModel({ states: model.states.slice(0, 3) }))).toBe(false);
  });
});

describe("problems at their places", () => {
  const bad = readForm({ ...formOf(recipe, model), degreeOfStability: -1 }, model);
  const refusal = recipeRefusal(bad.problems);

  test("follow the typing while the page can judge them", () => {
    expect(problemAt(shownProblems(refusal, bad), "/degreeOfStability")).toMatch(/zero or more/);
    expect(shownProblems(refusal, readForm(formOf(recipe, model), model))).toEqual([]);
    expect(shownProblems(null, bad)).toEqual([]);
  });

  test("that only the server knows stay until the next try", () => {
    const theirs = new RequestProblem({
      code: "invalid",
      status: 422,
      title: "",
      detail: "",
      requestId: "r",
      errors: [{ pointer: "/recipe/observer/process/1/2", detail: "no" }],
    });
    const shownThere = shownProblems(theirs, readForm(formOf(recipe, model), model));
    expect(problemAt(shownThere, "/observer/process")).toBe("no");
    expect(cellProblems(shownThere, "/observer/process")).toEqual(new Map([["1,2", "no"]]));
    expect(cellProblems(shownThere, "/observer/measurement").size).toBe(0);
  });
});
