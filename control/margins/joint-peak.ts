import { NumericalError } from "../errors";
import { complexSingularValues, singularRoom } from "../linalg/complex-singular-values";
import { powerOfTwo } from "../linalg/power-of-two";
import { type BoundaryForm, boundaryForm } from "./boundary-form";
import { levelFrequencies } from "./level-frequencies";
import { innerPlaces } from "./partition";
import { climbAmong, startPlaces } from "./peak-gain";
import type { Peak } from "./peak-search";
import type { FrequencySystem } from "./prepare-frequency";
import { evaluateOnBoundary, responseRoom } from "./response-at";
import { type ScaledBound, scaledBound } from "./scaled-bound";
import { variationBound } from "./variation-bound";

/**
 * In units of 2^size: the bound is `value` at the coordinate `at` and below `upper` everywhere; the structured singular value
 * there is at least `lower`.
 */
export type JointPeak = Peak & { readonly lower: number; readonly upper: number };

/** How far above the largest bound found the level starts below which every frequency must be shown to stay; */
const SLACK = 2 ** -24;
/** where two singular values meet, scales clear little: then the level rises fourfold after so many rounds. */
const PATIENCE = 32;
const MOST_ROUNDS = 10 * PATIENCE;
/** Bounds of neighbouring frequencies are told apart down to this. */
const SETTLED = 2 ** -36;

const EXACT_CHANNELS = 3;

type Interval = readonly [number, number];

/**
 * Largest value over all frequencies of the scaled bound of G, the structured singular value for one complex factor on each
 * channel. One scale D clears every frequency at which D G D⁻¹ stays below the level, which its Hamiltonian tells; the scale
 * of a frequency that is still open clears at least its neighbourhood, until nothing is open.
 *
 * Shapes    a stable system with as many inputs as outputs, k ≥ 1
 * Throws    no-convergence; too-large
 * Accuracy  value as `scaledBound` at the peak; upper is 2^-24 above it after up to 32 rounds, and four times that for every
 *           32 more; at most 320
 * Source    Sideris & Sánchez Peña, IEEE Trans. Autom. Control 34 (1989) 1272-1278, for the idea (from memory)
 */
export function jointPeak(system: FrequencySystem): JointPeak {
  const boundAt = scaledBoundOf(system);
  const valueAt = (v: number) => boundAt(v).upper;
  let best = startPeak(system, valueAt);
  const finish = (slack: number) => ({
    ...best,
    lower: lowerAt(system, best.at, boundAt(best.at).lower),
    upper: best.value * (1 + slack),
  });
  if (system.n === 0 || best.value === 0) return finish(0);
  const form = boundaryForm(system);
  let open: Interval[] = [[0, Number.POSITIVE_INFINITY]];
  let scale = boundAt(best.at).scale;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const slack = SLACK * powerOfTwo(2 * Math.trunc(round / PATIENCE));
    const level = best.value * (1 + slack);
    open = stillOpen(system, form, open, scale, level);
    const next = open[0];
    if (next === undefined) return finish(slack);
    const v = placeIn(next, best.at, round);
    const here = boundAt(v);
    scale = here.scale;
    if (!(here.upper > level)) continue;
    best = climbAmong(system, valueAt, { at: v, value: here.upper }, next, SETTLED);
    scale = boundAt(best.at).scale;
  }
  throw new NumericalError("no-convergence", { routine: "joint-peak", limit: MOST_ROUNDS });
}

/** For up to three channels the scaled bound is the structured singular value; beyond, a variation has to be shown. */
function lowerAt(system: FrequencySystem, v: number, dual: number): number {
  const value = responseRoom(system);
  if (!evaluateOnBoundary(system, v, value)) return 0;
  const shown = variationBound(value, system.m);
  return system.m <= EXACT_CHANNELS ? Math.max(shown, dual) : shown;
}

function scaledBoundOf(system: FrequencySystem): (v: number) => ScaledBound {
  const value = responseRoom(system);
  return (v) => {
    if (!evaluateOnBoundary(system, v, value)) throw new NumericalError("too-large", { what: "gain", limit: Number.MAX_VALUE });
    return scaledBound(value, system.m);
  };
}

function startPeak(system: FrequencySystem, valueAt: (v: number) => number): Peak {
  if (system.n === 0) return { at: 0, value: valueAt(0) };
  const places = startPlaces(system);
  let best: Peak = { at: Number.POSITIVE_INFINITY, value: valueAt(Number.POSITIVE_INFINITY) };
  for (const at of places) {
    const value = valueAt(at);
    if (value > best.value * (1 + SETTLED)) best = { at, value };
  }
  return climbAmong(system, valueAt, best, places, SETTLED);
}

/** The parts of open intervals in which D G D⁻¹ is not shown to stay below the level. */
function stillOpen(
  system: FrequencySystem,
  form: BoundaryForm,
  open: readonly Interval[],
  scale: Float64Array,
  level: number,
): Interval[] {
  const cuts = levelFrequencies(scaledForm(form, scale), level);
  const gainAt = scaledGain(system, scale);
  const edges = [0, ...cuts.filter((v) => v > 0), Number.POSITIVE_INFINITY];
  const left: Interval[] = [];
  for (let k = 0; k + 1 < edges.length; k++) {
    const [from, to] = [edges[k], edges[k + 1]];
    const parts = open.flatMap(([low, high]): Interval[] => {
      const part: Interval = [Math.max(low, from), Math.min(high, to)];
      return part[0] < part[1] ? [part] : [];
    });
    if (parts.length > 0 && !innerPlaces(from, to).every((v) => gainAt(v) < level)) left.push(...parts);
  }
  return joined(left);
}

/** Intervals that touch are one; slivers no wider than rounding hold no frequency of their own. */
function joined(intervals: readonly Interval[]): Interval[] {
  const whole: Interval[] = [];
  for (const [from, to] of intervals) {
    const last = whole.at(-1);
    if (last && last[1] === from) whole[whole.length - 1] = [last[0], to];
    else whole.push([from, to]);
  }
  return whole.filter(([from, to]) => from < to * (1 - 16 * Number.EPSILON));
}

/** An inner place: the middle, in proportion where the interval spans much; every other round its end at rest. */
function placeIn([from, to]: Interval, unit: number, round: number): number {
  if (from === 0 && round % 2 === 0) return 0;
  if (!Number.isFinite(to)) return from > 0 ? 4 * from : Number.isFinite(unit) && unit > 0 ? unit : 1;
  if (from === 0) return to / 4;
  return to > 16 * from ? Math.sqrt(from) * Math.sqrt(to) : from + (to - from) / 2;
}

function scaledForm(form: BoundaryForm, scale: Float64Array): BoundaryForm {
  const { n, m } = form;
  return {
    ...form,
    b: form.b.map((x, at) => x / scale[at % m]),
    c: form.c.map((x, at) => x * scale[Math.trunc(at / n)]),
    d: form.d.map((x, at) => (x * scale[Math.trunc(at / m)]) / scale[at % m]),
  };
}

function scaledGain(system: FrequencySystem, scale: Float64Array): (v: number) => number {
  const { m } = system;
  const value = responseRoom(system);
  const room = singularRoom(m, m);
  return (v) => {
    if (!evaluateOnBoundary(system, v, value)) return Number.POSITIVE_INFINITY;
    for (let at = 0; at < m * m; at++) {
      const factor = scale[Math.trunc(at / m)] / scale[at % m];
      value.re[at] *= factor;
      value.im[at] *= factor;
    }
    return complexSingularValues(value.re, value.im, room)[0];
  };
}
