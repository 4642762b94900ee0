import type { PlantModel } from "@/control/plant/model";
import { formatNumber, formatSeconds } from "@/control/words/format-number";
import { percentText } from "../percent-text";
import type { StepFiguresReply } from "./figures-reply";

export type FigureCell = { readonly text: string; readonly note?: string; readonly beyond?: boolean };
export type FigureRow = { readonly key: string; readonly label: string; readonly cells: readonly FigureCell[] };

export const LOOP_WORDS: Readonly<Record<StepFiguresReply["loop"], string>> = {
  "full-state": "full state",
  observer: "with observer",
};

const NONE: FigureCell = { text: "–" };
const seconds = (value: number | null): FigureCell => (value === null ? NONE : { text: formatSeconds(value) });
const percent = (value: number | null): FigureCell => (value === null ? NONE : { text: percentText(value) });

/** Effort in its unit, and how much of its limit that is. */
function effortCell({ peak, overLimit }: StepFiguresReply["effort"][number], unit: string): FigureCell {
  const text = `${formatNumber(peak)} ${unit}`;
  if (overLimit === null) return { text, note: "no limit given" };
  return { text, note: `${percentText(100 * overLimit)} of limit`, beyond: overLimit > 1 };
}

/** What is said of a step, one row per figure, one cell per loop. */
export function stepFigureRows(steps: readonly StepFiguresReply[], model: PlantModel): FigureRow[] {
  const own = ({ commanded, source }: StepFiguresReply) => commanded[source];
  const row = (key: string, label: string, cell: (step: StepFiguresReply) => FigureCell): FigureRow => ({
    key,
    label,
    cells: steps.map(cell),
  });
  const source = steps.at(0)?.source;
  const others = model.commanded.map((signal, index) => ({ ...signal, index })).filter(({ index }) => index !== source);
  return [
    row("settling", "Settling, 2 %", (step) => seconds(own(step).settling)),
    row("rise", "Rise, 10–90 %", (step) => seconds(own(step).rise)),
    row("overshoot", "Overshoot", (step) => percent(own(step).overshoot)),
    ...others.map(({ name, unit, index }) =>
      row(`cross ${index}`, `Cross-axis peak, ${name}`, ({ commanded }) => ({
        text: `${formatNumber(commanded[index].peak)} ${unit}`,
      })),
    ),
    ...model.inputs.map(({ name, unit }, index) =>
      row(`effort ${index}`, `Peak effort, ${name}`, ({ effort }) => effortCell(effort[index], unit)),
    ),
  ];
}
