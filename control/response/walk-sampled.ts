import { flatProduct } from "../linalg/flat";
import { finishTracks, followSample, isHopeless, type SignalTrack } from "./signal-track";
import type { TailBound } from "./tail-bound";
import { raiseNoise, timesVector } from "./walk-continuous";

/** Samples that one stacked product gives at once. */
export const BLOCK = 16;

export type SampledWalker = {
  readonly order: number;
  readonly period: number;
  readonly rows: Float64Array;
  /** Signals now, one sample later, ..., 15 later: (signals · BLOCK)×order, the samples of one moment together. */
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
  return { order, period, rows, block: signalBlock(a, order, rows, BLOCK), phi: transitionPower(a, order, BLOCK), tail };
}

/** Rows, rows·a, rows·a², ... stacked `length` times. */
export function signalBlock(a: Float64Array, order: number, rows: Float64Array, length: number): Float64Array {
  const signals = order === 0 ? 0 : rows.length / order;
  const block = new Float64Array(rows.length * length);
  let moved = rows;
  for (let k = 0; k < length; k++) {
    block.set(moved, k * rows.length);
    if (k + 1 < length) moved = flatProduct(moved, a, signals, order, order);
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
  const signals = tracks.length;
  const pace = { size: tail.size(departure), count: 0 };
  let state = departure;
  for (let first = 0; first < limit; first += BLOCK) {
    const size = tail.size(state);
    const factor = finishTracks(tracks, tail.gains, size);
    if (factor === null || isHopeless(pace, size, factor, first, limit)) return;
    raiseNoise(rows, order, state, tracks);
    for (let i = 0; i < signals; i++) {
      const track = tracks[i];
      if (track.finished) continue;
      for (let k = 0; k < BLOCK; k++) {
        const row = (k * signals + i) * order;
        let departed = 0;
        for (let j = 0; j < order; j++) departed += block[row + j] * state[j];
        followSample(track, track.final + departed, first + k, period);
      }
    }
    state = timesVector(phi, state, order);
  }
}
