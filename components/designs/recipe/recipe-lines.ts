import type { PoleEntry, Recipe, WeightsRecipe } from "@/control/design/recipe";
import type { PlantModel, Rows, TimeBase } from "@/control/plant/model";
import { formatNumber } from "@/control/words/format-number";
import type { Measured } from "../measured";
import { noiseUnit, weightUnit } from "../unit-text";
import { weightOf } from "./recipe-form";
import { METHOD_WORDS, OBSERVER_WORDS, poleEntryFigures, poleEntryText, reasonPlace } from "./recipe-words";

/** The sections that facts stand in, in the order they are read. */
export const RECIPE_SECTIONS = [
  "Method",
  "Largest deviation accepted",
  "Effort accepted",
  "State weight",
  "Input weight",
  "Cross weight",
  "Wanted poles",
  "Observer",
  "Noise on the states",
  "Noise of the measurement",
  "Test",
  "Reasons",
] as const;
type Section = (typeof RECIPE_SECTIONS)[number];

/** One fact of a recipe. Facts of two recipes with the same key are about the same thing. */
export type RecipeLine = {
  readonly section: Section;
  readonly key: string;
  readonly label: string;
  readonly text: string;
  /** Decides whether two facts differ: what the text rounds off counts too. */
  readonly exact: string;
  readonly axis?: number | null;
  /** Prose, to be read across; the rest are figures. */
  readonly prose?: boolean;
  /** The same as numbers, where it is one: what a file holds. */
  readonly data?: readonly Measured[];
};

type Signal = { readonly name: string; readonly unit: string; readonly axis: number | null };

const withUnit = (value: number, unit: string) => (unit ? `${formatNumber(value)} ${unit}` : formatNumber(value));
/** A number with its unit, as it is read and as it is. */
const measured = (value: number, unit: string) => ({
  text: withUnit(value, unit),
  exact: String(value),
  data: [{ what: "", unit: unit || "1", value }],
});
const poleEntry = (entry: PoleEntry, timeBase: TimeBase) => ({
  text: poleEntryText(entry, timeBase),
  exact: JSON.stringify(entry),
  data: poleEntryFigures(entry, timeBase),
});

function deviationLines({ weights }: WeightsRecipe, { states, inputs }: PlantModel): RecipeLine[] {
  if (weights.form !== "deviations") return [];
  const line = (section: Section, { name, unit, axis }: Signal, value: number | null): RecipeLine => ({
    section,
    key: `${section} ${name}`,
    label: name,
    axis,
    ...(value === null ? { text: "not weighted", exact: String(value) } : measured(value, unit)),
  });
  return [
    ...states.map((signal, i) => line("Largest deviation accepted", signal, weights.states[i] ?? null)),
    ...inputs.map((signal, j) => line("Effort accepted", signal, weights.inputs[j] ?? null)),
  ];
}

/** Diagonal entries, and those off the diagonal that are not zero. */
function matrixLines(
  section: Section,
  matrix: Rows,
  rows: readonly Signal[],
  columns: readonly Signal[],
  unit: (row: string, column: string) => string,
): RecipeLine[] {
  const square = rows === columns;
  return rows.flatMap((row, i) =>
    columns.flatMap((column, j) => {
      const value = matrix[i]?.[j] ?? 0;
      if (square ? j < i || (i !== j && value === 0) : value === 0) return [];
      const label = square && i === j ? row.name : `${row.name}, ${column.name}`;
      const axis = row.axis === column.axis ? row.axis : null;
      return [{ section, key: `${section} ${label}`, label, axis, ...measured(value, unit(row.unit, column.unit)) }];
    }),
  );
}

/** The weights as matrices, whichever form they were written in. */
export function weightMatrixLines(recipe: WeightsRecipe, { states, inputs }: PlantModel): RecipeLine[] {
  const { weights } = recipe;
  const onDiagonal = (values: readonly (number | null)[]) =>
    values.map((value, i) => values.map((_, j) => (i === j ? weightOf(value) : 0)));
  const [state, input] =
    weights.form === "matrices" ? [weights.state, weights.input] : [onDiagonal(weights.states), onDiagonal(weights.inputs)];
  return [
    ...matrixLines("State weight", state, states, states, weightUnit),
    ...matrixLines("Input weight", input, inputs, inputs, weightUnit),
  ];
}

function methodLines(recipe: Recipe, model: PlantModel, asMatrices: boolean): RecipeLine[] {
  const method: RecipeLine = {
    section: "Method",
    key: "method",
    label: "method",
    text: METHOD_WORDS[recipe.method],
    exact: recipe.method,
  };
  if (recipe.method === "poles") {
    const poles = recipe.poles.map(
      (entry, k): RecipeLine => ({
        section: "Wanted poles",
        key: `wanted ${k}`,
        label: `entry ${k + 1}`,
        ...poleEntry(entry, model.timeBase),
      }),
    );
    return [method, ...poles, ...defectiveLines("Wanted poles", recipe)];
  }
  const { degreeOfStability: degree, crossWeight } = recipe;
  const stability: RecipeLine = {
    section: "Method",
    key: "stability",
    label: "degree of stability",
    ...(degree === null ? { text: "not asked for", exact: String(degree) } : measured(degree, "1/s")),
  };
  const weights =
    asMatrices || recipe.weights.form === "matrices" ? weightMatrixLines(recipe, model) : deviationLines(recipe, model);
  const cross = crossWeight ? matrixLines("Cross weight", crossWeight, model.states, model.inputs, weightUnit) : [];
  return [method, stability, ...weights, ...cross];
}

function observerLines({ observer }: Recipe, { states, outputs, timeBase }: PlantModel): RecipeLine[] {
  const section = "Observer";
  const kind: RecipeLine = {
    section,
    key: "observer",
    label: "observer",
    text: OBSERVER_WORDS[observer.kind],
    exact: observer.kind,
  };
  if (observer.kind === "none") return [kind];
  if (observer.kind === "noise") {
    const sampled = timeBase.kind === "sampled";
    const process = (row: string, column: string) => noiseUnit(row, column, "rate", sampled);
    const measured = (row: string, column: string) => noiseUnit(row, column, "value", sampled);
    return [
      kind,
      ...matrixLines("Noise on the states", observer.process, states, states, process),
      ...matrixLines("Noise of the measurement", observer.measurement, outputs, outputs, measured),
    ];
  }
  const poles = observer.poles.map(
    (entry, k): RecipeLine => ({
      section,
      key: `observer ${k}`,
      label: `observer pole entry ${k + 1}`,
      ...poleEntry(entry, timeBase),
    }),
  );
  return [kind, ...poles, ...defectiveLines(section, observer)];
}

/** Said only where it was asked for. */
function defectiveLines(section: RecipeLine["section"], { allowDefective }: { readonly allowDefective?: true }): RecipeLine[] {
  if (!allowDefective) return [];
  return [{ section, key: `${section} defective`, label: "dependent eigenvectors", text: "allowed", exact: "true" }];
}

function testLines({ reference, test }: Recipe, { states, inputs }: PlantModel): RecipeLine[] {
  const section = "Test";
  const value = (what: string, { name, unit, axis }: Signal, size: number): RecipeLine => ({
    section,
    key: `${what} ${name}`,
    label: `${what} ${name}`,
    axis,
    ...measured(size, unit),
  });
  const followed = reference.kind === "feed-through";
  return [
    { section: "Method", key: "reference", label: "reference", text: followed ? "feed-through" : "none", exact: reference.kind },
    {
      section,
      key: "horizon",
      label: "length of the responses",
      ...(test.horizon === null
        ? { text: "chosen from the settling", exact: String(test.horizon) }
        : measured(test.horizon, "s")),
    },
    ...states.map((signal, i) => value("initial state", signal, test.initialState[i] ?? 0)),
    ...inputs.map((signal, j) => value("disturbance of", signal, test.inputDisturbance[j] ?? 0)),
  ];
}

/** Everything a recipe says, in the order it is read. `asMatrices` writes accepted deviations as the weights they stand for. */
export function recipeLines(recipe: Recipe, model: PlantModel, asMatrices = false): RecipeLine[] {
  const reasons = Object.entries(recipe.reasons).map(([key, text]): RecipeLine => {
    const place = reasonPlace(key, model);
    return { section: "Reasons", key: `reason ${place}`, label: place, text, exact: text, prose: true };
  });
  return [...methodLines(recipe, model, asMatrices), ...observerLines(recipe, model), ...testLines(recipe, model), ...reasons];
}

export type RecipeDifference = {
  readonly key: string;
  readonly place: string;
  readonly before: string | null;
  readonly after: string | null;
};

type Sided = { readonly recipe: Recipe; readonly model: PlantModel };

/** What differs between two recipes, place by place, in the signals' own names. */
export function recipeDifferences(before: Sided, after: Sided): RecipeDifference[] {
  const [old, now] = [before, after].map(({ recipe, model }) => recipeLines(recipe, model));
  const was = new Map(old.map((line) => [line.key, line]));
  const is = new Map(now.map((line) => [line.key, line]));
  const keys = [...new Set([...was.keys(), ...is.keys()])];
  return keys.flatMap((key) => {
    const [a, b] = [was.get(key), is.get(key)];
    if (a?.exact === b?.exact) return [];
    const { section, label } = (b ?? a) as RecipeLine;
    // Rounded alike though different: both are then given in full.
    const full = a?.text === b?.text;
    const shown = (line: RecipeLine | undefined) => (line ? (full ? line.exact : line.text) : null);
    return [{ key, place: section === "Method" ? label : `${section}: ${label}`, before: shown(a), after: shown(b) }];
  });
}
