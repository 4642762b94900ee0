import type { PlantModel } from "@/control/plant/model";
import { formatNumber } from "@/control/words/format-number";
import { AxisBar } from "../../plots/axis-bar";
import { StateMark } from "../../ui/state-mark";
import type { StepFiguresReply } from "./figures-reply";
import { LOOP_WORDS, stepFigureRows } from "./step-figure-rows";

type StepFiguresProps = Readonly<{ figures: readonly StepFiguresReply[]; source: number; model: PlantModel }>;

/** Figures of the step on one commanded quantity, over all time; with an observer both loops side by side. */
export function StepFigures({ figures, source, model }: StepFiguresProps) {
  const steps = figures.filter((step) => step.source === source);
  const { name, unit, amplitude, axis } = model.commanded[source];
  const rows = stepFigureRows(steps, model);
  return (
    <table className="w-full border-collapse text-table">
      <caption className="pb-0.5 text-left">
        <span className="inline-flex items-baseline gap-2">
          <AxisBar axis={axis} />
          {name} commanded {formatNumber(amplitude)} {unit}
        </span>
      </caption>
      <thead className={steps.length > 1 ? "" : "sr-only"}>
        <tr className="text-sm text-soft">
          <td />
          {steps.map(({ loop }) => (
            <th key={loop} scope="col" className="pl-2 text-right font-normal">
              {LOOP_WORDS[loop]}
            </th>
          ))}
        </tr>
      </thead>
      <tbody className="border-t border-ink">
        {rows.map(({ key, label, cells }) => (
          <tr key={key} className="border-b border-rule align-baseline">
            <th scope="row" className="py-0.5 text-left font-normal">
              {label}
            </th>
            {cells.map((cell, index) => (
              <td key={steps[index].loop} className="py-0.5 pl-2 text-right font-mono">
                <span className="inline-flex items-baseline gap-1.5">
                  {cell.beyond ? <StateMark kind="unmet" word="Beyond its limit: " /> : null}
                  {cell.text}
                </span>
                {cell.note ? <span className="block font-sans text-sm text-soft">{cell.note}</span> : null}
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}
