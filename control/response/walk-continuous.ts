import { exponentOf } from "../linalg/power-of-two";
import { workArray, workCopy } from "../linalg/work-array";
import { bernsteinCoefficients, interpolationError, LEBESGUE, POINTS } from "./cell-basis";
import { type Cell, cellLadder } from "./cell-ladder";
import type { Halt } from "./far-exit";
import type { LoopDynamics } from "./loop-dynamics";
import { finishTracks, followPiece, isHopeless, isUneventful, type SignalTrack, sizeOf } from "./signal-track";
import type { TailBound } from "./tail-bound";
import { timesVector } from "./times-vector";

/** Last coefficients of a cell's polynomials, in parts of the signal, up to which the cell counts as resolved. */
const RESOLVED = 1e-11;
/** Ample where only the settling time is sought, and that for no more than the time axis. */
export const ROUGHLY_RESOLVED = 1e-6;
/** A cell as many times better resolved than it has to be is followed by one twice as long, which costs 2^11 to 2^12. */
const EASIER = 8192;
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
 * Follows the watched signals of a free motion from a place on it until everything sought about them is proved, in cells whose length adapts
 * so that in each a polynomial of degree 12 through exact values stands for the signal.
 *
 * Accuracy  `resolved` in parts of the signal's size, times likewise over its slope; where rounding in a stiff loop is larger,
 *           down to 1e-8, it is learnt and kept in the tracks as their noise
 * Limits    at most `limit` cells, tried or taken, fewer where these cannot suffice; what is not finished stays unfinished, and
 *           the place where the walk stopped is returned
 */
export function walkContinuous(
  walker: Walker,
  from: Halt,
  tracks: readonly SignalTrack[],
  limit: number,
  resolved = RESOLVED,
): Halt | null {
  const { order, ladder, tail, firstLevel } = walker;
  const pace = { size: tail.size(from.state), count: 0 };
  const values = workArray(tracks.length * POINTS);
  let [here, other] = [newMisses(tracks.length), newMisses(tracks.length)];
  let [state, after] = [workCopy(from.state), workArray(order)];
  let level = firstLevel;
  let time = from.time;
  let before: Misses | null = null; // of the shorter cell before, when this one is tried because that one was easy
  let raiseFrom = 0;
  let failures = 0;
  for (let count = 0; count < limit; count++) {
    const size = tail.size(state);
    const factor = finishTracks(tracks, tail.gains, size);
    if (factor === null) return null;
    const doubtful = limit < walker.swings || failures >= MANY_FAILURES || !(factor < Number.POSITIVE_INFINITY);
    if (doubtful && isHopeless(pace, size, factor, count, limit)) break;
    const cell = ladder(level);
    raiseNoise(walker.rows, order, state, tracks);
    timesVector(cell.nodes, state, order, values);
    measureMisses(values, tracks, here);
    if (level === firstLevel || (before && isPutUpWith(here, before, resolved))) learnNoise(here, tracks);
    const worst = worstOf(here, tracks);
    if (worst > resolved) {
      if (before && isRounding(here, before, resolved)) failures++;
      if (before) raiseFrom = count + PAUSE;
      before = null;
      level--;
      continue;
    }
    followCell(tracks, values, time, cell.h);
    timesVector(cell.phi, state, order, after);
    [state, after] = [after, state];
    time += cell.h;
    const raise = worst < resolved / EASIER && level < firstLevel + MOST_DOUBLINGS && count >= raiseFrom;
    before = raise ? here : null;
    if (!raise) continue;
    [here, other] = [other, here];
    level++;
  }
  return { time, state };
}

const coefficients = new Float64Array(POINTS);

/** Every unfinished signal takes in its stretch; those whose values alone show that nothing happens need no polynomial. */
function followCell(tracks: readonly SignalTrack[], values: Float64Array, time: number, h: number): void {
  for (let i = 0; i < tracks.length; i++) {
    const track = tracks[i];
    if (track.finished) continue;
    let low = values[i * POINTS];
    let high = low;
    for (let j = i * POINTS + 1; j < (i + 1) * POINTS; j++) {
      const value = values[j];
      if (value < low) low = value;
      else if (value > high) high = value;
    }
    const middle = track.final + (low + high) / 2;
    const reach = (LEBESGUE * (high - low)) / 2;
    if (isUneventful(track, middle - reach, middle + reach)) continue;
    bernsteinCoefficients(values, i * POINTS, track.final, coefficients);
    followPiece(track, coefficients, time, h);
  }
}

/** What the polynomials of a cell miss, and the sizes of the signals, one each per signal. */
type Misses = { readonly miss: Float64Array; readonly size: Float64Array };

function newMisses(signals: number): Misses {
  return { miss: workArray(signals), size: workArray(signals) };
}

function measureMisses(values: Float64Array, tracks: readonly SignalTrack[], { miss, size }: Misses): void {
  for (let i = 0; i < tracks.length; i++) {
    let most = sizeOf(tracks[i]);
    miss[i] = 0;
    if (!tracks[i].finished) {
      miss[i] = interpolationError(values, i * POINTS);
      for (let j = i * POINTS; j < (i + 1) * POINTS; j++) {
        const value = Math.abs(values[j]);
        if (value > most) most = value;
      }
    }
    size[i] = most;
  }
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
function isRounding({ miss, size }: Misses, before: Misses, resolved: number): boolean {
  for (let i = 0; i < miss.length; i++) {
    const next = before.miss[i] < (resolved / EASIER) * before.size[i];
    const allowed = next ? Number.POSITIVE_INFINITY : Math.max(4 * before.miss[i], resolved * size[i]);
    if (miss[i] > allowed) return false;
  }
  return true;
}

function isPutUpWith(misses: Misses, before: Misses, resolved: number): boolean {
  const { miss, size } = misses;
  for (let i = 0; i < miss.length; i++) if (miss[i] > LEARNT_ROUNDING * size[i]) return false;
  return isRounding(misses, before, resolved);
}

function learnNoise({ miss }: Misses, tracks: readonly SignalTrack[]): void {
  for (let i = 0; i < tracks.length; i++) tracks[i].noise = Math.max(tracks[i].noise, 1.5 * miss[i]);
}

/** Allows for the rounding of the sums that make each signal from the state. */
export function raiseNoise(rows: Float64Array, order: number, state: Float64Array, tracks: readonly SignalTrack[]): void {
  for (let i = 0; i < tracks.length; i++) {
    let sum = 0;
    for (let k = 0, at = i * order; k < order; k++, at++) sum += Math.abs(rows[at] * state[k]);
    if (ROUNDING * sum > tracks[i].noise) tracks[i].noise = ROUNDING * sum;
  }
}
