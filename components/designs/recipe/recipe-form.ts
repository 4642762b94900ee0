import { defaultRecipe } from "@/control/design/default-recipe";
import type { ObserverRecipe, PoleEntry, Recipe, Weights } from "@/control/design/recipe";
import type { PlantModel, Rows } from "@/control/plant/model";
import { draftOf, type PoleDraft } from "./pole-drafts";

export type Entries = readonly (readonly string[])[];
type Numbers = readonly (number | null)[];

/** A recipe while it is being written: every alternative keeps what was typed into it, whichever is chosen. */
export type RecipeForm = {
  readonly method: Recipe["method"];
  readonly weights: {
    readonly form: Weights["form"];
    /** Largest acceptable deviation; null leaves a state unweighted. */
    readonly states: Numbers;
    readonly inputs: Numbers;
    readonly state: Entries;
    readonly input: Entries;
    /** Typed into; until then the matrices follow the deviations. */
    readonly ownMatrices: boolean;
  };
  /** Null for zero. */
  readonly cross: Entries | null;
  readonly degreeOfStability: number | null;
  readonly poles: readonly PoleDraft[];
  /** Repeated poles beyond what independent eigenvectors can hold apart, of the loop and of the observer. */
  readonly allowDefective?: { readonly loop: boolean; readonly observer: boolean };
  readonly observer: {
    readonly kind: ObserverRecipe["kind"];
    readonly poles: readonly PoleDraft[];
    readonly reduced: readonly PoleDraft[];
    readonly process: Entries;
    readonly measurement: Entries;
  };
  readonly reference: Recipe["reference"]["kind"];
  readonly test: { readonly horizon: number | null; readonly initialState: Numbers; readonly inputDisturbance: Numbers };
  readonly reasons: Readonly<Record<string, string>>;
};

export const asEntries = (rows: Rows): string[][] => rows.map((row) => row.map(String));
export const zeroEntries = (rows: number, columns: number): string[][] =>
  Array.from({ length: rows }, () => Array.from({ length: columns }, () => "0"));

export const diagonal = (values: readonly number[]): Rows =>
  values.map((value, i) => values.map((_, j) => (i === j ? value : 0)));

/** Bryson & Ho, as the solver does it: the same bits, so that a change of form alone changes no gain. */
export const weightOf = (deviation: number | null): number => (deviation === null ? 0 : 1 / (deviation * deviation));

export function matricesOf(states: Numbers, inputs: Numbers): { state: string[][]; input: string[][] } {
  return { state: asEntries(diagonal(states.map(weightOf))), input: asEntries(diagonal(inputs.map(weightOf))) };
}

let nextKey = 1;
/** Keys are for the list on the screen only and never leave the page. */
export const draftsOf = (entries: readonly PoleEntry[]): PoleDraft[] => entries.map((entry) => draftOf(entry, nextKey++));
export const blankDraft = (): PoleDraft => ({ key: nextKey++, kind: "damping", first: null, second: null });

/** A form from another visit: its keys may be those of entries on this page. */
export const rekeyed = (form: RecipeForm): RecipeForm => {
  const fresh = (drafts: readonly PoleDraft[]) => drafts.map((draft) => ({ ...draft, key: nextKey++ }));
  const { poles, observer } = form;
  return {
    ...form,
    poles: fresh(poles),
    observer: { ...observer, poles: fresh(observer.poles), reduced: fresh(observer.reduced) },
  };
};

/**
 * Noise to start from: each state is pushed by a tenth of its largest acceptable deviation, each output wavers by a hundredth of its own.
 */
function startingNoise(model: PlantModel): { process: Rows; measurement: Rows } {
  const square = (share: number) => (signal: { readonly scale: number | null }) =>
    Number(((share * (signal.scale ?? 1)) ** 2).toPrecision(4));
  return { process: diagonal(model.states.map(square(0.1))), measurement: diagonal(model.outputs.map(square(0.01))) };
}

export function formOf(recipe: Recipe, model: PlantModel): RecipeForm {
  const start = defaultRecipe(model);
  const given = recipe.method === "weights" ? recipe.weights : start.weights;
  const listed = given.form === "deviations" ? given : start.weights;
  const deviations = listed.form === "deviations" ? listed : { states: [], inputs: [] };
  const matrices =
    given.form === "matrices"
      ? { state: asEntries(given.state), input: asEntries(given.input) }
      : matricesOf(deviations.states, deviations.inputs);
  const { observer } = recipe;
  const noise = observer.kind === "noise" ? observer : startingNoise(model);
  return {
    method: recipe.method,
    weights: {
      form: given.form,
      states: deviations.states,
      inputs: deviations.inputs,
      ...matrices,
      ownMatrices: given.form === "matrices",
    },
    cross: recipe.method === "weights" && recipe.crossWeight ? asEntries(recipe.crossWeight) : null,
    degreeOfStability: recipe.method === "weights" ? recipe.degreeOfStability : null,
    poles: recipe.method === "poles" ? draftsOf(recipe.poles) : [],
    allowDefective: {
      loop: recipe.method === "poles" && recipe.allowDefective === true,
      observer: (observer.kind === "poles" || observer.kind === "reduced") && observer.allowDefective === true,
    },
    observer: {
      kind: observer.kind,
      poles: observer.kind === "poles" ? draftsOf(observer.poles) : [],
      reduced: observer.kind === "reduced" ? draftsOf(observer.poles) : [],
      process: asEntries(noise.process),
      measurement: asEntries(noise.measurement),
    },
    reference: recipe.reference.kind,
    test: recipe.test,
    reasons: recipe.reasons,
  };
}
