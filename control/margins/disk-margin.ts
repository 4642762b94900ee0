import { angleOf } from "./angle";
import type { PeakValue } from "./peak-gain";

/**
 * A disk of gain and phase variations that the loop bears: every factor (1 + δ/2)/(1 - δ/2), complex and frequency-dependent,
 * with |δ| below `size`. `lower`..`upper` encloses it, and `lower` is sure.
 */
export type DiskMargin = {
  readonly size: number;
  readonly lower: number;
  readonly upper: number;
  /** Where the first variation beyond it meets the boundary, in rad/s; null: approached as frequency grows without bound. */
  readonly frequency: number | null;
  /** Factors on the gain alone; `high` null when no factor above 1 is too large. */
  readonly gain: { readonly low: number; readonly high: number | null };
  /** Turn of the phase alone, rad, either way. */
  readonly phase: number;
};

/** A disk this near to the half plane of all positive factors, in roundings, is taken for it. */
const HALF_PLANE = 2 - 16 * Number.EPSILON;

/**
 * The disk margin from the largest size of S - 1/2 over all frequencies; null when S is 1/2 throughout.
 *
 * Units     size and factors none, phase rad
 * Accuracy  that of the peak
 * Source    Seiler, Packard & Gahinet, An introduction to disk margins, IEEE Control Systems Magazine 40 (2020) 78-95
 */
export function diskMargin({ value, lower, upper, frequency }: PeakValue): DiskMargin | null {
  if (value === 0) return null;
  const size = 1 / value;
  return {
    size,
    lower: 1 / upper,
    upper: 1 / lower,
    frequency,
    gain: { low: (2 - size) / (2 + size), high: size >= HALF_PLANE ? null : (2 + size) / (2 - size) },
    phase: 2 * angleOf({ re: 2, im: size }),
  };
}
