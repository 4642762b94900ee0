import { defaultRecipe } from "@/control/design/default-recipe";
import type { ObserverRecipe, Recipe, Weights } from "@/control/design/recipe";
import type { PlantModel, Rows } from "@/control/plant/model";
import { weightOf } from "./recipe-form";

type Named = { readonly name: string };
/** For each signal of the new plant its place in the old one, or null. */
type Origins = readonly (number | null)[];

const originsOf = (from: readonly Named[], to: readonly Named[]): Origins =>
  to.map(({ name }) => {
    const place = from.findIndex((signal) => signal.name === name);
    return place < 0 ? null : place;
  });

const picked = <T>(values: readonly T[], origins: Origins, otherwise: (place: number) => T): T[] =>
  origins.map((origin, place) => (origin === null ? otherwise(place) : (values[origin] ?? otherwise(place))));

/** Entries go with their signals; `own` is what a new signal has on the diagonal. */
const remapped = (rows: Rows, down: Origins, across: Origins, own: (place: number) => number): Rows =>
  down.map((r, i) => across.map((c, j) => (r === null || c === null ? (i === j ? own(i) : 0) : (rows[r]?.[c] ?? 0))));

/**
 * A recipe taken over to another revision of its plant: signals are matched by name, new ones get what a new design would give
 * them. Poles stay as they are; where their number no longer fits, the recipe says so at the field.
 */
export function carryRecipe(recipe: Recipe, from: PlantModel, to: PlantModel): Recipe {
  const x = originsOf(from.states, to.states);
  const u = originsOf(from.inputs, to.inputs);
  const y = originsOf(from.outputs, to.outputs);
  const { test: newTest, weights: newWeights } = defaultRecipe(to);
  const start = newWeights.form === "deviations" ? newWeights : { states: [], inputs: [] };
  const base = {
    ...recipe,
    observer: carriedObserver(recipe.observer, to, x, y),
    test: {
      horizon: recipe.test.horizon,
      initialState: picked(recipe.test.initialState, x, (place) => newTest.initialState[place]),
      inputDisturbance: picked(recipe.test.inputDisturbance, u, (place) => newTest.inputDisturbance[place]),
    },
    reasons: carriedReasons(recipe.reasons, { state: x, input: u }),
  };
  if (base.method === "poles") return base;
  return {
    ...base,
    weights: carriedWeights(base.weights, start, x, u),
    crossWeight: base.crossWeight && remapped(base.crossWeight, x, u, () => 0),
  };
}

type Start = { readonly states: readonly (number | null)[]; readonly inputs: readonly number[] };

function carriedWeights(weights: Weights, start: Start, x: Origins, u: Origins): Weights {
  if (weights.form === "deviations") {
    return {
      form: "deviations",
      // A state left unweighted on purpose stays so; null is a value here.
      states: x.map((origin, place) => (origin === null ? start.states[place] : weights.states[origin])),
      inputs: picked(weights.inputs, u, (place) => start.inputs[place]),
    };
  }
  return {
    form: "matrices",
    state: remapped(weights.state, x, x, (place) => weightOf(start.states[place])),
    input: remapped(weights.input, u, u, (place) => weightOf(start.inputs[place])),
  };
}

function carriedObserver(observer: ObserverRecipe, to: PlantModel, x: Origins, y: Origins): ObserverRecipe {
  if (observer.kind !== "noise") return observer;
  return {
    kind: "noise",
    process: remapped(observer.process, x, x, () => 0),
    measurement: remapped(observer.measurement, y, y, (place) => (0.01 * (to.outputs[place].scale ?? 1)) ** 2),
  };
}

/** Reasons beside a signal, `state:2`, follow it to its new place; those of signals that are gone stay behind. */
function carriedReasons(reasons: Recipe["reasons"], origins: Readonly<Record<string, Origins>>): Record<string, string> {
  return Object.fromEntries(
    Object.entries(reasons).flatMap(([key, text]) => {
      const [list, place] = key.split(":");
      if (place === undefined || !Object.hasOwn(origins, list)) return [[key, text]];
      const now = origins[list].indexOf(Number(place));
      return now < 0 ? [] : [[`${list}:${now}`, text]];
    }),
  );
}
