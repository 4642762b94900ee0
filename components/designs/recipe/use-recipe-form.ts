"use client";

import { useCallback, useState } from "react";
import { advance, type History, startHistory, stepBack, stepForward } from "../../matrix/history";
import type { RecipeForm } from "./recipe-form";

type State = { readonly history: History<RecipeForm>; readonly place: string | null };

/** Changes a form at a place, a JSON pointer: keystrokes in one field are one step that can be undone. Null is a step of its own. */
export type ChangeRecipe = (place: string | null, update: (form: RecipeForm) => RecipeForm) => void;

function changed({ history, place }: State, at: string | null, next: RecipeForm): State {
  if (Object.is(next, history.present)) return { history, place };
  if (at !== null && place === at) return { history: { ...history, present: next, future: [] }, place };
  return { history: advance(history, next), place: at };
}

/** The recipe being written, with undo and redo over the whole of it. */
export function useRecipeForm(start: RecipeForm) {
  const [state, setState] = useState<State>(() => ({ history: startHistory(start), place: null }));
  const { past, present, future } = state.history;
  const change = useCallback<ChangeRecipe>(
    (place, update) => setState((now) => changed(now, place, update(now.history.present))),
    [],
  );
  const step = useCallback(
    (by: typeof stepBack<RecipeForm>) => setState(({ history }) => ({ history: by(history), place: null })),
    [],
  );
  return {
    form: present,
    change,
    /** Starts over, for example from what the server keeps. */
    reset: useCallback((form: RecipeForm) => setState({ history: startHistory(form), place: null }), []),
    undo: useCallback(() => step(stepBack), [step]),
    redo: useCallback(() => step(stepForward), [step]),
    canUndo: past.length > 0,
    canRedo: future.length > 0,
  };
}
