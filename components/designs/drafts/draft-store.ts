import type { PlantModel } from "@/control/plant/model";
import type { RecipeForm } from "../recipe/recipe-form";

/** What stands on the bench and is not saved. */
export type Unsaved = {
  readonly form: RecipeForm;
  readonly plantRevisionId: string;
  /** Version and newest revision of the design that the edit started from; null for a new one. */
  readonly base: { readonly version: number; readonly revisionId: string } | null;
};

/** Unsaved work that came back: from this browser's storage, or as the server keeps it. */
export type RecipeDraft = Unsaved & { readonly at: string; readonly where: "browser" | "server" };

/** The copy in the browser's storage, and what it knows of the server's: see `AutosaveStatus`. */
export type LocalDraft = RecipeDraft & { readonly marks: readonly string[]; readonly synced: boolean };

type Stored = Unsaved & {
  readonly version: 1;
  readonly at: string;
  readonly marks?: readonly string[];
  readonly synced?: boolean;
};

export const draftKey = (teamId: string, userId: string, what: string) => `gainwright:design:${teamId}:${userId}:${what}`;

export function readLocalDraft(key: string): LocalDraft | null {
  try {
    const text = localStorage.getItem(key);
    const stored = text === null ? null : (JSON.parse(text) as Stored);
    if (stored?.version !== 1) return null;
    const { form, plantRevisionId, base, at, marks = [], synced = false } = stored;
    return { form, plantRevisionId, base, at, marks, synced, where: "browser" };
  } catch {
    return null; // storage switched off or not ours: the page works without it
  }
}

/** False where the browser keeps nothing. */
export function keepLocalDraft(key: string, draft: Omit<LocalDraft, "where"> | null): boolean {
  try {
    if (draft) localStorage.setItem(key, JSON.stringify({ ...draft, version: 1 } satisfies Stored));
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
