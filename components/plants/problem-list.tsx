import type { PlantProblem } from "@/control/plant/plant-problem";
import { Notice } from "../ui/notice";

const SHOWN = 6;
const TABS: Readonly<Record<string, string>> = {
  axes: "Signals and axes",
  states: "Signals and axes",
  inputs: "Signals and axes",
  outputs: "Signals and axes",
  disturbances: "Signals and axes",
  commanded: "Signals and axes",
  operatingPoint: "Signals and axes",
  parameters: "Parameters",
};

/** Where to look: the tab, or the matrix with row and column. */
function place(pointer: string): string {
  const [, first, row, column] = pointer.split("/");
  const tab = TABS[first];
  if (tab) return tab;
  return column === undefined ? first : `${first}, row ${Number(row) + 1}, column ${Number(column) + 1}`;
}

/** Everything that stands in the way of saving, and the cautions that do not. */
export function ProblemList({ problems }: Readonly<{ problems: readonly PlantProblem[] }>) {
  const errors = problems.filter(({ severity }) => severity === "error");
  const cautions = problems.filter(({ severity }) => severity === "caution");
  return (
    <div className="mb-6 flex flex-col gap-3 empty:hidden">
      {errors.length > 0 ? (
        <Notice
          kind="unmet"
          title={
            errors.length === 1
              ? "One field needs a change before this can be saved."
              : `${errors.length} fields need a change before this can be saved.`
          }
        >
          <List problems={errors} />
        </Notice>
      ) : null}
      {cautions.length > 0 ? (
        <Notice kind="caution" title={cautions.length === 1 ? "One thing to look at." : `${cautions.length} things to look at.`}>
          <List problems={cautions} />
        </Notice>
      ) : null}
    </div>
  );
}

function List({ problems }: Readonly<{ problems: readonly PlantProblem[] }>) {
  const rest = problems.length - SHOWN;
  return (
    <ul className="mt-1 list-disc pl-5">
      {problems.slice(0, SHOWN).map(({ pointer, message }) => (
        <li key={`${pointer} ${message}`}>
          {place(pointer)}: {message}
        </li>
      ))}
      {rest > 0 ? <li>and {rest} more, marked at their fields</li> : null}
    </ul>
  );
}
