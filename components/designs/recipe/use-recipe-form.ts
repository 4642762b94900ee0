"use client";

import { useCallback, useState } from "react";
import { stepBack, stepForward } from "../../matrix/history";
import type { RecipeForm } from "./recipe-form";
import { changeRecipe, startRecipe, stepRecipe } from "./recipe-history";

/** Changes a form at a place, a JSON pointer: keystrokes in one field are one step that can be undone. Null is a step of its own. */
export type ChangeRecipe = (place: string | null, update: (form: RecipeForm) => RecipeForm) => void;

/** The recipe being written, with undo and redo over the whole of it. */
export function useRecipeForm(start: RecipeForm) {
  const [state, setState] = useState(() => startRecipe(start));
  const { past, present, future } = state.history;
  return {
    form: present,
    change: useCallback<ChangeRecipe>(
      (place, update) => setState((now) => changeRecipe(now, place, update(now.history.present))),
      [],
    ),
    /** Starts over, for example from what the server keeps. */
    reset: useCallback((form: RecipeForm) => setState(startRecipe(form)), []),
    undo: useCallback(() => setState((now) => stepRecipe(now, stepBack)), []),
    redo: useCallback(() => setState((now) => stepRecipe(now, stepForward)), []),
    canUndo: past.length > 0,
    canRedo: future.length > 0,
  };
}
