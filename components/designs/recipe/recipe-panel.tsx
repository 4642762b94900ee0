"use client";

import type { Complex } from "@/control/plant/model";
import { Segmented } from "../../ui/radio-group";
import { TWO_COLUMNS } from "../two-columns";
import { ObserverFields } from "./observer-fields";
import { PolesFields } from "./poles-fields";
import { useRecipe } from "./recipe-context";
import { ReferenceFields, TestFields } from "./test-fields";
import { WeightsFields } from "./weights-fields";

type RecipePanelProps = Readonly<{
  /** Poles of the loop that was solved last, for proposals. */
  loopPoles: readonly Complex[] | null;
}>;

/** The left column of the page: everything that decides the design, each choice with room for its reason. */
export function RecipePanel({ loopPoles }: RecipePanelProps) {
  const { form, change } = useRecipe();
  return (
    <div className={`flex flex-col gap-6 ${TWO_COLUMNS}`}>
      <Segmented
        legend="Method"
        hideLegend
        value={form.method}
        onChange={(method) => change(null, (now) => ({ ...now, method }))}
        choices={[
          { value: "weights", label: "Quadratic weights" },
          { value: "poles", label: "Poles" },
        ]}
      />
      {form.method === "weights" ? <WeightsFields /> : <PolesFields loopPoles={loopPoles} />}
      <ObserverFields loopPoles={loopPoles} />
      <ReferenceFields />
      <TestFields />
    </div>
  );
}
