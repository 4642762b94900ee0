import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { workArray } from "../linalg/work-array";
import { type Extreme, firstReaching, largest, lastOutside, maximumAbove, negative, smallest } from "./bernstein";

/** A polynomial that stands for the signal over [from, from + length]. */
type Stretch = { readonly b: Float64Array; readonly from: number; readonly length: number };

/** The band around the final value whose last exit is wanted: so many units wide to each side, or a share of the largest departure. */
export type Band = { readonly width: number } | { readonly share: number };

export const NO_BAND: Band = { width: Number.POSITIVE_INFINITY };

/** All figures of a step, the extremes of an effort, or no more than when a free motion has settled. */
export type Sought = "figures" | "effort" | "settling";

/** What is being found out about one signal along its response. */
export type SignalTrack = {
  readonly final: number;
  readonly band: Band;
  readonly sought: Sought;
  /** 1 or -1: the signal is to go up or down to its final value. */
  readonly rising: 1 | -1;
  high: Extreme;
  low: Extreme;
  reached10: number | null;
  reached90: number | null;
  /** Since the last stretch that was surely outside the band: it, and those that may have been. */
  excursions: Stretch[];
  /** Sampled: first moment after the last sample outside the band. */
  exit: number | null;
  /** Largest rounding error that may be in a value. */
  noise: number;
  /** What was sought is proved for all later times. */
  finished: boolean;
};

/** Parts of the size of a signal below which a further departure cannot matter. */
const NEGLIGIBLE = 1e-12;
/** A final value below this part of the signal's peak is no set point to measure against. */
const NEGLIGIBLE_FINAL = 1e-6;

export function startTrack(final: number, band: Band, start: number, sought: Sought): SignalTrack {
  return {
    final,
    band,
    sought,
    rising: final < 0 ? -1 : 1,
    high: { value: start, at: 0 },
    low: { value: start, at: 0 },
    reached10: null,
    reached90: null,
    excursions: [],
    exit: null,
    noise: 0,
    finished: false,
  };
}

export function sizeOf({ high, low, final }: SignalTrack): number {
  return Math.max(Math.abs(high.value), Math.abs(low.value), Math.abs(final));
}

export function largestDeparture({ high, low, final }: SignalTrack): number {
  return Math.max(high.value - final, final - low.value);
}

/** Whether rise, settling and overshoot have a meaning; what has none once never has one again, since peaks only grow. */
export function hasSetPoint(track: SignalTrack): boolean {
  return Math.abs(track.final) > NEGLIGIBLE_FINAL * sizeOf(track);
}

/** Half the width of the band; infinite where there is nothing to settle to. */
export function bandOf(track: SignalTrack): number {
  if ("share" in track.band) return track.band.share * largestDeparture(track);
  return track.sought === "settling" || hasSetPoint(track) ? track.band.width : Number.POSITIVE_INFINITY;
}

function marginOf(track: SignalTrack): number {
  return Math.max(track.noise, 1e-14 * sizeOf(track));
}

export function seeksRise(track: SignalTrack): boolean {
  return track.sought === "figures" && track.reached90 === null && hasSetPoint(track);
}

/** Whether a stretch that stays between `bottom` and `top` changes nothing of what is sought. */
export function isUneventful(track: SignalTrack, bottom: number, top: number): boolean {
  const { high, low, final } = track;
  const margin = marginOf(track);
  if (top > high.value + margin || bottom < low.value - margin || seeksRise(track)) return false;
  const width = bandOf(track);
  return top <= final + width && bottom >= final - width;
}

/** Takes in the polynomial piece b over [from, from + length]; b is copied where it is kept. */
export function followPiece(track: SignalTrack, b: Float64Array, from: number, length: number): void {
  const margin = marginOf(track);
  const top = largest(b);
  const bottom = smallest(b);
  const higher = top > track.high.value + margin ? maximumAbove(b, track.high.value, margin) : null;
  if (higher) track.high = { value: higher.value, at: from + higher.at * length };
  const lower = bottom < track.low.value - margin ? maximumAbove(negative(b), -track.low.value, margin) : null;
  if (lower) track.low = { value: -lower.value, at: from + lower.at * length };
  if (seeksRise(track)) followRise(track, b, from, length);
  const width = bandOf(track);
  if (top <= track.final + width && bottom >= track.final - width) return;
  const last = b.length - 1;
  const surely = Math.abs(b[0] - track.final) > width || Math.abs(b[last] - track.final) > width;
  const kept = (surely && track.excursions[0]?.b) || workArray(b.length);
  kept.set(b);
  if (surely) track.excursions.length = 0;
  track.excursions.push({ b: kept, from, length });
}

function followRise(track: SignalTrack, b: Float64Array, from: number, length: number): void {
  const size = Math.abs(track.final);
  const upward = track.rising > 0 ? b : negative(b);
  if (track.reached10 === null) {
    const at = firstReaching(upward, 0.1 * size);
    if (at !== null) track.reached10 = from + at * length;
  }
  if (track.reached10 === null) return;
  const at = firstReaching(upward, 0.9 * size);
  if (at !== null) track.reached90 = from + at * length;
}

/** Takes in sample number `index` of a sampled loop; a sample outside the band leaves it at the next one. */
export function followSample(track: SignalTrack, value: number, index: number, period: number): void {
  const time = index * period;
  const { high, low, final } = track;
  const margin = marginOf(track);
  if (value > high.value + margin) track.high = { value, at: time };
  if (value < low.value - margin) track.low = { value, at: time };
  if (track.reached90 === null) {
    const upward = value * track.rising;
    const size = Math.abs(final);
    if (track.reached10 === null && upward >= 0.1 * size) track.reached10 = time;
    if (upward >= 0.9 * size) track.reached90 = time;
  }
  if (Math.abs(value - final) > bandOf(track)) track.exit = (index + 1) * period;
}

/** When the signal enters its band for good; 0 when it never was outside. Right only for a finished track. */
export function settledAt(track: SignalTrack): number {
  const width = bandOf(track);
  for (let k = track.excursions.length - 1; k >= 0; k--) {
    const { b, from, length } = track.excursions[k];
    const out = lastOutside(b, track.final - width, track.final + width);
    if (out !== null) return from + out * length;
  }
  return track.exit ?? 0;
}

/**
 * Marks every track finished that no departure within its bound of the final value can change. What is returned is the factor
 * by which the size of what is to come has still to fall for the next track to be finished; null when all are.
 */
export function finishTracks(tracks: readonly SignalTrack[], gains: Float64Array, size: number): number | null {
  let next: number | null = null;
  for (let i = 0; i < tracks.length; i++) {
    const track = tracks[i];
    const wanted = Math.max(NEGLIGIBLE * sizeOf(track), 4 * track.noise, harmlessDeparture(track, bandOf(track)));
    const bound = gains[i] * size;
    track.finished = bound <= wanted;
    if (track.finished) continue;
    const factor = wanted > 0 ? bound / wanted : Number.POSITIVE_INFINITY;
    if (next === null || factor < next) next = factor;
  }
  return next;
}

/** Largest later departure from the final value, to either side, within the band, that leaves what is sought as it stands. */
export function harmlessDeparture(track: SignalTrack, band: number): number {
  const { high, low, final, sought } = track;
  if (sought === "settling") return Math.min(largestDeparture(track), band);
  // Without a set point the peak is all there is to tell, on whichever side it stands.
  if (sought === "figures" && !hasSetPoint(track)) return sizeOf(track) - Math.abs(final);
  const above = Math.max(high.value, final, 0) - final;
  const below = final - Math.min(low.value, final, 0);
  return Math.min(above, below, band);
}

/** What the size of what is to come was at the last look, and when that was. */
export type Pace = { size: number; count: number };

const LOOK_EVERY = 1024;

/** Whether, at the pace since the last look, the steps that are left cannot bring the size down by `factor`. */
export function isHopeless(pace: Pace, size: number, factor: number, count: number, limit: number): boolean {
  if (count - pace.count < LOOK_EVERY) return false;
  const fall = roughLog2(pace.size / size) / (count - pace.count);
  pace.size = size;
  pace.count = count;
  return !(fall * (limit - count) >= roughLog2(factor));
}

/** Base-2 logarithm to within 0.09, the same in every engine; NaN and infinity stay what they are. */
function roughLog2(x: number): number {
  if (!(x > 0 && x < Number.POSITIVE_INFINITY)) return x === 0 ? Number.NEGATIVE_INFINITY : x;
  const exponent = exponentOf(x);
  return exponent + (x / powerOfTwo(exponent) - 1);
}
