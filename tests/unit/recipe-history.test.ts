import { expect, test } from "vitest";
import { formOf, type RecipeForm } from "@/components/designs/recipe/recipe-form";
import { changeRecipe, startRecipe, stepRecipe } from "@/components/designs/recipe/recipe-history";
import { stepBack, stepForward } from "@/components/matrix/history";
import { defaultRecipe } from "@/control/design/default-recipe";
import { coupledModel } from "../helpers/coupled-model";
import { seededUniform } from "../helpers/seeded";

const model = coupledModel();
const start = formOf(defaultRecipe(model), model);

/** One change of any part of the bench, and its place. */
function anyChange(draw: () => number, form: RecipeForm): readonly [string | null, RecipeForm] {
  const value = Number((10 ** (4 * draw() - 2)).toPrecision(3));
  const state = Math.floor(draw() * form.weights.states.length);
  const [row, column] = [Math.floor(draw() * model.states.length), Math.floor(draw() * model.states.length)];
  const states = form.weights.states.map((old, i) => (i === state ? value : old));
  const process = form.observer.process.map((entries, i) =>
    entries.map((old, j) => (i === row && j === column ? `${value}` : old)),
  );
  const kinds = ["none", "poles", "noise", "reduced"] as const;
  const choices: readonly (readonly [string | null, RecipeForm])[] = [
    [`/weights/states/${state}`, { ...form, weights: { ...form.weights, states } }],
    [null, { ...form, method: form.method === "weights" ? "poles" : "weights" }],
    ["/degreeOfStability", { ...form, degreeOfStability: value }],
    [null, { ...form, observer: { ...form.observer, process } }],
    [null, { ...form, observer: { ...form.observer, kind: kinds[Math.floor(draw() * kinds.length)] } }],
    ["/test/horizon", { ...form, test: { ...form.test, horizon: value } }],
    ["/reasons/weights", { ...form, reasons: { ...form.reasons, weights: `for ${value}` } }],
  ];
  return choices[Math.floor(draw() * choices.length)];
}

test("a hundred random changes over the whole bench can all be taken back and all be done again", () => {
  const draw = seededUniform(20);
  let now = startRecipe(start);
  for (let step = 0; step < 100; step++) now = changeRecipe(now, ...anyChange(draw, now.history.present));
  const end = now.history.present;
  const steps = now.history.past.length;
  expect(steps).toBeGreaterThanOrEqual(50);
  expect(end).not.toEqual(start);
  for (let step = 0; step < steps; step++) now = stepRecipe(now, stepBack);
  expect(now.history.present).toBe(start);
  for (let step = 0; step < steps; step++) now = stepRecipe(now, stepForward);
  expect(now.history.present).toBe(end);
});

test("keystrokes in one field are one step, and after an undo the same field begins a new one", () => {
  const typed = (horizon: number) => ({ ...start, test: { ...start.test, horizon } });
  let now = startRecipe(start);
  for (const horizon of [1, 12, 123]) now = changeRecipe(now, "/test/horizon", typed(horizon));
  expect(now.history.past).toEqual([start]);
  now = stepRecipe(stepRecipe(now, stepBack), stepForward);
  now = changeRecipe(now, "/test/horizon", typed(4));
  expect(now.history.past.map(({ test }) => test.horizon)).toEqual([start.test.horizon, 123]);
});
