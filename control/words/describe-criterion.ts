import type { Criterion, Verdict } from "../design/criteria";
import { formatNumber, formatSeconds } from "./format-number";

type Kind = Criterion["kind"];

/** What a kind is called, and what it is a limit of. */
export const CRITERION_WORDS: Readonly<Record<Kind, { readonly name: string; readonly of: string; readonly unit: string }>> = {
  settling: { name: "settling to 2 %", of: "commanded quantity", unit: "s" },
  overshoot: { name: "overshoot", of: "commanded quantity", unit: "% of its step" },
  "cross-peak": { name: "cross-axis peak", of: "commanded quantity", unit: "% of the other's own step" },
  effort: { name: "peak effort", of: "input", unit: "% of its limit" },
};

/** Enough for any double: what differs is shown to differ. */
const MOST_DIGITS = 17;
const DIGITS = 3;
const LEAST_PERCENT = 0.01;

/** "settling of y to 2 %", "cross-axis peak while y is commanded", "worst overshoot". */
export function criterionSubject({ kind, signal }: Criterion): string {
  const { name } = CRITERION_WORDS[kind];
  if (signal === null) return `worst ${name}`;
  if (kind === "settling") return `settling of ${signal} to 2 %`;
  return kind === "cross-peak" ? `${name} while ${signal} is commanded` : `${name} of ${signal}`;
}

/** A figure of a criterion with its unit; none in percent that is written out to a digit no machine shows. */
export function criterionFigure(kind: Kind, value: number, digits = DIGITS): string {
  if (kind === "settling") return formatSeconds(value, digits);
  return value !== 0 && Math.abs(value) < LEAST_PERCENT && digits === DIGITS
    ? `< ${LEAST_PERCENT} %`
    : `${formatNumber(value, digits)} %`;
}

/** Figure and limit in as many digits as tell them apart; null where there is no figure. */
export function criterionFigures({ criterion: { kind, limit }, value }: Pick<Verdict, "criterion" | "value">): {
  readonly value: string | null;
  readonly limit: string;
} {
  for (let digits = DIGITS; value !== null && digits <= MOST_DIGITS; digits++) {
    const shown = { value: criterionFigure(kind, value, digits), limit: criterionFigure(kind, limit, digits) };
    if (value === limit || shown.value !== shown.limit) return shown;
  }
  return { value: null, limit: criterionFigure(kind, limit) };
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
  const { value, limit } = criterionFigures(verdict);
  const subject = criterionSubject(verdict.criterion);
  const word = verdict.met ? "Met" : "Not met";
  if (value === null) return `${word}: ${subject} cannot be judged, since ${unjudgedWords(verdict)}; at most ${limit} is asked.`;
  return `${word}: ${subject} is ${value}, at most ${limit} is asked.`;
}
