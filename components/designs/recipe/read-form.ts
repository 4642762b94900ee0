import { parseNumber } from "@/components/ui/parse-number";
import type { ObserverRecipe, PoleEntry, Recipe } from "@/control/design/recipe";
import { type RecipeProblem, recipeProblems } from "@/control/design/recipe-problems";
import type { PlantModel } from "@/control/plant/model";
import { entryOf, POLE_FIGURES, type PoleDraft } from "./pole-drafts";
import type { Entries, RecipeForm } from "./recipe-form";

export type FormReading = { readonly recipe: Recipe | null; readonly problems: readonly RecipeProblem[] };
type Named = { readonly name: string };

/** The recipe that a form holds, or what is wrong with it, each at its pointer into the recipe. */
export function readForm(form: RecipeForm, model: PlantModel): FormReading {
  const problems: RecipeProblem[] = [];
  const recipe = new Reader(model, problems).recipe(form);
  const all = problems.length > 0 ? problems : recipeProblems(recipe, model);
  return all.length > 0 ? { recipe: null, problems: all } : { recipe, problems: [] };
}

class Reader {
  constructor(
    private readonly model: PlantModel,
    private readonly problems: RecipeProblem[],
  ) {}

  recipe(form: RecipeForm): Recipe {
    const base = {
      version: 1 as const,
      observer: this.observer(form.observer, form.allowDefective?.observer ?? false),
      reference: { kind: form.reference },
      test: this.test(form.test),
      reasons: writtenReasons(form.reasons),
    };
    if (form.method === "poles")
      return {
        ...base,
        method: "poles",
        poles: this.poles("/poles", form.poles),
        ...defective(form.allowDefective?.loop ?? false),
      };
    return {
      ...base,
      method: "weights",
      weights: this.weights(form.weights),
      crossWeight: form.cross && this.matrix("/crossWeight", form.cross, this.model.states, this.model.inputs),
      degreeOfStability: this.degree(form.degreeOfStability),
    };
  }

  private fail(pointer: string, message: string): void {
    this.problems.push({ pointer, message });
  }

  private weights({ form, states, inputs, state, input }: RecipeForm["weights"]) {
    const { model } = this;
    if (form === "matrices") {
      return {
        form,
        state: this.matrix("/weights/state", state, model.states, model.states),
        input: this.matrix("/weights/input", input, model.inputs, model.inputs),
      };
    }
    states.forEach((value, i) => {
      if (value === null || value > 0) return;
      this.fail(
        `/weights/states/${i}`,
        `The largest deviation of ${model.states[i]?.name} must be above zero; leave it empty for no weight`,
      );
    });
    const efforts = inputs.map((value, j) => {
      if (value === null || !(value > 0))
        this.fail(`/weights/inputs/${j}`, `Say how much of ${model.inputs[j]?.name} you accept, above zero`);
      return value ?? 0;
    });
    return { form, states, inputs: efforts };
  }

  private degree(value: number | null): number | null {
    if (value !== null && value < 0) this.fail("/degreeOfStability", "A degree of stability is zero or more");
    return value;
  }

  private matrix(pointer: string, entries: Entries, rows: readonly Named[], columns: readonly Named[]): number[][] {
    return entries.map((row, i) =>
      row.map((text, j) => {
        const reading = parseNumber(text);
        if (reading.kind === "number") return reading.value;
        if (reading.kind !== "empty")
          this.fail(`${pointer}/${i}/${j}`, `The entry ${rows[i]?.name}, ${columns[j]?.name} is not a number: ${text}`);
        return 0;
      }),
    );
  }

  private poles(pointer: string, drafts: readonly PoleDraft[]): PoleEntry[] {
    return drafts.flatMap((draft, k) => {
      const given = [draft.first, draft.second];
      let right = true;
      POLE_FIGURES[draft.kind].forEach(({ field, label, positive }, index) => {
        const value = given[index];
        if (value !== null && (!positive || value > 0)) return;
        right = false;
        this.fail(
          `${pointer}/${k}/${field}`,
          `${label} of entry ${k + 1} ${value === null ? "is missing" : "must be above zero"}`,
        );
      });
      const entry = right ? entryOf(draft) : null;
      return entry ? [entry] : [];
    });
  }

  private observer({ kind, poles, reduced, process, measurement }: RecipeForm["observer"], allowed: boolean): ObserverRecipe {
    const { states, outputs } = this.model;
    if (kind === "none") return { kind };
    if (kind === "poles") return { kind, poles: this.poles("/observer/poles", poles), ...defective(allowed) };
    if (kind === "reduced") return { kind, poles: this.poles("/observer/poles", reduced), ...defective(allowed) };
    return {
      kind,
      process: this.matrix("/observer/process", process, states, states),
      measurement: this.matrix("/observer/measurement", measurement, outputs, outputs),
    };
  }

  private test({ horizon, initialState, inputDisturbance }: RecipeForm["test"]): Recipe["test"] {
    if (horizon !== null && !(horizon > 0))
      this.fail("/test/horizon", "The length of the responses must be above zero; leave it empty to have it chosen");
    return {
      horizon,
      initialState: initialState.map((value) => value ?? 0),
      inputDisturbance: inputDisturbance.map((value) => value ?? 0),
    };
  }
}

const defective = (allowed: boolean): { allowDefective?: true } => (allowed ? { allowDefective: true } : {});

const writtenReasons = (reasons: RecipeForm["reasons"]) =>
  Object.fromEntries(Object.entries(reasons).flatMap(([key, text]) => (text.trim() === "" ? [] : [[key, text.trim()]])));

/** Equal texts for equal recipes, whatever the order their fields came in. */
export function recipeKey(recipe: Recipe): string {
  return JSON.stringify(recipe, (_, value: unknown) =>
    typeof value === "object" && value !== null && !Array.isArray(value)
      ? Object.fromEntries(Object.entries(value).toSorted(([a], [b]) => (a < b ? -1 : 1)))
      : value,
  );
}
