import { formatNumber, formatSeconds } from "@/control/words/format-number";
import type { ResponsesReply } from "../designs/evidence/figures-reply";
import { computed } from "../designs/evidence/figures-reply";
import { percentText } from "../designs/percent-text";
import type { CompareCell, Compared, CompareRow } from "./compare-types";
import { unionByName } from "./difference-marks";

type Summary = ResponsesReply["summary"]["fullState"];

/** With the observer where there is one: that is the loop which will run. */
export function summaryOf({ evidence }: Compared): Summary | null {
  const summary = computed(evidence.responses)?.summary;
  return summary ? (summary.observer ?? summary.fullState) : null;
}

const ranked = (value: number | null, text: (value: number) => string, more: Partial<CompareCell> = {}): CompareCell | null =>
  value === null ? null : { text: text(value), exact: text(value), rank: value, ...more };

const row = (
  key: string,
  label: string,
  designs: readonly Compared[],
  cell: (summary: Summary, design: Compared) => CompareCell | null,
): CompareRow => ({
  key,
  label,
  cells: designs.map((design) => {
    const summary = summaryOf(design);
    return summary && cell(summary, design);
  }),
});

function crossCell({ worstCrossPeak }: Summary, { model }: Compared): CompareCell | null {
  if (!worstCrossPeak) return null;
  const { source, signal, peak } = worstCrossPeak;
  const note = `${model.commanded[source]?.name} commanded, ${model.commanded[signal]?.name} moves`;
  return ranked(peak, (share) => percentText(100 * share), { note });
}

/** Peak effort per input, and how much of its limit that is, matched by name. */
function effortRows(designs: readonly Compared[]): CompareRow[] {
  return unionByName(designs.map(({ model }) => model.inputs)).map(({ name, unit, axis }) => ({
    ...row(`effort ${name}`, `peak effort ${name}`, designs, ({ peakEffort }, { model }) => {
      const effort = peakEffort[model.inputs.findIndex((input) => input.name === name)];
      if (!effort) return null;
      const { peak, overLimit } = effort;
      const of = overLimit === null ? "no limit given" : `${percentText(100 * overLimit)} of its limit`;
      return ranked(peak, (value) => `${formatNumber(value)} ${unit}`, { note: of, beyond: overLimit !== null && overLimit > 1 });
    }),
    axis,
  }));
}

/** The worst over everything commanded; less is better throughout. */
export function figureRows(designs: readonly Compared[]): CompareRow[] {
  const loop: CompareRow = {
    key: "loop",
    label: "of the loop",
    cells: designs.map(({ evidence }) => {
      const text = computed(evidence.responses)?.summary.observer ? "with observer" : "full state";
      return { text, exact: text };
    }),
  };
  return [
    loop,
    row("settling", "settling, 2 %", designs, ({ worstSettling }) => ranked(worstSettling, formatSeconds)),
    row("rise", "rise, 10–90 %", designs, ({ worstRise }) => ranked(worstRise, formatSeconds)),
    row("overshoot", "overshoot", designs, ({ worstOvershoot }) => ranked(worstOvershoot, percentText)),
    row("cross", "cross-axis peak, of the other's step", designs, crossCell),
    ...effortRows(designs),
  ];
}
