import { formatNumber, formatSeconds } from "@/control/words/format-number";
import { joinNames } from "@/control/words/join-names";
import type { Compared } from "./compare-types";
import { summaryOf } from "./figure-rows";

/** Changes below this share of the first design's figure are not worth a word. */
const WORTH = 0.02;

type Words = (size: number, first: number) => readonly [less: string, more: string];

function change(first: number | null | undefined, now: number | null | undefined, words: Words): string[] {
  if (typeof first !== "number" || typeof now !== "number") return [];
  const by = now - first;
  if (Math.abs(by) <= WORTH * Math.abs(first)) return [];
  const [less, more] = words(Math.abs(by), first);
  return [by < 0 ? less : more];
}

/** "58 % less", "12 % more", and from twice as much on "3.2 times as much". */
const relative: Words = (size, first) => {
  const share = `${formatNumber((100 * size) / Math.abs(first), 2)} %`;
  return [`${share} less`, size > Math.abs(first) ? `${formatNumber((size + first) / first, 2)} times as much` : `${share} more`];
};

function effortChanges(first: Compared, now: Compared): string[] {
  const [before, after] = [summaryOf(first), summaryOf(now)];
  return now.model.inputs.flatMap(({ name, unit }, index) => {
    const place = first.model.inputs.findIndex((input) => input.name === name);
    const was = before?.peakEffort[place]?.peak;
    return change(was, after?.peakEffort[index]?.peak, (size) => {
      const text = `${formatNumber(size, 3)} ${unit}`;
      return [`${text} less on ${name}`, `${text} more on ${name}`];
    });
  });
}

/** What a design gains and pays against the first one, in a sentence. */
export function tradeSentence(first: Compared, now: Compared): string {
  const [before, after] = [summaryOf(first), summaryOf(now)];
  if (!before || !after) return "cannot be told: its responses were refused";
  const motion = [
    ...change(before.worstSettling, after.worstSettling, (size) => [
      `settles ${formatSeconds(size)} sooner`,
      `settles ${formatSeconds(size)} later`,
    ]),
    ...change(before.worstCrossPeak?.peak, after.worstCrossPeak?.peak, relative).map((words) => `couples ${words}`),
    ...change(before.worstOvershoot, after.worstOvershoot, (size) => {
      const points = `${formatNumber(size, 3)} points`;
      return [`overshoots ${points} less`, `overshoots ${points} more`];
    }),
  ];
  const effort = effortChanges(first, now);
  if (motion.length === 0 && effort.length === 0) return "the same within 2 %";
  if (motion.length === 0) return `moves the same for ${joinNames(effort)}`;
  return effort.length === 0 ? `${joinNames(motion)} for the same effort` : `${joinNames(motion)}, for ${joinNames(effort)}`;
}
