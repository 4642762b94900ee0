import { exponentOf } from "../linalg/power-of-two";
import { bernsteinCoefficients, interpolationError, POINTS } from "./cell-basis";
import { type Cell, cellLadder } from "./cell-ladder";
import { finishTracks, followPiece, type SignalTrack, sizeOf } from "./signal-track";
import type { TailBound } from "./tail-bound";

/** Last coefficients of a cell's polynomials, in parts of the signal, up to which the cell counts as resolved. */
const RESOLVED = 1e-10;
/** Doubling a cell raises them by 2^11 to 2^12. */
const EASY = RESOLVED / 8192;
const ROUNDING = 64 * Number.EPSILON;

export type Walker = {
  readonly order: number;
  /** Rows of the watched signals, signals×order */
  readonly rows: Float64Array;
  readonly ladder: (level: number) => Cell;
  readonly firstLevel: number;
  readonly tail: TailBound;
};

export function continuousWalker(a: Float64Array, order: number, rows: Float64Array, fastest: number, tail: TailBound): Walker {
  return { order, rows, ladder: cellLadder(a, order, rows), firstLevel: fastest > 0 ? -exponentOf(fastest) - 1 : 0, tail };
}

/**
 * Follows the watched signals of a free motion until everything sought about them is proved, in cells whose length adapts
 * so that in each a polynomial of degree 12 through exact values stands for the signal.
 *
 * Accuracy  values to about 1e-11 of the signal's size, times likewise over its slope
 * Limits    at most `limit` cells, tried or taken; what is not finished by then stays unfinished
 */
export function walkContinuous(walker: Walker, departure: Float64Array, tracks: readonly SignalTrack[], limit: number): void {
  const { order, ladder, tail } = walker;
  const ceiling = walker.firstLevel + 60;
  let level = walker.firstLevel;
  let state = departure;
  let time = 0;
  for (let count = 0; count < limit; count++) {
    if (finishTracks(tracks, tail.gains, tail.size(state))) return;
    const cell = ladder(level);
    raiseNoise(walker.rows, order, state, tracks);
    const values = signalsIn(cell, state, order);
    if (level === walker.firstLevel) learnNoise(values, tracks);
    const error = worstError(values, tracks);
    if (error > RESOLVED) {
      level--;
      continue;
    }
    tracks.forEach((track, i) => {
      if (!track.finished) followPiece(track, bernsteinCoefficients(values, i * POINTS, track.final), time, cell.h);
    });
    state = timesVector(cell.phi, state, order);
    time += cell.h;
    if (error < EASY && level < ceiling) level++;
  }
}

/** In cells shorter than the fastest pole's time the polynomial is exact to the last digit: what it misses is rounding. */
function learnNoise(values: Float64Array, tracks: readonly SignalTrack[]): void {
  for (let i = 0; i < tracks.length; i++) tracks[i].noise = Math.max(tracks[i].noise, interpolationError(values, i * POINTS));
}

/** Largest interpolation error of a watched signal over its size, rounding left out. */
function worstError(values: Float64Array, tracks: readonly SignalTrack[]): number {
  let worst = 0;
  tracks.forEach((track, i) => {
    if (track.finished) return;
    const error = interpolationError(values, i * POINTS) - track.noise;
    let size = sizeOf(track);
    for (let j = 0; j < POINTS; j++) size = Math.max(size, Math.abs(values[i * POINTS + j]));
    if (error > 0) worst = Math.max(worst, error / size);
  });
  return worst;
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
