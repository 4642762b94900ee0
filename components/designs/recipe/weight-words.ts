import type { Summary } from "@/control/design/evidence";
import type { WeightEffects } from "@/control/design/weight-effects";
import { formatNumber } from "@/control/words/format-number";

const NEGLIGIBLE_PERCENT = 0.5;

/** A change in percent with its sign, or null where there is nothing to compare. */
export function changeText(before: number | null, after: number | null): string | null {
  if (before === null || after === null || !(before > 0)) return null;
  const percent = (after / before - 1) * 100;
  if (Math.abs(percent) < NEGLIGIBLE_PERCENT) return "±0 %";
  return `${percent > 0 ? "+" : ""}${formatNumber(percent, 2)} %`;
}

/** The input that is nearest to its limit now, by whose effort a change is judged; without limits the one that moves most. */
function busiestInput({ peakEffort }: Summary): number {
  const limited = peakEffort.some(({ overLimit }) => overLimit !== null);
  const size = ({ peak, overLimit }: Summary["peakEffort"][number]) => (limited ? (overLimit ?? -1) : peak);
  return peakEffort.reduce((busiest, effort, index) => (size(effort) > size(peakEffort[busiest]) ? index : busiest), 0);
}

/** What twice a weight is predicted to change, in a line: settling, effort of the busiest input, cross-axis peak. */
function effectWords(now: Summary, doubled: Summary | null, inputs: readonly { readonly name: string }[]): string {
  if (!doubled) return "twice the weight: no prediction";
  const busiest = busiestInput(now);
  const changes = [
    ["settling", changeText(now.worstSettling, doubled.worstSettling)],
    [
      inputs[busiest]?.name ?? "effort",
      changeText(now.peakEffort[busiest]?.peak ?? null, doubled.peakEffort[busiest]?.peak ?? null),
    ],
    ["cross-axis", changeText(now.worstCrossPeak?.peak ?? null, doubled.worstCrossPeak?.peak ?? null)],
  ].flatMap(([what, change]) => (change === null ? [] : [`${what} ${change}`]));
  return changes.length === 0 ? "twice the weight: no steps to judge by" : `twice the weight: ${changes.join(", ")}`;
}

/** The lines beside the weights, by `state:2` or `input:0`. */
export function weightLines(
  { now, effects }: WeightEffects,
  inputs: readonly { readonly name: string }[],
): ReadonlyMap<string, string> {
  return new Map(effects.map(({ of, index, doubled }) => [`${of}:${index}`, effectWords(now, doubled, inputs)]));
}
