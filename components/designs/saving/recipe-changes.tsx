import type { RecipeDifference } from "../recipe/recipe-lines";

type RecipeChangesProps = Readonly<{
  caption: string;
  differences: readonly RecipeDifference[];
  /** Heads of the two columns. */
  before: string;
  after: string;
}>;

const SHOWN = 40;

/** What differs between two recipes, place by place. */
export function RecipeChanges({ caption, differences, before, after }: RecipeChangesProps) {
  if (differences.length === 0) return <p className="text-soft">The recipes are the same.</p>;
  // A region that scrolls has to be reached by keys, too.
  const region = { role: "region", "aria-label": caption, tabIndex: 0 } as const;
  return (
    <div {...region} className="max-h-72 overflow-auto">
      <table className="w-full border-collapse text-table">
        <caption className="pb-1 text-left font-semibold">{caption}</caption>
        <thead>
          <tr className="border-b border-ink text-left text-sm text-soft">
            <th scope="col" className="py-1 pr-3 font-normal">
              Where
            </th>
            <th scope="col" className="py-1 pr-3 font-normal">
              {before}
            </th>
            <th scope="col" className="py-1 font-normal">
              {after}
            </th>
          </tr>
        </thead>
        <tbody>
          {differences.slice(0, SHOWN).map((difference) => (
            <tr key={difference.key} className="border-b border-rule align-baseline">
              <th scope="row" className="py-1 pr-3 text-left font-normal">
                {difference.place}
              </th>
              <td className="py-1 pr-3 font-mono">{difference.before ?? "–"}</td>
              <td className="py-1 font-mono">{difference.after ?? "–"}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {differences.length > SHOWN ? <p className="text-sm text-soft">and {differences.length - SHOWN} more</p> : null}
    </div>
  );
}
