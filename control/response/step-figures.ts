import type { SignalFigures } from "../design/evidence";
import { requireRepresentable } from "../linalg/require-representable";
import { hasSetPoint, type SignalTrack, settledAt, sizeOf } from "./signal-track";

export const SETTLING_BAND = 0.02;
/** Parts of the final value that count as rounding. */
const NO_OVERSHOOT = 1e-12;

/**
 * Figures of one signal of a step response over all t ≥ 0. `whole` also gives rise, settling, overshoot and undershoot; they are
 * null where the final value is negligible, where the signal never gets there, or where the work allowed did not prove them.
 *
 * Units     final and peak in the signal's unit, times in seconds, overshoot and undershoot in percent of the final value
 * Throws    too-large for a peak beyond the largest double
 * Accuracy  as the walk that filled the track
 * Source    rise 10 to 90 %, settling to 2 %: IEC 60050-351
 */
export function signalFigures(track: SignalTrack, whole: boolean): SignalFigures {
  const { final, finished, rising } = track;
  const { peak, peakAt } = peakOf(track);
  requireRepresentable("response", [final, peak]);
  const measurable = whole && finished && hasSetPoint(track) && Math.abs(final) > 4 * track.noise;
  if (!measurable) return { final, peak, peakAt, overshoot: null, undershoot: null, rise: null, settling: null };
  const size = Math.abs(final);
  const beyond = (rising > 0 ? track.high.value : -track.low.value) - size;
  const behind = rising > 0 ? -track.low.value : track.high.value;
  const percent = (part: number) => (part > Math.max(NO_OVERSHOOT * size, track.noise) ? 100 * (part / size) : 0);
  const rise = track.reached10 === null || track.reached90 === null ? null : track.reached90 - track.reached10;
  return { final, peak, peakAt, overshoot: percent(beyond), undershoot: percent(behind), rise, settling: settledAt(track) };
}

/** Largest absolute value, and when; null for the time when it is only approached. */
export function peakOf(track: SignalTrack): { peak: number; peakAt: number | null } {
  const { high, low, final } = track;
  const extreme = Math.abs(high.value) >= Math.abs(low.value) ? high : low;
  const peak = Math.abs(extreme.value);
  const margin = Math.max(NO_OVERSHOOT * sizeOf(track), track.noise);
  if (peak <= Math.abs(final) + margin) return { peak: Math.max(peak, Math.abs(final)), peakAt: null };
  return { peak, peakAt: extreme.at };
}
