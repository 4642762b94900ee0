import { parseNumber } from "../../ui/parse-number";
import type { Entries, RecipeForm } from "../recipe/recipe-form";

/** What a sweep turns: the cost of all control together, or one weight. */
export type Swept = { readonly of: "effort" } | { readonly of: "state" | "input"; readonly index: number };

const STEPS_TO_A_SIDE = 5;
const STEPS_PER_DECADE = 5;
const DIGITS = 3;

/** Factors on the accepted figure, the same ratio from one to the next; the recipe as it stands is in the middle. */
export const SWEEP_FACTORS: readonly number[] = Array.from(
  { length: 2 * STEPS_TO_A_SIDE + 1 },
  (_, k) => 10 ** ((k - STEPS_TO_A_SIDE) / STEPS_PER_DECADE),
);

const rounded = (value: number) => Number(value.toPrecision(DIGITS));
const turned = (values: RecipeForm["weights"]["states"], factor: number, index: number | null) =>
  values.map((value, place) => (value !== null && (index === null || index === place) ? rounded(value * factor) : value));

/** Entries of a weight matrix go with the square of the figure; rows and columns of one signal turn together. */
function turnedEntries(entries: Entries, factor: number, index: number | null): Entries {
  return entries.map((row, r) =>
    row.map((text, c) => {
      const reading = parseNumber(text);
      const touched = index === null ? 2 : Number(r === index) + Number(c === index);
      if (touched === 0 || reading.kind !== "number" || reading.value === 0) return text;
      return String(rounded(reading.value / factor ** touched));
    }),
  );
}

/** The form with the swept figure turned by a factor: a larger figure means a cheaper deviation or effort. */
export function sweptForm(form: RecipeForm, swept: Swept, factor: number): RecipeForm {
  if (factor === 1) return form;
  const { weights } = form;
  const side = swept.of === "state" ? "state" : "input";
  const list = side === "state" ? "states" : "inputs";
  const index = swept.of === "effort" ? null : swept.index;
  const changed =
    weights.form === "deviations"
      ? { [list]: turned(weights[list], factor, index) }
      : { [side]: turnedEntries(weights[side], factor, index), ownMatrices: true };
  return { ...form, weights: { ...weights, ...changed } };
}
