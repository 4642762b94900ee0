"use client";

import { createContext, useContext } from "react";
import type { PlantModel } from "@/control/plant/model";
import type { RecipeForm } from "./recipe-form";
import type { ChangeRecipe } from "./use-recipe-form";

export type RecipeEditing = {
  readonly form: RecipeForm;
  /** What the page started from: the stored recipe, or the one proposed for a new design. */
  readonly start: RecipeForm;
  readonly model: PlantModel;
  /** What doubling a weight is predicted to change, by `state:2` or `input:0`. */
  readonly weightLines: ReadonlyMap<string, string>;
  readonly change: ChangeRecipe;
  readonly undo: () => void;
  readonly redo: () => void;
  /** What is wrong at a place of the recipe or below it. */
  readonly problemAt: (pointer: string) => string | undefined;
  /** Cells of a matrix of the recipe at fault, keyed "r,c". */
  readonly cellProblems: (pointer: string) => ReadonlyMap<string, string>;
  /** Told by a field whose text is no number, so that the recipe is not sent without it. */
  readonly setUsable: (pointer: string, usable: boolean) => void;
};

/** What never changes while a recipe is written: parts that need no more are not drawn again with every keystroke. */
export type RecipeActions = Pick<RecipeEditing, "change" | "setUsable">;

export const RecipeActionsContext = createContext<RecipeActions | null>(null);

export function useRecipeActions(): RecipeActions {
  const actions = useContext(RecipeActionsContext);
  if (!actions) throw new Error("useRecipeActions needs RecipeActionsContext above it");
  return actions;
}

export const RecipeContext = createContext<RecipeEditing | null>(null);

export function useRecipe(): RecipeEditing {
  const editing = useContext(RecipeContext);
  if (!editing) throw new Error("useRecipe needs RecipeContext above it");
  return editing;
}
