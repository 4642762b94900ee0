"use client";

import type { ComponentProps } from "react";
import { NumberField } from "../../ui/number-field";
import { useRecipe } from "./recipe-context";
import { fieldId } from "./recipe-fields";
import type { RecipeForm } from "./recipe-form";

type RecipeNumberProps = Readonly<
  Pick<ComponentProps<typeof NumberField>, "label" | "hideLabel" | "hint" | "unit" | "optional" | "className"> & {
    /** Its place in the recipe. */
    pointer: string;
    value: number | null;
    write: (form: RecipeForm, value: number | null) => RecipeForm;
  }
>;

/** A figure of the recipe at its place: problems land here, keystrokes are one undo step. */
export function RecipeNumber({ pointer, value, write, ...field }: RecipeNumberProps) {
  const { change, problemAt, setUsable } = useRecipe();
  return (
    <NumberField
      {...field}
      id={fieldId(pointer)}
      value={value}
      problem={problemAt(pointer)}
      onUsable={(usable) => setUsable(pointer, usable)}
      onChange={(next) => change(pointer, (form) => write(form, next))}
    />
  );
}

/** A list with one place replaced. */
export const withAt = <T,>(list: readonly T[], index: number, value: T): T[] =>
  list.map((old, place) => (place === index ? value : old));
