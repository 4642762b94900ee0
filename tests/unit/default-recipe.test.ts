import { expect, test } from "vitest";
import { computeDesign } from "@/control/design/compute-design";
import { defaultRecipe } from "@/control/design/default-recipe";
import { recipeProblems } from "@/control/design/recipe-problems";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import type { PlantContent } from "@/lib/schemas/plant";
import { Recipe } from "@/lib/schemas/recipe";
import { twoCarriages } from "../helpers/plant-content";

function modelOf(changes: Partial<PlantContent> = {}) {
  const { model } = evaluatePlant(twoCarriages(changes));
  if (!model) throw new Error("the plant of the test cannot be evaluated");
  return model;
}
const typed = twoCarriages();

test("a first recipe weights every state and input by what the plant declares acceptable, and is solved as it stands", () => {
  const model = modelOf();
  const recipe = defaultRecipe(model);
  expect(recipe.weights).toEqual({ form: "deviations", states: [0.001, 0.001, 0.05, 0.05], inputs: [40, 40] });
  expect(recipe.test).toEqual({ horizon: null, initialState: [0.001, 0.001, 0.05, 0.05], inputDisturbance: [4, 4] });
  expect(recipe.reference.kind).toBe("feed-through");
  expect(recipeProblems(recipe, model)).toEqual([]);
  expect(Recipe.safeParse(recipe).success).toBe(true);
  const { gains, reference, responses } = computeDesign(model, recipe);
  expect([gains.state, reference.state, responses.state]).toEqual(["computed", "computed", "computed"]);
});

test("an input without a declared effort takes the nearer of its limits, seen from where it is held", () => {
  const [F1, F2] = typed.inputs;
  const inputs = [
    { ...F1, scale: null, lower: -120, upper: 80 },
    { ...F2, scale: null, lower: 0, upper: 100 },
  ];
  const operatingPoint = { states: [0, 0, 0, 0], inputs: [10, 25], outputs: [0, 0] };
  expect(defaultRecipe(modelOf({ inputs, operatingPoint })).weights).toMatchObject({ inputs: [70, 25] });
});

test("a limit on one side counts alone, and one that is already passed does not count", () => {
  const [F1, F2] = typed.inputs;
  const inputs = [
    { ...F1, scale: null, lower: null, upper: 30 },
    { ...F2, scale: null, lower: -5, upper: 50 },
  ];
  const operatingPoint = { states: [0, 0, 0, 0], inputs: [0, -9], outputs: [0, 0] };
  expect(defaultRecipe(modelOf({ inputs, operatingPoint })).weights).toMatchObject({ inputs: [30, 59] });
});

test("where nothing is declared everything weighs one, and the recipe still fits", () => {
  const bare = modelOf({
    states: typed.states.map((state) => ({ ...state, scale: null })),
    inputs: typed.inputs.map((input) => ({ ...input, scale: null, lower: null, upper: null })),
    commanded: [],
    H: [],
  });
  const recipe = defaultRecipe(bare);
  expect(recipe.weights).toEqual({ form: "deviations", states: [1, 1, 1, 1], inputs: [1, 1] });
  expect(recipe.reference.kind).toBe("none");
  expect(recipeProblems(recipe, bare)).toEqual([]);
  expect(computeDesign(bare, recipe).gains.state).toBe("computed");
});
