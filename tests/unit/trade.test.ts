import { describe, expect, test } from "vitest";
import { readForm } from "@/components/designs/recipe/read-form";
import { formOf } from "@/components/designs/recipe/recipe-form";
import { SWEEP_FACTORS, sweptForm } from "@/components/designs/trade/sweep-form";
import { effortScale, tradePoints } from "@/components/designs/trade/trade-points";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { WeightsRecipe } from "@/control/design/recipe";
import { recipeFigures } from "@/control/design/recipe-figures";
import { coupledModel } from "../helpers/coupled-model";

const model = coupledModel();
const form = formOf(defaultRecipe(model), model);
const gainsOf = (swept: ReturnType<typeof sweptForm>) => {
  const { recipe } = readForm(swept, model);
  if (!recipe) throw new Error("not complete");
  return recipeFigures(model, recipe);
};
const inMatrices = (deviations: typeof form) => {
  const { recipe } = readForm(deviations, model);
  if (recipe?.method !== "weights" || recipe.weights.form !== "deviations") throw new Error("not by deviations");
  const square = (value: number | null) => (value === null ? 0 : 1 / value ** 2);
  const diagonal = (values: readonly (number | null)[]) =>
    values.map((value, i) => values.map((_, j) => (i === j ? square(value) : 0)));
  const weights = { form: "matrices" as const, state: diagonal(recipe.weights.states), input: diagonal(recipe.weights.inputs) };
  return formOf({ ...recipe, weights } satisfies WeightsRecipe, model);
};

describe("a sweep", () => {
  test("has the recipe as it stands in its middle, and a decade to either side", () => {
    expect(SWEEP_FACTORS).toHaveLength(11);
    expect(SWEEP_FACTORS[5]).toBe(1);
    expect(SWEEP_FACTORS[0]).toBeCloseTo(0.1, 12);
    expect(SWEEP_FACTORS.at(-1)).toBeCloseTo(10, 12);
    expect(sweptForm(form, { of: "effort" }, 1)).toBe(form);
  });

  test("turns all efforts together, or one figure alone, and leaves the others as they were typed", () => {
    const all = sweptForm(form, { of: "effort" }, 2).weights;
    expect(all.inputs).toEqual(form.weights.inputs.map((value) => value && value * 2));
    expect(all.states).toEqual(form.weights.states);
    const one = sweptForm(form, { of: "state", index: 0 }, 3).weights;
    expect(one.states[0]).toBeCloseTo((form.weights.states[0] ?? 0) * 3, 12);
    expect(one.states.slice(1)).toEqual(form.weights.states.slice(1));
  });

  test("of full matrices is the same sweep as of the deviations they stand for", () => {
    for (const swept of [{ of: "effort" }, { of: "input", index: 1 }, { of: "state", index: 0 }] as const) {
      const [listed, full] = [gainsOf(sweptForm(form, swept, 2)), gainsOf(sweptForm(inMatrices(form), swept, 2))];
      if (listed.state === "refused" || full.state === "refused") throw new Error("refused");
      // Matrices are written with three digits.
      expect(full.value.worstSettling).toBeCloseTo(listed.value.worstSettling ?? 0, 1);
      full.value.peakEffort.forEach(({ peak }, j) => {
        expect(peak / listed.value.peakEffort[j].peak).toBeCloseTo(1, 2);
      });
    }
  });

  test("becomes points of settling against effort, which grows as control gets cheaper", () => {
    const factors = [0.5, 1, 2];
    const figures = factors.map((factor) => gainsOf(sweptForm(form, { of: "effort" }, factor)));
    const points = tradePoints(figures, factors, model);
    expect(points.map(({ place }) => place)).toEqual([0, 1, 2]);
    points.forEach(({ settling, effort }, k) => {
      const part = figures[k];
      expect(settling).toBe(part.state === "computed" && part.value.worstSettling);
      if (k > 0) expect(effort).toBeGreaterThan(points[k - 1].effort);
    });
    expect(points[1].words).toMatch(/^1 times: settles in .*s, effort \S+ % of a limit, cross-axis peak \S+ % of its step$/);
  });

  test("leaves out a recipe that was refused or has no steps", () => {
    const refused = { state: "refused", code: "not-stabilizable", data: {} } as const;
    expect(tradePoints([refused], [1], model)).toEqual([]);
    const still = gainsOf(form);
    if (still.state === "refused") throw new Error("refused");
    expect(tradePoints([{ state: "computed", value: { ...still.value, worstSettling: null } }], [1], model)).toEqual([]);
  });

  test("of a plant without limits is judged by the first input's peak", () => {
    const free = coupledModel({ inputs: model.inputs.map((input) => ({ ...input, lower: null, upper: null })) });
    expect(effortScale(free)).toEqual({
      input: 0,
      ofLimit: false,
      label: `Peak of ${model.inputs[0].name}, ${model.inputs[0].unit}`,
    });
  });
});
