import { flatProduct, flatProductInto } from "../linalg/flat";
import { workArray, workCopy } from "../linalg/work-array";
import { finishTracks, followSample, isHopeless, isUneventful, type SignalTrack } from "./signal-track";
import type { TailBound } from "./tail-bound";
import { timesVector } from "./times-vector";
import { raiseNoise } from "./walk-continuous";

/** Samples that one stacked product gives at once. */
export const BLOCK = 16;

export type SampledWalker = {
  readonly order: number;
  readonly period: number;
  readonly rows: Float64Array;
  /** Signals now, one sample later, ..., 15 later: (signals · BLOCK)×order, the samples of one signal together. */
  readonly block: Float64Array;
  /** A^BLOCK */
  readonly phi: Float64Array;
  readonly tail: TailBound;
};

export function sampledWalker(
  a: Float64Array,
  order: number,
  rows: Float64Array,
  period: number,
  tail: TailBound,
): SampledWalker {
  return { order, period, rows, block: signalBlock(a, order, rows), phi: transitionPower(a, order, BLOCK), tail };
}

/** rows, rows·a, ..., rows·a^15, those of one signal together. */
export function signalBlock(a: Float64Array, order: number, rows: Float64Array): Float64Array {
  const signals = order === 0 ? 0 : rows.length / order;
  const block = workArray(rows.length * BLOCK);
  let [moved, more] = [workCopy(rows), workArray(rows.length)];
  for (let k = 0; k < BLOCK; k++) {
    if (k > 0) {
      flatProductInto(more, moved, a, signals, order, order);
      [moved, more] = [more, moved];
    }
    for (let i = 0, from = 0; i < signals; i++)
      for (let to = (i * BLOCK + k) * order, end = to + order; to < end; to++) block[to] = moved[from++];
  }
  return block;
}

/** a^k for k ≥ 1 by squaring. */
export function transitionPower(a: Float64Array, n: number, k: number): Float64Array {
  let square = a;
  let power: Float64Array | null = null;
  for (let rest = k; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) power = power ? flatProduct(power, square, n, n, n) : square;
    if (rest > 1) square = flatProduct(square, square, n, n, n);
  }
  return power ?? a;
}

/**
 * Follows the watched signals of a sampled loop, every sample of them, until everything sought about them is proved.
 *
 * Accuracy  the recursion's own rounding
 * Limits    at most `limit` samples, fewer where these cannot suffice; what is not finished stays unfinished
 */
export function walkSampled(walker: SampledWalker, departure: Float64Array, tracks: readonly SignalTrack[], limit: number): void {
  const { order, period, rows, block, phi, tail } = walker;
  const pace = { size: tail.size(departure), count: 0 };
  const values = workArray(tracks.length * BLOCK);
  let [state, after] = [workCopy(departure), workArray(order)];
  for (let first = 0; first < limit; first += BLOCK) {
    const size = tail.size(state);
    const factor = finishTracks(tracks, tail.gains, size);
    if (factor === null || isHopeless(pace, size, factor, first, limit)) return;
    raiseNoise(rows, order, state, tracks);
    timesVector(block, state, order, values);
    for (let i = 0; i < tracks.length; i++) if (!tracks[i].finished) followBlock(tracks[i], values, i * BLOCK, first, period);
    timesVector(phi, state, order, after);
    [state, after] = [after, state];
  }
}

function followBlock(track: SignalTrack, values: Float64Array, at: number, first: number, period: number): void {
  let low = values[at];
  let high = low;
  for (let k = at + 1; k < at + BLOCK; k++) {
    if (values[k] < low) low = values[k];
    else if (values[k] > high) high = values[k];
  }
  if (isUneventful(track, track.final + low, track.final + high)) return;
  for (let k = 0; k < BLOCK; k++) followSample(track, track.final + values[at + k], first + k, period);
}
