import { factorShiftedHessenberg, solveShiftedHessenberg } from "../linalg/complex-hessenberg";
import { largestEntry } from "../linalg/flat";
import { timesPowerOfTwo } from "../linalg/power-of-two";
import type { Complex } from "../plant/model";
import { angleOf } from "./angle";
import type { FrequencySystem } from "./prepare-frequency";

/** p×m row-major, in units of 2^size of the system it belongs to. */
export type ResponseValue = { readonly re: Float64Array; readonly im: Float64Array };

export function responseRoom({ m, p }: FrequencySystem): ResponseValue {
  return { re: new Float64Array(p * m), im: new Float64Array(p * m) };
}

/**
 * G(s) into `value`; false where it is unbounded: s is a pole within the accuracy of the pole.
 *
 * Units     s in those of the poles; value times 2^size has the units of y/u
 * Accuracy  backward stable solve; 4 n² m real multiplications and additions
 * Source    Laub, IEEE Trans. Autom. Control 26 (1981) 407-408
 */
export function evaluateResponse(system: FrequencySystem, s: Complex, value: ResponseValue): boolean {
  const { n, m, p, h, b, d, rate, room } = system;
  value.im.fill(0);
  value.re.set(d);
  if (n === 0 || m === 0 || p === 0) return true;
  if (poleAt(system, s) !== null) return false;
  const shifted = { re: timesPowerOfTwo(s.re, rate), im: timesPowerOfTwo(s.im, rate) };
  if (!Number.isFinite(shifted.re) || !Number.isFinite(shifted.im)) return true;
  factorShiftedHessenberg(h, n, shifted, room.factors);
  if (room.factors.zeroPivot >= 0) return false;
  room.re.set(b);
  room.im.fill(0);
  solveShiftedHessenberg(room.factors, room.re, room.im, m);
  for (let i = 0; i < p; i += 2) for (let j = 0; j < m; j++) addRowsTimesColumn(system, i, j, value);
  return Number.isFinite(largestEntry(value.re)) && Number.isFinite(largestEntry(value.im));
}

/** Rows i and i + 1 of c times column j of the states, which the room holds; four sums at a time stay in registers. */
function addRowsTimesColumn({ n, m, p, c, room }: FrequencySystem, i: number, j: number, value: ResponseValue): void {
  const { re, im } = room;
  const second = i + 1 < p ? n : 0;
  let [ar, ai, br, bi] = [0, 0, 0, 0];
  for (let at = i * n, from = j; at < (i + 1) * n; at++, from += m) {
    const x = re[from];
    const y = im[from];
    ar += c[at] * x;
    ai += c[at] * y;
    br += c[at + second] * x;
    bi += c[at + second] * y;
  }
  value.re[i * m + j] += ar;
  value.im[i * m + j] += ai;
  if (second === 0) return;
  value.re[(i + 1) * m + j] += br;
  value.im[(i + 1) * m + j] += bi;
}

/** The pole that s cannot be told from, or null. */
export function poleAt({ n, poles }: FrequencySystem, s: Complex): Complex | null {
  const accuracy = 4 * n * Number.EPSILON;
  for (const pole of poles) {
    const near = accuracy * Math.max(Math.abs(pole.re), Math.abs(pole.im));
    if (Math.abs(s.re - pole.re) <= near && Math.abs(s.im - pole.im) <= near) return pole;
  }
  return null;
}

/**
 * Where on the stability boundary a coordinate 0 ≤ v ≤ ∞ lies: s = i v, or z = (1 + i v)/(1 - i v), v = tan(ω period/2), which
 * needs no circular function. Null for a continuous system at infinite frequency.
 */
export function boundaryPoint(v: number, period: number | null): Complex | null {
  if (period === null) return v === Number.POSITIVE_INFINITY ? null : { re: 0, im: v };
  if (v > 1) {
    const t = 1 / v;
    const square = t * t;
    return { re: (square - 1) / (square + 1), im: (2 * t) / (square + 1) };
  }
  const square = v * v;
  return { re: (1 - square) / (1 + square), im: (2 * v) / (1 + square) };
}

/** Frequency in rad/s of a coordinate; null where it is only approached as frequency grows without bound. */
export function frequencyOf(v: number, period: number | null): number | null {
  if (period === null) return Number.isFinite(v) ? v : null;
  const half = v > 1 ? angleOf({ re: 1 / v, im: 1 }) : angleOf({ re: 1, im: v });
  return (2 * half) / period;
}

/** G at a coordinate of the stability boundary; at infinite frequency the feed-through. */
export function evaluateOnBoundary(system: FrequencySystem, v: number, value: ResponseValue): boolean {
  const s = boundaryPoint(v, system.period);
  if (s !== null) return evaluateResponse(system, s, value);
  value.re.set(system.d);
  value.im.fill(0);
  return true;
}
