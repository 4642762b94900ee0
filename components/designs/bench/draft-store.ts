import type { PlantModel } from "@/control/plant/model";
import type { RecipeForm } from "../recipe/recipe-form";

/** A recipe that is not saved yet, in the browser's storage. */
export type RecipeDraft = {
  readonly version: 1;
  readonly form: RecipeForm;
  readonly plantRevisionId: string;
  /** Version and revision of the design that the edit started from; null for a new one. */
  readonly base: { readonly version: number; readonly revisionId: string } | null;
  readonly at: string;
};

export const draftKey = (teamId: string, userId: string, what: string) => `gainwright:design:${teamId}:${userId}:${what}`;

export function readDraft(key: string): RecipeDraft | null {
  try {
    const text = localStorage.getItem(key);
    const draft = text === null ? null : (JSON.parse(text) as RecipeDraft);
    return draft?.version === 1 ? draft : null;
  } catch {
    return null; // storage switched off or not ours: the page works without it
  }
}

/** False where the browser keeps nothing; leaving the page still asks first. */
export function keepDraft(key: string, draft: RecipeDraft | null): boolean {
  try {
    if (draft) localStorage.setItem(key, JSON.stringify(draft));
    else localStorage.removeItem(key);
    return true;
  } catch {
    return false;
  }
}

/** Whether a kept form is of this plant's shape: another release, or another revision, may have written it. */
export function fitsPlant(form: RecipeForm, { states, inputs, outputs }: PlantModel): boolean {
  try {
    const square = (entries: readonly (readonly string[])[], size: number) =>
      entries.length === size && entries.every((row) => row.length === size);
    const { weights, observer, test } = form;
    return (
      weights.states.length === states.length &&
      weights.inputs.length === inputs.length &&
      square(weights.state, states.length) &&
      square(weights.input, inputs.length) &&
      (form.cross === null || (form.cross.length === states.length && form.cross.every((row) => row.length === inputs.length))) &&
      Array.isArray(form.poles) &&
      Array.isArray(observer.poles) &&
      Array.isArray(observer.reduced) &&
      square(observer.process, states.length) &&
      square(observer.measurement, outputs.length) &&
      test.initialState.length === states.length &&
      test.inputDisturbance.length === inputs.length &&
      typeof form.reasons === "object"
    );
  } catch {
    return false; // a field is missing altogether
  }
}
