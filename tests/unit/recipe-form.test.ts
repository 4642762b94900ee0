import { describe, expect, test } from "vitest";
import { carryRecipe } from "@/components/designs/recipe/carry-recipe";
import { readForm, recipeKey } from "@/components/designs/recipe/read-form";
import { recipeFields } from "@/components/designs/recipe/recipe-fields";
import { blankDraft, formOf, matricesOf, type RecipeForm } from "@/components/designs/recipe/recipe-form";
import { recipeDifferences, recipeLines } from "@/components/designs/recipe/recipe-lines";
import { computeDesign } from "@/control/design/compute-design";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { ObserverRecipe, PolesRecipe, Recipe, WeightsRecipe } from "@/control/design/recipe";
import { Recipe as RecipeSchema } from "@/lib/schemas/recipe";
import { coupledModel } from "../helpers/coupled-model";

const model = coupledModel();
const start = defaultRecipe(model);
const noise: ObserverRecipe = {
  kind: "noise",
  process: [
    [0, 0, 0, 0],
    [0, 0, 0, 0],
    [0, 0, 1e-4, 2.5e-5],
    [0, 0, 2.5e-5, 1e-4],
  ],
  measurement: [
    [1e-12, 0],
    [0, 1e-12],
  ],
};
const poles: PolesRecipe = {
  version: 1,
  method: "poles",
  poles: [
    { kind: "damping", frequency: 30, damping: 0.7 },
    { kind: "real", value: -20 },
    { kind: "time-constant", seconds: 0.04 },
  ],
  observer: { kind: "reduced", poles: [{ kind: "pair", re: -80, im: 40 }] },
  reference: { kind: "feed-through" },
  test: start.test,
  reasons: { poles: "clear of the beam's resonance", "state:2": "measured with a worn guide" },
};
const matrices: WeightsRecipe = {
  ...start,
  weights: {
    form: "matrices",
    state: [
      [1e6, 2.5, 0, 0],
      [2.5, 1e5, 0, 0],
      [0, 0, 1, 0],
      [0, 0, 0, 1],
    ],
    input: [
      [6.25e-4, 0],
      [0, 6.25e-4],
    ],
  },
  crossWeight: [
    [0, 1e-3],
    [0, 0],
    [0, 0],
    [0, 0],
  ],
  degreeOfStability: 2,
  observer: noise,
};
const unweighted: WeightsRecipe = {
  ...start,
  weights: { form: "deviations", states: [0.001, null, 0.05, null], inputs: [40, 40] },
};

const RECIPES: readonly (readonly [string, Recipe])[] = [
  ["accepted deviations", start],
  ["unweighted states", unweighted],
  ["full matrices, cross weight and noise with covariances", matrices],
  ["every kind of pole and a reduced observer", poles],
  ["an observer by poles", { ...start, observer: { kind: "poles", poles: poles.poles } }],
];

describe("the form of a recipe", () => {
  test.each(RECIPES)("gives a recipe of %s back as it was", (_, recipe) => {
    const { recipe: read, problems } = readForm(formOf(recipe, model), model);
    expect(problems).toEqual([]);
    expect(read).toEqual(recipe);
    expect(RecipeSchema.safeParse(read).success).toBe(true);
  });

  test("turned from deviations to matrices changes no bit of the gain", () => {
    const form = formOf(start, model);
    const full: RecipeForm = {
      ...form,
      weights: { ...form.weights, form: "matrices", ...matricesOf(form.weights.states, form.weights.inputs) },
    };
    const { recipe } = readForm(full, model);
    const [a, b] = [start, recipe as Recipe].map((one) => computeDesign(model, one).gains);
    expect(a.state).toBe("computed");
    expect(b).toEqual(a);
  });

  test("keeps what was typed into an alternative that is not chosen", () => {
    const form = formOf(poles, model);
    const { recipe } = readForm({ ...form, method: "weights" }, model);
    expect(recipe).toMatchObject({ method: "weights", weights: start.weights });
    expect(readForm({ ...form, method: "poles" }, model).recipe).toEqual(poles);
  });

  const faults: readonly (readonly [string, (form: RecipeForm) => RecipeForm, string, RegExp])[] = [
    ["a missing effort", (form) => ({ ...form, weights: { ...form.weights, inputs: [40, null] } }), "/weights/inputs/1", /F2/],
    [
      "a deviation of zero",
      (form) => ({ ...form, weights: { ...form.weights, states: [0, 1, 1, 1] } }),
      "/weights/states/0",
      /x1/,
    ],
    ["a negative degree of stability", (form) => ({ ...form, degreeOfStability: -1 }), "/degreeOfStability", /zero or more/],
    ["a length of zero", (form) => ({ ...form, test: { ...form.test, horizon: 0 } }), "/test/horizon", /above zero/],
    [
      "no number in a cell",
      (form) => ({ ...form, cross: form.test.initialState.map(() => ["0", "two"]) }),
      "/crossWeight/0/1",
      /x1, F2/,
    ],
    [
      "a pole without its damping",
      (form) => ({ ...form, method: "poles", poles: [{ ...blankDraft(), first: 3 }] }),
      "/poles/0/damping",
      /Damping of entry 1 is missing/,
    ],
    ["too few poles", (form) => ({ ...form, method: "poles", poles: [] }), "/poles", /4 poles are needed/],
    [
      "a weight that is not symmetric",
      (form) => ({
        ...form,
        weights: {
          ...form.weights,
          form: "matrices",
          input: [
            ["1", "2"],
            ["3", "4"],
          ],
        },
      }),
      "/weights/input/1/0",
      /must be symmetric: F2, F1/,
    ],
  ];
  test.each(faults)("says %s at its place, and its control is known", (_, fault, pointer, words) => {
    const form = fault(formOf(start, model));
    const { recipe, problems } = readForm(form, model);
    expect(recipe).toBeNull();
    expect(problems).toContainEqual({ pointer, message: expect.stringMatching(words) });
    const known = Object.keys(recipeFields(form, model));
    expect(known.some((field) => `/recipe${pointer}` === field || `/recipe${pointer}`.startsWith(`${field}/`))).toBe(true);
  });

  test("takes a decimal comma in a cell and asks about one that could group thousands", () => {
    const cells = (text: string) => start.test.initialState.map((_, i) => (i === 0 ? [text, "0"] : ["0", "0"]));
    const read = (text: string) => readForm({ ...formOf(start, model), cross: cells(text) }, model);
    expect(read("0,5").recipe).toMatchObject({
      crossWeight: [
        [0.5, 0],
        [0, 0],
        [0, 0],
        [0, 0],
      ],
    });
    expect(read("1,234").recipe).toBeNull();
  });

  test("drops reasons that are blank", () => {
    const { recipe } = readForm({ ...formOf(start, model), reasons: { weights: "  ", observer: " quiet enough " } }, model);
    expect(recipe?.reasons).toEqual({ observer: "quiet enough" });
  });
});

describe("equality of recipes", () => {
  test("does not depend on the order of fields", () => {
    const { version, method, ...rest } = poles;
    expect(recipeKey({ ...rest, method, version } as Recipe)).toBe(recipeKey(poles));
  });
  test("sees the last digit", () => {
    expect(recipeKey({ ...poles, poles: [{ kind: "real", value: -20.000000000000004 }] })).not.toBe(
      recipeKey({ ...poles, poles: [{ kind: "real", value: -20 }] }),
    );
  });
});

describe("a recipe carried over to another plant revision", () => {
  const moved = coupledModel({
    states: [model.states[1], { name: "F1", unit: "N", axis: 0, scale: 100 }, model.states[0], model.states[2], model.states[3]],
  });

  test("follows its signals by name; a new one gets what a new design gives it", () => {
    const carried = carryRecipe({ ...unweighted, reasons: { "state:0": "worn guide", observer: "full state" } }, model, moved);
    expect(carried).toMatchObject({ weights: { states: [null, 100, 0.001, 0.05, null], inputs: [40, 40] } });
    expect(carried.test.initialState).toEqual([0.002, 100, 0.001, 0.05, 0.05]);
    expect(carried.reasons).toEqual({ "state:2": "worn guide", observer: "full state" });
  });

  test("keeps off-diagonal weights and covariances with their signals", () => {
    const carried = carryRecipe(matrices, model, moved) as WeightsRecipe;
    if (carried.weights.form !== "matrices" || carried.observer.kind !== "noise") throw new Error("changed its kind");
    expect(carried.weights.state[0]).toEqual([1e5, 0, 2.5, 0, 0]);
    expect(carried.weights.state[1]).toEqual([0, 1e-4, 0, 0, 0]);
    expect(carried.crossWeight?.[2]).toEqual([0, 1e-3]);
    expect(carried.observer.process[3]).toEqual([0, 0, 0, 1e-4, 2.5e-5]);
  });

  test("to the same signals is the same recipe", () => {
    for (const [, recipe] of RECIPES) expect(carryRecipe(recipe, model, coupledModel())).toEqual(recipe);
  });

  test("says at the list of poles when their number no longer fits", () => {
    const carried = carryRecipe(poles, model, moved);
    expect(readForm(formOf(carried, moved), moved).problems).toContainEqual({
      pointer: "/poles",
      message: expect.stringContaining("5 poles"),
    });
  });
});

describe("what differs between two recipes", () => {
  const against = (recipe: Recipe) => recipeDifferences({ recipe: start, model }, { recipe, model });

  test("is nothing where they are the same", () => {
    expect(against({ ...start })).toEqual([]);
  });

  test("is told in the signals' own names and units", () => {
    expect(against(unweighted)).toContainEqual(
      expect.objectContaining({ place: "Largest deviation accepted: x2", before: "0.002 m", after: "not weighted" }),
    );
    expect(against({ ...start, reasons: { "input:1": "quieter" } })).toEqual([
      expect.objectContaining({ place: "Reasons: F2", before: null, after: "quieter" }),
    ]);
  });

  test("is given in full where four digits would read the same", () => {
    const near = {
      ...start,
      weights: { ...unweighted.weights, states: [0.00100000001, 0.002, 0.05, 0.05], inputs: [40, 40] },
    } as Recipe;
    expect(against(near)).toEqual([expect.objectContaining({ before: "0.001", after: "0.00100000001" })]);
  });

  test("names every fact once", () => {
    for (const [, recipe] of RECIPES) {
      const keys = recipeLines(recipe, model).map(({ key }) => key);
      expect(new Set(keys).size).toBe(keys.length);
    }
  });
});

test("dependent eigenvectors are allowed by name only, and go with their list of poles", () => {
  const allowed: Recipe = {
    ...poles,
    allowDefective: true,
    observer: { kind: "reduced", poles: [{ kind: "pair", re: -80, im: 40 }], allowDefective: true },
  };
  expect(readForm(formOf(allowed, model), model).recipe).toEqual(allowed);
  expect(readForm(formOf(poles, model), model).recipe).toEqual(poles);
  const { allowDefective: _, ...older } = formOf(allowed, model);
  expect(readForm(older, model).recipe).toEqual(poles);
  const said = recipeLines(allowed, model).filter(({ label }) => label === "dependent eigenvectors");
  expect(said.map(({ section }) => section)).toEqual(["Wanted poles", "Observer"]);
});
