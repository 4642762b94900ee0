import { afterAll, expect, test } from "vitest";
import { computeDesign } from "@/control/design/compute-design";
import type { WeightsRecipe } from "@/control/design/recipe";
import { checkPlant } from "@/control/plant/check-plant";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import { closeNumericPool, runNumeric } from "@/lib/jobs/run-numeric";
import { twoCarriages } from "../helpers/plant-content";
import { smallPlant } from "../helpers/small-plant";

afterAll(closeNumericPool);

const model = smallPlant({
  A: [
    [0, 1, 0, 0],
    [-2, -0.1, 1, 0],
    [0, 0, 0, 1],
    [1, 0, -3, -0.2],
  ],
  B: [
    [0, 0],
    [1, 0],
    [0, 0],
    [0, 1],
  ],
  C: [
    [1, 0, 0, 0],
    [0, 0, 1, 0],
  ],
});
const recipe: WeightsRecipe = {
  version: 1,
  method: "weights",
  weights: { form: "deviations", states: [1, null, 1, null], inputs: [0.5, 0.5] },
  crossWeight: null,
  degreeOfStability: null,
  observer: { kind: "none" },
  reference: { kind: "feed-through" },
  test: { horizon: 5, initialState: [0.1, 0, 0, 0], inputDisturbance: [1, 0] },
  reasons: {},
};
const team = { teamId: "team-1" };

test("a design computed by a thread has the bits of one computed here, curves included", async () => {
  const evidence = await runNumeric({ kind: "design", model, recipe }, team);
  expect(evidence).toEqual(computeDesign(model, recipe));
  const { responses } = evidence;
  if (responses.state !== "computed") throw new Error("the responses were refused");
  expect(responses.value.records.length).toBeGreaterThan(0);
  for (const { values } of responses.value.records) expect(values).toBeInstanceOf(Float64Array);
});

test("checks computed by a thread are those computed here", async () => {
  expect(await runNumeric({ kind: "checks", model }, team)).toEqual(checkPlant(model));
});

test("a plant as typed, evaluated by a thread, has the bits of one evaluated here, and the same problems", async () => {
  const content = twoCarriages();
  const { model, problems } = evaluatePlant(content);
  expect(await runNumeric({ kind: "evaluation", content }, team)).toEqual({ model, problems });
  const wrong = twoCarriages({ A: [["m*", "0", "1", "0"], ...content.A.slice(1)] });
  expect(await runNumeric({ kind: "evaluation", content: wrong }, team)).toEqual({
    model: null,
    problems: evaluatePlant(wrong).problems,
  });
});
