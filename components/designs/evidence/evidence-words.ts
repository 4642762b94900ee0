import type { Complex, TimeBase } from "@/control/plant/model";
import { formatFrequency, formatNumber, formatSeconds } from "@/control/words/format-number";
import { joinNames } from "@/control/words/join-names";
import type { PolesReply, ReferenceReply } from "./figures-reply";

const METHOD_TEXT: Readonly<Record<string, string>> = {
  doubling: "Riccati equation, started by doubling, refined by Newton steps",
  "ordered-schur": "Riccati equation, started from an ordered Schur form, refined by Newton steps",
  "stabilising-gain": "Riccati equation, started from a stabilising gain, refined by Newton steps",
};

/** How a result was found. Methods that name themselves are left as they are. */
export function methodText(method: string): string {
  const words = METHOD_TEXT[method] ?? method;
  return words.charAt(0).toUpperCase() + words.slice(1);
}

export const planeUnit = ({ kind }: TimeBase): string | undefined => (kind === "continuous" ? "1/s" : undefined);

/** What the trade reads off a pole, in one line. */
export function poleFigureText({ pole, naturalFrequency, damping, timeConstant }: PolesReply[number]): string {
  const parts: string[] = [];
  if (pole.im !== 0 && naturalFrequency !== null) parts.push(formatFrequency(naturalFrequency));
  if (pole.im !== 0 && damping !== null) parts.push(`damping ${formatNumber(damping, 3)}`);
  if (timeConstant !== null) parts.push(`time constant ${formatSeconds(timeConstant)}`);
  return parts.join(" · ") || "does not decay";
}

/** Poles in the order they are read: slow ones first. */
export const slowFirst = (poles: PolesReply): PolesReply =>
  poles.toSorted((a, b) => (b.timeConstant ?? Number.POSITIVE_INFINITY) - (a.timeConstant ?? Number.POSITIVE_INFINITY));

export const polesOfReport = (poles: PolesReply): Complex[] => poles.map(({ pole }) => pole);

const OBSTACLES: Readonly<Record<NonNullable<ReferenceReply["obstacle"]>, string>> = {
  "too-few-inputs": "there are fewer inputs than commanded quantities, so F comes as near as it can to all of them",
  "zero-at-rest": "the plant has a zero at rest there: no steady input holds another value",
  rank: "the inputs do not act on the commanded quantities independently at rest",
};

/** Which commanded quantities reach their set points, and why the others do not. */
export function referenceText({ reached, obstacle }: ReferenceReply, names: readonly string[]): string {
  const short = names.filter((_, index) => !reached[index]);
  if (short.length === 0)
    return names.length === 1 ? `${names[0]} reaches its set point.` : "Every commanded quantity reaches its set point.";
  const met = names.filter((_, index) => reached[index]);
  const first =
    met.length === 0 ? "" : `${joinNames(met)} ${met.length === 1 ? "reaches its set point" : "reach their set points"}; `;
  const why = obstacle === null ? "" : `: ${OBSTACLES[obstacle]}`;
  return `${first}${joinNames(short)} ${short.length === 1 ? "does" : "do"} not reach ${short.length === 1 ? "its set point" : "their set points"}${why}.`;
}
