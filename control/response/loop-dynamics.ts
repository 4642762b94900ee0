import { NumericalError } from "../errors";
import { addNarrow, split, widen, wideProduct } from "../linalg/double-double";
import { flatEigenvalues } from "../linalg/eigenvalues";
import { flatProduct, largestEntry } from "../linalg/flat";
import { factorLu, type Lu, solveLu } from "../linalg/lu";
import { workArray, workCopy } from "../linalg/work-array";
import type { Complex } from "../plant/model";
import { isStablePole } from "../poles/require-stable-poles";
import { balanceDynamics, rescaled } from "./balance-dynamics";
import type { FlatLoop } from "./close-loop";

/** A closed loop in balanced coordinates, flat and row-major, with what every response of it needs. */
export type LoopDynamics = {
  readonly loop: FlatLoop;
  readonly period: number | null;
  readonly order: number;
  readonly signals: number;
  readonly a: Float64Array;
  /** What `a` lost in rounding when the loop was closed. */
  readonly lost: Float64Array;
  readonly b: Float64Array;
  readonly c: Float64Array;
  readonly d: Float64Array;
  readonly places: Int32Array;
  readonly scale: Float64Array;
  readonly poles: readonly Complex[];
  /** Factors of A (sampled: A - I). */
  readonly rest: Lu;
};

/** One experiment: a constant input v from t = 0 and a start, as the departure from the rest it goes to. */
export type Drive = { readonly departure: Float64Array; readonly final: Float64Array };

/**
 * Prepares a closed loop for its responses and refuses one that does not settle.
 *
 * Shapes    the loop as closed; period in seconds, null for a continuous plant; its poles where they are known, in any order
 * Throws    not-stabilising { pole }; not-finite; too-large; on-stability-boundary when it has no rest
 * Accuracy  balancing is exact
 */
export function prepareLoop(loop: FlatLoop, period: number | null, known: readonly Complex[] | null): LoopDynamics {
  const { order, signals, columns } = loop;
  const poles = known ?? flatEigenvalues(loop.a, order);
  const unstable = poles.find((pole) => !isStablePole(pole, period !== null));
  if (unstable) throw new NumericalError("not-stabilising", { pole: unstable });
  const { matrix, order: places, scale } = balanceDynamics(loop.a, order);
  const b = workArray(order * columns);
  for (let k = 0; k < order; k++)
    for (let j = 0; j < columns; j++) b[k * columns + j] = loop.b[places[k] * columns + j] / scale[k];
  const c = workArray(signals * order);
  for (let i = 0; i < signals; i++) for (let k = 0; k < order; k++) c[i * order + k] = loop.c[i * order + places[k]] * scale[k];
  const lost = workArray(order * order);
  for (let i = 0; i < order; i++)
    for (let j = 0; j < order; j++) lost[i * order + j] = rescaled(loop.lost[places[i] * order + places[j]], scale[j], scale[i]);
  const shifted = workCopy(matrix);
  if (period !== null) for (let k = 0; k < order; k++) shifted[k * order + k] -= 1;
  const rest = factorLu(shifted, order);
  if (rest.zeroPivot >= 0) throw new NumericalError("on-stability-boundary", { distance: boundaryDistance({ poles, period }) });
  return { loop, period, order, signals, a: matrix, lost, b, c, d: loop.d, places, scale, poles, rest };
}

/** Least distance of a pole from the stability boundary: -Re s, or 1 - |z|. */
export function boundaryDistance({ poles, period }: Pick<LoopDynamics, "poles" | "period">): number {
  const distances = poles.map(({ re, im }) => (period === null ? -re : 1 - Math.sqrt(re * re + im * im)));
  return distances.reduce((least, distance) => Math.min(least, distance), Number.POSITIVE_INFINITY);
}

/** Response to a constant input (column `input`, size `amplitude`) from rest. Throws on-stability-boundary; too-large. */
export function inputDrive(dynamics: LoopDynamics, input: number, amplitude: number): Drive {
  const { order, signals, b, d, c } = dynamics;
  const columns = dynamics.loop.columns;
  const push = Float64Array.from({ length: order }, (_, k) => -b[k * columns + input] * amplitude);
  const rest = restOf(dynamics, push);
  const final = workArray(signals);
  for (let i = 0; i < signals; i++) {
    let sum = 0;
    for (let k = 0; k < order; k++) sum += c[i * order + k] * rest[k];
    final[i] = sum + d[i * columns + input] * amplitude + 0;
  }
  if (!final.every(Number.isFinite)) throw new NumericalError("too-large", { what: "response", limit: Number.MAX_VALUE });
  return { departure: rest.map((entry) => 0 - entry), final };
}

/** Response to a start of the plant's state, without inputs. */
export function startDrive(dynamics: LoopDynamics, x0: readonly number[]): Drive {
  const start = dynamics.loop.startFrom(x0);
  const departure = Float64Array.from(dynamics.places, (place, k) => start[place] / dynamics.scale[k]);
  return { departure, final: workArray(dynamics.signals) };
}

/** Rounds of refinement, which bring a solution of half the digits to all of them. */
const REFINEMENTS = 2;

/** Solves A s = push (sampled: (A - I) s = push) with the residual summed in twice the digits. */
function restOf(dynamics: LoopDynamics, push: Float64Array): Float64Array {
  const { a, lost, order, rest, period } = dynamics;
  if (largestEntry(push) === 0) return workArray(order);
  const s = solveLu(rest, push, 1);
  const left = split(a);
  for (let round = 0; round < REFINEMENTS; round++) {
    const product = wideProduct(left, widen(s), order, order, 1);
    addNarrow(product, flatProduct(lost, s, order, order, 1), 1);
    if (period !== null) addNarrow(product, s, -1);
    addNarrow(product, push, -1);
    if (!product.hi.every(Number.isFinite)) break; // beyond what can be split: the first solution stands
    const correction = solveLu(rest, product.hi, 1);
    for (let k = 0; k < order; k++) s[k] -= correction[k];
  }
  if (!s.every(Number.isFinite)) throw new NumericalError("on-stability-boundary", { distance: boundaryDistance(dynamics) });
  return s;
}
