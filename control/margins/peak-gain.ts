import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { complexSingularValues, singularRoom } from "../linalg/complex-singular-values";
import { eigenvalues } from "../linalg/eigenvalues";
import { pythagoras } from "../linalg/flat";
import { timesPowerOfTwo } from "../linalg/power-of-two";
import { requireRepresentable } from "../linalg/require-representable";
import type { Complex } from "../plant/model";
import type { System } from "../plant/scale-plant";
import { boundaryForm } from "./boundary-form";
import { levelFrequencies } from "./level-frequencies";
import { partition, rising } from "./partition";
import { climb, type Peak } from "./peak-search";
import { type FrequencySystem, prepareFrequency, requirePeriod } from "./prepare-frequency";
import { boundaryPoint, evaluateOnBoundary, frequencyOf, responseRoom } from "./response-at";

/**
 * A largest value over all frequencies: attained within rounding at `frequency` (rad/s; null: approached as frequency grows
 * without bound), and at no frequency above `upper`.
 */
export type PeakValue = {
  readonly value: number;
  readonly lower: number;
  readonly upper: number;
  readonly frequency: number | null;
};

/** The level that no gain may pass, above the largest one found. */
const LEVEL = 1 + 2 ** -30;
const MOST_ROUNDS = 40;
/** The bracket is this many times wider than the scatter seen. */
const SAFETY = 8;
/** Below this, in the balanced system whose entries are about 1, a gain counts as none. */
const NO_GAIN = 2 ** -900;

/**
 * Largest singular value of G over all frequencies (the H-infinity norm) of a stable system.
 *
 * Shapes    A n×n, B n×m, C p×n, D p×m; n may be 0
 * Units     value in those of y/u, in the 2-norm as they stand; period in seconds, null when continuous
 * Throws    not-stabilising { pole } for a pole that does not decay within its accuracy; shape-mismatch; not-finite; bad-option;
 *           too-large; no-convergence
 * Accuracy  lower..upper spans 2^-30 of the value, more where a pole is so near the boundary that rounding moves it: the
 *           scatter of neighbouring evaluations is added to it. No frequency is taken for a crossing on the word of an
 *           eigenvalue alone: each is evaluated. At most 40 rounds
 * Source    Boyd & Balakrishnan, Systems & Control Letters 15 (1990) 1-7; Bruinsma & Steinbuch, the same 14 (1990) 287-293
 */
export function peakGain(given: System, period: number | null = null): PeakValue {
  const system = prepareFrequency(given, period);
  requireDecay(given.A, period);
  return inOwnUnits(system, largestOnBoundary(system));
}

/** Throws not-stabilising with the first pole on or beyond the boundary within the accuracy of a pole. */
export function requireDecay(A: Matrix, period: number | null): void {
  requirePeriod(period);
  const accuracy = 2 * A.rows * Number.EPSILON;
  const lasting = eigenvalues(A).find(({ re, im }) => {
    const size = Math.sqrt(re * re + im * im);
    return period === null ? re >= -accuracy * Math.abs(im) : !(size * (1 + accuracy) < 1);
  });
  if (lasting) throw new NumericalError("not-stabilising", { pole: lasting });
}

/** The peak with its bracket, which the scatter of the evaluation widens. */
export function inOwnUnits(system: FrequencySystem, { at, value }: Peak): PeakValue {
  const { size, period } = system;
  const scatter = SAFETY * scatterAround(gainOnBoundary(system), { at, value });
  const found = timesPowerOfTwo(value, size);
  const lower = timesPowerOfTwo(value * (1 - Math.min(scatter, 0.999)), size);
  const upper = timesPowerOfTwo(value * (LEVEL + scatter), size);
  requireRepresentable("gain", [found, upper]);
  return { value: found, lower, upper, frequency: frequencyOf(at, period) };
}

/** How far, relatively, the gain is apart at the next few numbers: near a pole, rounding moves it more than frequency does. */
function scatterAround(valueAt: (v: number) => number, { at, value }: Peak): number {
  if (at === 0 || !Number.isFinite(at) || !(value > 0)) return 0;
  const apart = [-3, -1, 1, 3].map((steps) => Math.abs(valueAt(at * (1 + steps * Number.EPSILON)) / value - 1));
  return Math.max(...apart.filter(Number.isFinite), 0);
}

/** The peak in units of 2^size, at a coordinate of the boundary; of equal gains one at infinite frequency, else at the lowest. */
export function largestOnBoundary(system: FrequencySystem): Peak {
  const valueAt = gainOnBoundary(system);
  if (system.n === 0 || system.m === 0 || system.p === 0) return { at: 0, value: valueAt(0) };
  const places = startPlaces(system);
  let best = bestOf(valueAt, [Number.POSITIVE_INFINITY, ...places]);
  if (best.value === 0) best = bestOf(valueAt, morePlaces(system));
  best = climbAmong(system, valueAt, best, places);
  if (best.value <= NO_GAIN) return best;
  const form = boundaryForm(system);
  for (let round = 0; round < MOST_ROUNDS; round++) {
    if (!Number.isFinite(best.value)) throw new NumericalError("too-large", { what: "gain", limit: Number.MAX_VALUE });
    const inspected = partition(levelFrequencies(form, best.value * LEVEL));
    const top = bestOf(valueAt, inspected);
    if (!(top.value > best.value * LEVEL)) return best;
    best = climbAmong(system, valueAt, top, inspected);
  }
  throw new NumericalError("no-convergence", { routine: "peak-gain", limit: MOST_ROUNDS });
}

/** Largest singular value at a coordinate, infinite at a pole. */
function gainOnBoundary(system: FrequencySystem): (v: number) => number {
  const value = responseRoom(system);
  const room = singularRoom(system.p, system.m);
  return (v) => {
    if (!evaluateOnBoundary(system, v, value)) return Number.POSITIVE_INFINITY;
    return room.lines === 0 ? 0 : complexSingularValues(value.re, value.im, room)[0];
  };
}

function bestOf(valueAt: (v: number) => number, places: readonly number[]): Peak {
  let best: Peak = { at: 0, value: -1 };
  for (const at of places) {
    const value = valueAt(at);
    if (value > best.value * (1 + 4 * Number.EPSILON)) best = { at, value };
  }
  return best;
}

/**
 * Climbs from a place between its neighbours in a rising list, and no further than the nearest pole is away: within that
 * distance the response varies smoothly, however light its damping.
 */
export function climbAmong(
  system: FrequencySystem,
  valueAt: (v: number) => number,
  start: Peak,
  places: readonly number[],
  settled?: number,
): Peak {
  const { at, value } = start;
  if (at === 0 || !Number.isFinite(at) || !(value > 0) || !Number.isFinite(value)) return start;
  const reach = nearestPole(system, at);
  const below = Math.max(...places.filter((place) => place < at), at - reach, 0);
  const above = Math.min(...places.filter((place) => place > at), at + reach, 2 * at);
  return climb(valueAt, start, below, above, settled);
}

/** Distance to the nearest pole from a place on the boundary, in units of its coordinate. */
function nearestPole({ poles, period }: FrequencySystem, v: number): number {
  const s = boundaryPoint(v, period) ?? { re: 0, im: v };
  const nearest = poles.reduce(
    (least, pole) => Math.min(least, pythagoras(s.re - pole.re, s.im - pole.im)),
    Number.POSITIVE_INFINITY,
  );
  return period === null ? nearest : (nearest * (1 + v * v)) / 2;
}

/** Rest, infinity, and what the poles suggest: where they are nearest the boundary and as far from the origin. */
export function startPlaces({ poles, period }: Pick<FrequencySystem, "poles" | "period">): number[] {
  const places = [0, Number.POSITIVE_INFINITY];
  for (const pole of poles) {
    const size = Math.sqrt(pole.re * pole.re + pole.im * pole.im);
    if (period === null) places.push(Math.abs(pole.im), size);
    else places.push(Math.abs(pole.im) / (size + pole.re), shareOfCircle(pole));
  }
  return rising(places.filter((v) => v >= 0));
}

/** Size of (z - 1)/(z + 1). */
function shareOfCircle({ re, im }: Complex): number {
  return Math.sqrt(((re - 1) * (re - 1) + im * im) / ((re + 1) * (re + 1) + im * im));
}

/** More places than G has zeros, so that only G = 0 is zero at all of them. */
function morePlaces({ n, poles, period }: FrequencySystem): number[] {
  const unit = period === null ? poles.reduce((size, { re, im }) => Math.max(size, Math.abs(re), Math.abs(im)), 0) || 1 : 1;
  return Array.from({ length: 2 * n + 1 }, (_, k) => ((k + 1) / (n + 1)) * unit);
}
