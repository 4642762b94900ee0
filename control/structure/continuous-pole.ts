import { modulus } from "../linalg/complex";
import { complexLogarithm } from "../linalg/complex-logarithm";
import type { Complex, TimeBase } from "../plant/model";

/** What the trade reads off a pole; all null for a sampled pole at zero, which has no continuous counterpart. */
export type PoleFigures = {
  readonly naturalFrequency: number | null;
  readonly damping: number | null;
  readonly timeConstant: number | null;
};

/** The pole of the continuous motion that a sampled pole shows: s = ln z / h, null at z = 0. */
export function continuousPole(pole: Complex, timeBase: TimeBase): Complex | null {
  if (timeBase.kind === "continuous") return pole;
  if (pole.re === 0 && pole.im === 0) return null;
  const { re, im } = complexLogarithm(pole);
  return { re: re / timeBase.period, im: im / timeBase.period };
}

/** Distance of a pole from the stability boundary, positive inside: -Re s, or 1 - |z| when sampled. */
export function stabilityMargin(pole: Complex, timeBase: TimeBase): number {
  return timeBase.kind === "continuous" ? 0 - pole.re : 1 - modulus(pole);
}

/**
 * Natural frequency, damping and time constant of a pole.
 *
 * Units     rad/s, none, s
 * Accuracy  `accuracy` is how far off the pole may be, in its own plane: what is not above it counts as zero
 */
export function poleFigures(pole: Complex, timeBase: TimeBase, accuracy = 0): PoleFigures {
  const s = continuousPole(pole, timeBase);
  if (s === null) return { naturalFrequency: null, damping: null, timeConstant: null };
  const inS = timeBase.kind === "continuous" ? accuracy : accuracy / modulus(pole) / timeBase.period;
  const size = modulus(s);
  const timeConstant = Math.abs(stabilityMargin(pole, timeBase)) <= accuracy ? null : finite(-1 / s.re);
  if (size <= inS) return { naturalFrequency: 0, damping: null, timeConstant };
  return { naturalFrequency: finite(size), damping: finite(0 - s.re / size), timeConstant };
}

function finite(x: number): number | null {
  return Number.isFinite(x) ? x : null;
}
