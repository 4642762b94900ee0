import { formatNumber, formatSeconds } from "@/control/words/format-number";
import { percentText } from "../designs/percent-text";
import type { TradeEffort, TradeFigures } from "./trade-side";

/** What became of one figure: `gain` follows the design's name, `cost` follows "for". */
export type Change =
  | { readonly kind: "gain" | "cost"; readonly text: string }
  | { readonly kind: "equal" }
  | { readonly kind: "absent" }
  | { readonly kind: "unmatched"; readonly what: string; readonly missing: "from" | "to" };

const EQUAL: Change = { kind: "equal" };
const ROUGH_DIGITS = 2;
const rough = (percent: number) => percentText(percent, ROUGH_DIGITS);
const shareText = (share: number) => percentText(100 * share);

type Words = { readonly gain: string; readonly cost: string };
type Pair = { readonly from: number | null; readonly to: number | null };

/** Less is better; what reads alike is equal. */
function judge(
  what: string,
  { from, to }: Pair,
  text: (value: number) => string,
  words: (from: number, to: number) => Words,
): Change {
  if (from === null || to === null) {
    return from === to ? { kind: "absent" } : { kind: "unmatched", what, missing: from === null ? "from" : "to" };
  }
  if (text(from) === text(to)) return EQUAL;
  const kind = to < from ? "gain" : "cost";
  return { kind, text: words(from, to)[kind] };
}

/** " (25 % sooner)"; nothing to compare with a zero. */
const by = (from: number, to: number, word: string) =>
  from === 0 ? "" : ` (${rough((100 * Math.abs(to - from)) / Math.abs(from))} ${word})`;

export function settlingChange(from: TradeFigures, to: TradeFigures): Change {
  const what = to.slowest !== null && from.slowest === to.slowest ? to.slowest : "everything commanded";
  return judge("settling", { from: from.settling, to: to.settling }, formatSeconds, (before, after) => {
    const times = `${what} in ${formatSeconds(after)} instead of ${formatSeconds(before)}`;
    return { gain: `settles ${times}${by(before, after, "sooner")}`, cost: `settling ${times}${by(before, after, "later")}` };
  });
}

export function riseChange(from: TradeFigures, to: TradeFigures): Change {
  return judge("rise", { from: from.rise, to: to.rise }, formatSeconds, (before, after) => {
    const times = `${formatSeconds(after)} instead of ${formatSeconds(before)}`;
    return { gain: `rises in ${times}${by(before, after, "faster")}`, cost: `a rise of ${times}${by(before, after, "slower")}` };
  });
}

export function overshootChange(from: TradeFigures, to: TradeFigures): Change {
  return judge("overshoot", { from: from.overshoot, to: to.overshoot }, percentText, (before, after) => {
    const sizes = `${percentText(after)} instead of ${percentText(before)}`;
    return { gain: `overshoots ${sizes}`, cost: `an overshoot of ${sizes}` };
  });
}

/** A ratio that is said as a word when it is within a fortieth of it. */
const MULTIPLES: readonly (readonly [number, string])[] = [
  [1 / 4, "a quarter of"],
  [1 / 3, "a third of"],
  [1 / 2, "half"],
  [2, "twice"],
  [3, "three times"],
  [4, "four times"],
];
const NEAR = 1 / 40;
const FACTOR_FROM = 1.5;

function multiple(from: number, to: number, what: string): string {
  const ratio = to / from;
  const named = MULTIPLES.find(([value]) => Math.abs(ratio - value) <= NEAR * value);
  if (named) return `${named[1]} the ${what}`;
  if (ratio >= FACTOR_FROM) return `${formatNumber(ratio, ROUGH_DIGITS)} times the ${what}`;
  return `${rough(100 * Math.abs(ratio - 1))} ${ratio < 1 ? "less" : "more"} ${what}`;
}

export function crossChange(from: TradeFigures, to: TradeFigures): Change {
  return judge("cross-axis peak", { from: from.cross, to: to.cross }, shareText, (before, after) => {
    const sizes = `(${shareText(after)} of a step instead of ${shareText(before)})`;
    if (before === 0) return { gain: "", cost: `a cross-axis peak of ${shareText(after)} of a step where there was none` };
    if (after === 0) return { gain: `has no cross-axis peak (${shareText(before)} of a step before)`, cost: "" };
    const size = `${multiple(before, after, "cross-axis peak")} ${sizes}`;
    return { gain: `has ${size}`, cost: size };
  });
}

function overLimitWords(name: string, before: number, after: number): Words {
  const change = rough(100 * Math.abs(after - before));
  const beyond = after > 1 ? (before > 1 ? ", still beyond it" : ", beyond it") : before > 1 ? ", within it" : "";
  const now = `(${shareText(after)}${beyond})`;
  return { gain: `takes ${change} less of ${name}'s limit ${now}`, cost: `${change} more of ${name}'s limit ${now}` };
}

function effortChange(name: string, unit: string, before: TradeEffort | undefined, after: TradeEffort | undefined): Change {
  const what = `the effort of ${name}`;
  if (!before || !after) return { kind: "unmatched", what, missing: before ? "to" : "from" };
  if (before.overLimit !== null && after.overLimit !== null) {
    const shares = { from: before.overLimit, to: after.overLimit };
    return judge(what, shares, shareText, (one, other) => overLimitWords(name, one, other));
  }
  const peakText = (value: number) => `${formatNumber(value)} ${unit}`;
  return judge(what, { from: before.peak, to: after.peak }, peakText, (one, other) => {
    const sizes = `${peakText(other)} of ${name} instead of ${peakText(one)}`;
    return { gain: `asks ${sizes}${by(one, other, "less")}`, cost: `a peak of ${sizes}${by(one, other, "more")}` };
  });
}

/** Inputs are matched by name and unit. */
export function effortChanges(from: TradeFigures, to: TradeFigures): Change[] {
  const keyOf = ({ name, unit }: TradeEffort) => JSON.stringify([name, unit]);
  const find = (list: readonly TradeEffort[], key: string) => list.find((effort) => keyOf(effort) === key);
  const all = new Map([...from.effort, ...to.effort].map((effort) => [keyOf(effort), effort]));
  return [...all].map(([key, { name, unit }]) => effortChange(name, unit, find(from.effort, key), find(to.effort, key)));
}
