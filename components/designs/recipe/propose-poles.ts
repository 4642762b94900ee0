import type { PoleEntry } from "@/control/design/recipe";
import type { Complex, TimeBase } from "@/control/plant/model";
import { continuousPole } from "@/control/structure/continuous-pole";
import { rounded } from "./pole-drafts";

const DIGITS = 4;
const LEAST_DAMPING = 0.7;
/** Poles nearer together than this share of their size are set apart: repeated ones may not be placeable. */
const APART = 0.08;
const STEP_APART = 1.15;
/** An observer settles this many times faster than the loop: quick enough not to be felt, not so quick that it only hears noise. */
export const OBSERVER_SPEED = 4;

const size = ({ re, im }: Complex) => Math.sqrt(re * re + im * im);
const upperHalf = (poles: readonly Complex[]) => poles.filter(({ im }) => im >= 0);

/** The next free figure from `wanted` upwards, kept apart from those taken. */
function setApart(wanted: number, taken: number[]): number {
  let found = wanted;
  while (taken.some((other) => Math.abs(other - found) <= APART * found)) found *= STEP_APART;
  taken.push(found);
  return found;
}

/**
 * Poles to start from, out of those the plant has by itself: each keeps its speed, what grows or drifts is made to decay, and what
 * rings is damped to 0.7. Full set, in entries that read as damping and frequency or as time constants.
 */
export function proposeFromPlant(open: readonly Complex[], timeBase: TimeBase): PoleEntry[] {
  const poles = upperHalf(open).map((pole) => ({ pole, s: continuousPole(pole, timeBase) }));
  const speeds = poles.map(({ s }) => (s ? size(s) : 0));
  const fastest = speeds.reduce((most, speed) => Math.max(most, speed), 0);
  const floor = fastest * 1e-6;
  const slowest = speeds
    .filter((speed) => speed > floor)
    .reduce((least, speed) => Math.min(least, speed), Number.POSITIVE_INFINITY);
  const idle = Number.isFinite(slowest) ? slowest : 1;
  const realTaken: number[] = [];
  const pairTaken: number[] = [];
  return poles.map(({ pole, s }, k): PoleEntry => {
    // A sampled pole at or left of zero has no continuous counterpart that an entry could name.
    if (!s || (pole.im === 0 && s.im !== 0))
      return { kind: "real", value: rounded(Math.max(-0.5, Math.min(pole.re, 0)), DIGITS) + 0 };
    const speed = speeds[k] > floor ? speeds[k] : idle;
    if (pole.im === 0) return { kind: "time-constant", seconds: rounded(1 / setApart(speed, realTaken), DIGITS) };
    const damping = Math.max(LEAST_DAMPING, -s.re / speed);
    return { kind: "damping", frequency: rounded(setApart(speed, pairTaken), DIGITS), damping: rounded(damping, DIGITS) };
  });
}

/** The same poles, written down. */
export function asEntries(poles: readonly Complex[]): PoleEntry[] {
  return upperHalf(poles).map(({ re, im }) =>
    im === 0 ? { kind: "real", value: rounded(re, DIGITS) } : { kind: "pair", re: rounded(re, DIGITS), im: rounded(im, DIGITS) },
  );
}

function faster(pole: Complex, timeBase: TimeBase): Complex {
  if (timeBase.kind === "continuous") return { re: OBSERVER_SPEED * pole.re, im: OBSERVER_SPEED * pole.im };
  const squared = ({ re, im }: Complex): Complex => ({ re: re * re - im * im, im: 2 * re * im });
  const { re, im } = squared(squared(pole));
  return { re, im: Math.abs(im) };
}

/** `count` observer poles, four times as fast as the slowest of the loop's. */
export function proposeObserver(loop: readonly Complex[], count: number, timeBase: TimeBase): PoleEntry[] {
  const slowestFirst = upperHalf(loop).toSorted((a, b) => speedOf(a, timeBase) - speedOf(b, timeBase));
  const chosen: Complex[] = [];
  let room = count;
  for (const pole of slowestFirst) {
    const needs = pole.im === 0 ? 1 : 2;
    if (needs > room) continue;
    chosen.push(faster(pole, timeBase));
    room -= needs;
  }
  const last = slowestFirst.at(-1);
  if (room > 0 && last) chosen.push(faster({ re: timeBase.kind === "continuous" ? -size(last) : size(last), im: 0 }, timeBase));
  return asEntries(chosen);
}

function speedOf(pole: Complex, timeBase: TimeBase): number {
  const s = continuousPole(pole, timeBase);
  return s ? size(s) : Number.POSITIVE_INFINITY;
}
