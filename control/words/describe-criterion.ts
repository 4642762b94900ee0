import type { Criterion, Verdict } from "../design/criteria";
import { formatNumber } from "./format-number";

type Kind = Criterion["kind"];

/** What a kind is called, and what it is a limit of. */
export const CRITERION_WORDS: Readonly<Record<Kind, { readonly name: string; readonly of: string; readonly unit: string }>> = {
  settling: { name: "settling to 2 %", of: "commanded quantity", unit: "s" },
  overshoot: { name: "overshoot", of: "commanded quantity", unit: "% of its step" },
  "cross-peak": { name: "cross-axis peak", of: "commanded quantity", unit: "% of the other's own step" },
  effort: { name: "peak effort", of: "input", unit: "% of its limit" },
};

const DIGITS = 3;
/** Enough for any double. */
const MOST_DIGITS = 17;
/** As many as any decimal number keeps. */
const LIMIT_DIGITS = 15;
/** Less is not written out: no machine shows it. */
const LEAST_PERCENT = 0.01;

/** "settling of y to 2 %", "cross-axis peak while y is commanded", "worst overshoot". */
export function criterionSubject({ kind, signal }: Criterion): string {
  const { name } = CRITERION_WORDS[kind];
  if (signal === null) return `worst ${name}`;
  if (kind === "settling") return `settling of ${signal} to 2 %`;
  return kind === "cross-peak" ? `${name} while ${signal} is commanded` : `${name} of ${signal}`;
}

/** Of a figure and of its limit. */
export const CRITERION_UNITS: Readonly<Record<Kind, string>> = { settling: "s", overshoot: "%", "cross-peak": "%", effort: "%" };

/** A limit as it was written, with its unit. */
export const criterionLimit = ({ kind, limit }: Criterion): string =>
  `${formatNumber(limit, LIMIT_DIGITS)} ${CRITERION_UNITS[kind]}`;

/** The figure in as many digits as show on which side of its limit it is, and in the limit's unit; null where there is none. */
export function criterionValue({ criterion: { kind, limit }, value }: Pick<Verdict, "criterion" | "value">): string | null {
  if (value === null) return null;
  const slight = kind !== "settling" && value !== 0 && value < LEAST_PERCENT && (limit === 0 || limit >= LEAST_PERCENT);
  if (slight) return `< ${LEAST_PERCENT} %`;
  let digits = DIGITS;
  while (digits < MOST_DIGITS && Math.sign(Number(value.toPrecision(digits)) - limit) !== Math.sign(value - limit)) digits++;
  return `${formatNumber(value, digits)} ${CRITERION_UNITS[kind]}`;
}

/** Why there is nothing to judge. */
export function unjudgedWords({ criterion: { kind, signal }, reason }: Pick<Verdict, "criterion" | "reason">): string {
  const { of } = CRITERION_WORDS[kind];
  const limited = kind === "effort" ? " with a limit" : "";
  if (reason === "never") return signal === null ? "a step does not come to rest" : "its step does not come to rest";
  if (reason === "no-signal") return `the plant has no ${of}${signal === null ? "" : ` ${signal}`}${limited}`;
  return "no response shows it";
}

/** "Met: overshoot of y is 1.2 %, at most 5 % is asked." */
export function verdictSentence(verdict: Verdict): string {
  const [value, limit] = [criterionValue(verdict), criterionLimit(verdict.criterion)];
  const subject = criterionSubject(verdict.criterion);
  const word = verdict.met ? "Met" : "Not met";
  if (value === null) return `${word}: ${subject} cannot be judged, since ${unjudgedWords(verdict)}; at most ${limit} is asked.`;
  return `${word}: ${subject} is ${value}, at most ${limit} is asked.`;
}
