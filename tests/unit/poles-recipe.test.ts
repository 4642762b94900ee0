import { describe, expect, test } from "vitest";
import { computeDesign } from "@/control/design/compute-design";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { PoleEntry, Recipe } from "@/control/design/recipe";
import { explainRefusal } from "@/control/words/explain-refusal";
import { GainEvidence } from "@/lib/schemas/evidence";
import { Recipe as RecipeSchema } from "@/lib/schemas/recipe";
import { smallPlant } from "../helpers/small-plant";

/** Two carts joined by a spring, pushed one each; positions measured. */
const carts = smallPlant({
  A: [
    [0, 1, 0, 0],
    [-2, -0.1, 2, 0.1],
    [0, 0, 0, 1],
    [1, 0.05, -1, -0.05],
  ],
  B: [
    [0, 0],
    [1, 0],
    [0, 0],
    [0, 0.5],
  ],
  C: [
    [1, 0, 0, 0],
    [0, 0, 1, 0],
  ],
});
const real = (...values: number[]): PoleEntry[] => values.map((value) => ({ kind: "real", value }));
const { version, observer, reference, test: experiments, reasons } = defaultRecipe(carts);
const placing = (changes: Partial<Extract<Recipe, { method: "poles" }>>): Recipe => ({
  ...{ version, observer, reference, test: experiments, reasons },
  method: "poles",
  poles: real(-4, -5, -6, -7),
  ...changes,
});

describe("a recipe that repeats a pole beyond what the inputs allow", () => {
  test("is refused, and the words offer both ways on", () => {
    const { gains } = computeDesign(carts, placing({ poles: real(-5, -5, -5, -6) }));
    if (gains.state !== "refused") throw new Error("expected a refusal");
    expect(gains.code).toBe("pole-multiplicity");
    const { nextStep } = explainRefusal("pole-multiplicity", gains.data, carts);
    expect(nextStep).toMatch(/Spread the repeated poles/);
    expect(nextStep).toMatch(/allow dependent eigenvectors/);
  });

  test("is computed where it allows dependent eigenvectors, and says that it has them and how far the poles are off", () => {
    const { gains, poles } = computeDesign(carts, placing({ poles: real(-5, -5, -5, -6), allowDefective: true }));
    if (gains.state !== "computed" || poles.state !== "computed") throw new Error("expected gains and poles");
    expect(gains.value.eigenvectorCondition).toBeNull();
    expect(gains.value.poleShiftPerGainDigit).toBeNull();
    expect(gains.value.poleError).toBeGreaterThan(0);
    expect(gains.value.poleError).toBeLessThan(1e-3);
    for (const { pole } of poles.value) expect(Math.hypot(pole.re + 5.25, pole.im)).toBeLessThan(1);
  });

  test("does so for the observer too, of full and of reduced order", () => {
    const kinds = [
      { kind: "poles", poles: real(-8, -8, -8, -9) },
      { kind: "reduced", poles: real(-8, -8) },
    ] as const;
    const oneSensor = smallPlant({ A: carts.A, B: carts.B, C: [[1, 0, 0, 0]] });
    const cases = [
      [carts, kinds[0]],
      [oneSensor, { ...kinds[1], poles: real(-8, -8, -8) }],
    ] as const;
    for (const [plant, wanted] of cases) {
      const refused = computeDesign(plant, placing({ observer: wanted })).observer;
      expect(refused).toMatchObject({ state: "refused", code: "pole-multiplicity", data: { of: "observer" } });
      const allowed = computeDesign(plant, placing({ observer: { ...wanted, allowDefective: true } })).observer;
      expect(allowed.state).toBe("computed");
    }
  });
});

test("the schema takes the permission where poles are wanted, and only as a plain yes", () => {
  const permitted = placing({ allowDefective: true, observer: { kind: "poles", poles: real(-8), allowDefective: true } });
  expect(RecipeSchema.parse(permitted)).toEqual(permitted);
  expect(RecipeSchema.safeParse({ ...permitted, allowDefective: "yes" }).success).toBe(false);
  expect(RecipeSchema.safeParse({ ...defaultRecipe(carts), allowDefective: true }).success).toBe(false);
});

test("the evidence of placed poles carries gain norm and shift per gain digit, in the shape the API gives", () => {
  const { gains } = computeDesign(carts, placing({}));
  if (gains.state !== "computed") throw new Error("expected gains");
  const { K, gainNorm, poleShiftPerGainDigit } = GainEvidence.parse(gains.value);
  const frobenius = Math.sqrt(K.flat().reduce((sum, entry) => sum + entry * entry, 0));
  expect(gainNorm).toBeLessThanOrEqual(frobenius * (1 + 1e-12));
  expect(gainNorm).toBeGreaterThanOrEqual(frobenius / Math.SQRT2);
  expect(poleShiftPerGainDigit).toBeGreaterThan(1);
});
