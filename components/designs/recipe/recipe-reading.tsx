import type { Recipe } from "@/control/design/recipe";
import type { PlantModel } from "@/control/plant/model";
import { AxisBar } from "../../plots/axis-bar";
import { TWO_COLUMNS } from "../two-columns";
import { type RecipeLine, recipeLines } from "./recipe-lines";

/** A recipe to read, for those who may not change it. */
export function RecipeReading({ recipe, model }: Readonly<{ recipe: Recipe; model: PlantModel }>) {
  const lines = recipeLines(recipe, model);
  const sections = [...new Set(lines.map(({ section }) => section))];
  return (
    <div className={`flex flex-col gap-6 ${TWO_COLUMNS}`}>
      {sections.map((section) => (
        <section key={section} aria-label={section}>
          <h3 className="text-table font-semibold">{section}</h3>
          <dl className="mt-1 divide-y divide-rule border-y border-rule text-table">
            {lines
              .filter((line) => line.section === section)
              .map((line) => (
                <ReadLine key={line.key} line={line} />
              ))}
          </dl>
        </section>
      ))}
    </div>
  );
}

function ReadLine({ line: { label, text, exact, axis, prose } }: Readonly<{ line: RecipeLine }>) {
  if (prose) {
    return (
      <div className="py-1">
        <dt className="text-sm text-soft">{label}</dt>
        <dd className="whitespace-pre-line">{text}</dd>
      </div>
    );
  }
  return (
    <div className="flex flex-wrap items-baseline justify-between gap-x-3 py-1">
      <dt className="flex items-baseline gap-2">
        {axis === undefined ? null : <AxisBar axis={axis} />}
        {label}
      </dt>
      <dd className="font-mono" title={exact}>
        {text}
      </dd>
    </div>
  );
}
