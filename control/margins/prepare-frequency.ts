import { NumericalError } from "../errors";
import { balance } from "../linalg/balance";
import { type ShiftedHessenberg, shiftedHessenbergRoom } from "../linalg/complex-hessenberg";
import { flatIdentity, flatProduct, flatTranspose, largestEntry, toFlat } from "../linalg/flat";
import { francisIteration } from "../linalg/francis";
import { reduceToHessenberg } from "../linalg/hessenberg";
import { exponentOf, powerOfTwo, timesPowerOfTwo } from "../linalg/power-of-two";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { schurValues } from "../linalg/schur-values";
import type { Complex } from "../plant/model";
import type { System } from "../plant/scale-plant";
import { connectedStates } from "./connected-states";

/**
 * A system ready for many frequencies: G(s) = 2^size (c (2^rate s I - h)⁻¹ b + d), h upper Hessenberg and all entries of
 * ordinary size. `poles` are in the system's own units. The room is scratch, overwritten by every evaluation.
 */
export type FrequencySystem = {
  readonly n: number;
  readonly m: number;
  readonly p: number;
  readonly h: Float64Array;
  readonly b: Float64Array;
  readonly c: Float64Array;
  readonly d: Float64Array;
  readonly period: number | null;
  readonly rate: number;
  readonly size: number;
  readonly poles: readonly Complex[];
  readonly room: {
    readonly factors: ShiftedHessenberg;
    readonly re: Float64Array;
    readonly im: Float64Array;
  };
};

/**
 * Balances a system exactly, takes powers of two out of time, inputs and outputs, and brings it to Hessenberg form.
 * States that are not on a way from an input to an output are left out.
 *
 * Shapes    A n×n, B n×m, C p×n, D p×m; n, m or p may be 0
 * Units     period in seconds, null for a continuous system
 * Throws    shape-mismatch; not-finite; bad-option { option: "period" }; no-convergence
 * Accuracy  backward stable in the balanced states: c n ε of |A|, |B|, |C|
 * Source    Laub, IEEE Trans. Autom. Control 26 (1981) 407-408
 */
export function prepareFrequency({ A, B, C, D }: System, period: number | null): FrequencySystem {
  requireSystem({ A, B, C, D }, period);
  const m = B.columns;
  const p = C.rows;
  const whole = { a: toFlat(A), b: toFlat(B), c: toFlat(C) };
  const places = connectedStates(whole.a, whole.b, whole.c, A.rows, m, p);
  const n = places.length;
  const part = new Float64Array(n * n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) part[i * n + j] = whole.a[places[i] * A.rows + places[j]];
  const { matrix: h, order, scale, shift } = balance(part, n);
  // A sampled plant's z has no unit that could be changed, but for the extremes that balancing takes out.
  const extra = period === null && n > 0 && largestEntry(h) > 0 ? -exponentOf(largestEntry(h)) : 0;
  for (let k = 0; k < h.length; k++) h[k] *= powerOfTwo(extra);
  const { b, c, exponent } = balancedSignals(whole, { places: order.map((k) => places[k]), scale, states: A.rows, m, p });
  const { b: turnedB, c: turnedC } = turnToHessenberg(h, b, c, n, m, p);
  const rate = shift + extra;
  const size = settleSize(turnedB, toFlat(D), exponent + rate);
  return {
    n,
    m,
    p,
    h,
    b: turnedB,
    c: turnedC,
    d: toFlat(D).map((entry) => timesPowerOfTwo(entry, -size)),
    period,
    rate,
    size,
    poles: polesOf(h, n, rate),
    room: { factors: shiftedHessenbergRoom(n), re: new Float64Array(n * m), im: new Float64Array(n * m) },
  };
}

function requireSystem({ A, B, C, D }: System, period: number | null): void {
  requireSquare("A", A);
  requireShape("B", B, A.rows, B.columns);
  requireShape("C", C, C.rows, A.rows);
  requireShape("D", D, C.rows, B.columns);
  for (const [name, M] of Object.entries({ A, B, C, D })) requireFinite(name, M);
  requirePeriod(period);
}

/** Throws bad-option unless the period is positive and finite, or null for a continuous system. */
export function requirePeriod(period: number | null): void {
  if (period !== null && !(period > 0 && Number.isFinite(period)))
    throw new NumericalError("bad-option", { option: "period", given: period });
}

type Coordinates = {
  readonly places: Int32Array;
  readonly scale: Float64Array;
  readonly states: number;
  readonly m: number;
  readonly p: number;
};

/** B and C in the balanced states, each brought to a largest entry between 1 and 2; the exponent undoes both. */
function balancedSignals(
  { b, c }: { readonly b: Float64Array; readonly c: Float64Array },
  { places, scale, states, m, p }: Coordinates,
): { b: Float64Array; c: Float64Array; exponent: number } {
  const n = places.length;
  const exponents = Array.from(scale, exponentOf);
  const most = (entries: number, at: (k: number, entry: number) => number, sign: number) => {
    let largest = -Infinity;
    for (let k = 0; k < n; k++)
      for (let j = 0; j < entries; j++)
        if (at(k, j) !== 0) largest = Math.max(largest, exponentOf(at(k, j)) + sign * exponents[k]);
    return Number.isFinite(largest) ? largest : 0;
  };
  const inB = (k: number, j: number) => b[places[k] * m + j];
  const inC = (k: number, i: number) => c[i * states + places[k]];
  const topB = most(m, inB, -1);
  const topC = most(p, inC, 1);
  const newB = new Float64Array(n * m);
  const newC = new Float64Array(p * n);
  for (let k = 0; k < n; k++) {
    for (let j = 0; j < m; j++) newB[k * m + j] = timesPowerOfTwo(inB(k, j), -exponents[k] - topB);
    for (let i = 0; i < p; i++) newC[i * n + k] = timesPowerOfTwo(inC(k, i), exponents[k] - topC);
  }
  return { b: newB, c: newC, exponent: topB + topC };
}

function turnToHessenberg(h: Float64Array, b: Float64Array, c: Float64Array, n: number, m: number, p: number) {
  const qt = flatIdentity(n);
  reduceToHessenberg(h, n, qt);
  return { b: flatProduct(qt, b, n, n, m), c: flatProduct(c, flatTranspose(qt, n, n), p, n, n) };
}

/** Common power of two of both parts of G: the feed-through decides where it is beyond the range of the dynamic part. */
function settleSize(b: Float64Array, d: Float64Array, dynamic: number): number {
  const direct = largestEntry(d) === 0 ? dynamic : exponentOf(largestEntry(d));
  if (b.length > 0 && direct - dynamic <= 400 && largestEntry(b) > 0) return dynamic;
  for (let k = 0; k < b.length; k++) b[k] = timesPowerOfTwo(b[k], dynamic - direct);
  return direct;
}

function polesOf(h: Float64Array, n: number, rate: number): Complex[] {
  const work = h.slice();
  francisIteration(work, n, false, null);
  return schurValues(work, n).map(({ re, im }) => ({ re: timesPowerOfTwo(re, -rate), im: timesPowerOfTwo(im, -rate) }));
}
