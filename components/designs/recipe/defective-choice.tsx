"use client";

import { Checkbox } from "../../ui/checkbox";
import { useRecipe } from "./recipe-context";

/** Asked for by name: poles repeated beyond what the inputs, or the outputs, can hold apart. */
export function DefectiveChoice({ of, held }: Readonly<{ of: "loop" | "observer"; held: "inputs" | "outputs" }>) {
  const { form, change } = useRecipe();
  const allowed = form.allowDefective ?? { loop: false, observer: false };
  return (
    <Checkbox
      label="Allow dependent eigenvectors"
      hint={`For poles repeated more often than the ${held} can hold apart; small errors move such poles far.`}
      checked={allowed[of]}
      onChange={({ target }) => change(null, (now) => ({ ...now, allowDefective: { ...allowed, [of]: target.checked } }))}
    />
  );
}
