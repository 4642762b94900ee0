import { advance, type History, startHistory } from "../../matrix/history";
import type { RecipeForm } from "./recipe-form";

/** `place`: where the last change was made, a JSON pointer; null after anything but a change. */
export type RecipeHistory = { readonly history: History<RecipeForm>; readonly place: string | null };

export const startRecipe = (form: RecipeForm): RecipeHistory => ({ history: startHistory(form), place: null });

/** Keystrokes in one place are one step that can be undone; a change without a place is a step of its own. */
export function changeRecipe({ history, place }: RecipeHistory, at: string | null, next: RecipeForm): RecipeHistory {
  if (Object.is(next, history.present)) return { history, place };
  if (at !== null && place === at) return { history: { ...history, present: next, future: [] }, place };
  return { history: advance(history, next), place: at };
}

/** A step back or forward; what is typed next is a step of its own wherever it is typed. */
export const stepRecipe = (
  { history }: RecipeHistory,
  by: (history: History<RecipeForm>) => History<RecipeForm>,
): RecipeHistory => ({ history: by(history), place: null });
