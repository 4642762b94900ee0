import { exponentOf } from "../linalg/power-of-two";
import { bernsteinCoefficients, interpolationError, POINTS } from "./cell-basis";
import { type Cell, cellLadder } from "./cell-ladder";
import type { LoopDynamics } from "./loop-dynamics";
import { finishTracks, followPiece, isHopeless, type SignalTrack, sizeOf } from "./signal-track";
import type { TailBound } from "./tail-bound";

/** Last coefficients of a cell's polynomials, in parts of the signal, up to which the cell counts as resolved. */
const RESOLVED = 1e-10;
/** Doubling a cell raises them by 2^11 to 2^12. */
const EASY = RESOLVED / 8192;
/** Rounding beyond the sums' own that is put up with in long cells of stiff loops. */
const LEARNT_ROUNDING = 1e-8;
/** Cells before a longer one that failed is tried again, and failures after which the length is taken to be final. */
const PAUSE = 16;
const MANY_FAILURES = 16;
const MOST_DOUBLINGS = 60;
const ROUNDING = 64 * Number.EPSILON;

export type Walker = {
  readonly order: number;
  /** Rows of the watched signals, signals×order */
  readonly rows: Float64Array;
  readonly ladder: (level: number) => Cell;
  readonly firstLevel: number;
  /** Cells that the least damped mode can ask for while it fades. */
  readonly swings: number;
  readonly tail: TailBound;
};

/** Cells per radian of a swing, times the time constants in which it fades. */
const CELLS_PER_FADING = 12;

export function continuousWalker(
  dynamics: Pick<LoopDynamics, "a" | "order" | "poles">,
  rows: Float64Array,
  tail: TailBound,
): Walker {
  const { a, order, poles } = dynamics;
  const sizes = poles.map(({ re, im }) => Math.sqrt(re * re + im * im));
  const fastest = sizes.reduce((most, size) => Math.max(most, size), 0);
  const swings = poles.reduce((most, { re }, k) => Math.max(most, (CELLS_PER_FADING * sizes[k]) / -re), 0);
  const firstLevel = fastest > 0 ? -exponentOf(fastest) - 1 : 0;
  return { order, rows, ladder: cellLadder(a, order, rows), firstLevel, swings, tail };
}

/**
 * Follows the watched signals of a free motion until everything sought about them is proved, in cells whose length adapts
 * so that in each a polynomial of degree 12 through exact values stands for the signal.
 *
 * Accuracy  values to about 1e-11 of the signal's size, times likewise over its slope; where rounding in a stiff loop is larger,
 *           down to 1e-8, it is learnt and kept in the tracks as their noise
 * Limits    at most `limit` cells, tried or taken, fewer where these cannot suffice; what is not finished stays unfinished
 */
export function walkContinuous(walker: Walker, departure: Float64Array, tracks: readonly SignalTrack[], limit: number): void {
  const { order, ladder, tail, firstLevel } = walker;
  const pace = { size: tail.size(departure), count: 0 };
  let level = firstLevel;
  let state = departure;
  let time = 0;
  let before: Misses | null = null; // of the shorter cell before, when this one is tried because that one was easy
  let raiseFrom = 0;
  let failures = 0;
  for (let count = 0; count < limit; count++) {
    const size = tail.size(state);
    const factor = finishTracks(tracks, tail.gains, size);
    if (factor === null) return;
    const doubtful = limit < walker.swings || failures >= MANY_FAILURES || !(factor < Number.POSITIVE_INFINITY);
    if (doubtful && isHopeless(pace, size, factor, count, limit)) return;
    const cell = ladder(level);
    raiseNoise(walker.rows, order, state, tracks);
    const values = signalsIn(cell, state, order);
    const misses = missesOf(values, tracks);
    if (level === firstLevel || (before && isPutUpWith(misses, before))) learnNoise(misses, tracks);
    const worst = worstOf(misses, tracks);
    if (worst > RESOLVED) {
      if (before && isRounding(misses, before)) failures++;
      if (before) raiseFrom = count + PAUSE;
      before = null;
      level--;
      continue;
    }
    for (let i = 0; i < tracks.length; i++) {
      if (!tracks[i].finished) followPiece(tracks[i], bernsteinCoefficients(values, i * POINTS, tracks[i].final), time, cell.h);
    }
    state = timesVector(cell.phi, state, order);
    time += cell.h;
    const raise = worst < EASY && level < firstLevel + MOST_DOUBLINGS && count >= raiseFrom;
    before = raise ? misses : null;
    if (raise) level++;
  }
}

/** What the polynomials of a cell miss, and the sizes of the signals, one each per signal. */
type Misses = { readonly miss: Float64Array; readonly size: Float64Array };

function missesOf(values: Float64Array, tracks: readonly SignalTrack[]): Misses {
  const miss = new Float64Array(tracks.length);
  const size = Float64Array.from(tracks, sizeOf);
  for (let i = 0; i < tracks.length; i++) {
    if (tracks[i].finished) continue;
    miss[i] = interpolationError(values, i * POINTS);
    for (let j = 0; j < POINTS; j++) size[i] = Math.max(size[i], Math.abs(values[i * POINTS + j]));
  }
  return { miss, size };
}

/** Largest miss beyond the noise, in parts of the signal. */
function worstOf({ miss, size }: Misses, tracks: readonly SignalTrack[]): number {
  let worst = 0;
  for (let i = 0; i < tracks.length; i++) {
    const error = miss[i] - tracks[i].noise;
    if (error > 0 && !tracks[i].finished) worst = Math.max(worst, error / size[i]);
  }
  return worst;
}

/**
 * In a cell twice as long a smooth signal is missed by at most 2^12 as much, rounding grows twofold: what was missed by next to
 * nothing, or has hardly grown, is rounding.
 */
function isRounding({ miss, size }: Misses, before: Misses): boolean {
  for (let i = 0; i < miss.length; i++) {
    const allowed =
      before.miss[i] < EASY * before.size[i] ? Number.POSITIVE_INFINITY : Math.max(4 * before.miss[i], RESOLVED * size[i]);
    if (miss[i] > allowed) return false;
  }
  return true;
}

function isPutUpWith(misses: Misses, before: Misses): boolean {
  return isRounding(misses, before) && misses.miss.every((miss, i) => miss <= LEARNT_ROUNDING * misses.size[i]);
}

function learnNoise({ miss }: Misses, tracks: readonly SignalTrack[]): void {
  for (let i = 0; i < tracks.length; i++) tracks[i].noise = Math.max(tracks[i].noise, 1.5 * miss[i]);
}

/** Allows for the rounding of the sums that make each signal from the state. */
export function raiseNoise(rows: Float64Array, order: number, state: Float64Array, tracks: readonly SignalTrack[]): void {
  tracks.forEach((track, i) => {
    let sum = 0;
    for (let k = 0; k < order; k++) sum += Math.abs(rows[i * order + k] * state[k]);
    track.noise = Math.max(track.noise, ROUNDING * sum);
  });
}

function signalsIn({ nodes }: Cell, state: Float64Array, order: number): Float64Array {
  const values = new Float64Array(order === 0 ? 0 : nodes.length / order);
  for (let r = 0; r < values.length; r++) {
    let sum = 0;
    for (let k = 0; k < order; k++) sum += nodes[r * order + k] * state[k];
    values[r] = sum;
  }
  return values;
}

export function timesVector(m: Float64Array, v: Float64Array, n: number): Float64Array {
  const product = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let k = 0; k < n; k++) sum += m[i * n + k] * v[k];
    product[i] = sum;
  }
  return product;
}
