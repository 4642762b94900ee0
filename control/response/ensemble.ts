import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { balance } from "../linalg/balance";
import { flatProductInto, toFlat } from "../linalg/flat";
import { francisIteration } from "../linalg/francis";
import { reduceToHessenberg } from "../linalg/hessenberg";
import { powerOfTwo } from "../linalg/power-of-two";
import { requireFinite, requireShape } from "../linalg/require";
import { schurValues } from "../linalg/schur-values";
import { balanceDynamics } from "./balance-dynamics";
import { MOST_VALUES } from "./respond-to-step";
import { stepFiller } from "./step-filler";

/** One plant of many: row-major entries, read when its turn comes and never kept. */
export type EnsemblePlant = {
  /** n×n */
  readonly a: Float64Array;
  /** n×m */
  readonly b: Float64Array;
  /** Outputs p×n; only read with an observer. */
  readonly c: Float64Array;
  /** Commanded quantities q×n */
  readonly h: Float64Array;
};

/** One law for all plants: u = -K x + F r, or from the estimate of a full-order observer that goes on believing in its own model. */
export type EnsembleLaw = {
  readonly K: Matrix;
  readonly F: Matrix;
  readonly observer: { readonly L: Matrix; readonly A: Matrix; readonly B: Matrix; readonly C: Matrix } | null;
};

export type EnsembleRequest = {
  readonly law: EnsembleLaw;
  readonly plants: readonly EnsemblePlant[];
  /** Seconds; null for continuous plants */
  readonly period: number | null;
  /** Seconds between moments; a sampled loop is shown at its own samples. */
  readonly step: number;
  readonly samples: number;
  /** Is shown the samples of each stable loop, q×q×samples by reference, quantity and moment; the array is used again for the next. */
  readonly visit?: (values: Float64Array, index: number) => void;
};

export type EnsembleResponses = {
  /** Closed-loop poles, plants×order, in the order in which the iteration left them. */
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** Per plant: every pole inside the stability boundary. */
  readonly stable: readonly boolean[];
  /** Least and largest value of each channel at each moment over the stable loops, q×q×samples; null when none is stable. */
  readonly band: { readonly lower: Float64Array; readonly upper: Float64Array } | null;
};

/**
 * One law on many plants: poles of every closed loop, and the band in which all stable ones answer a unit step of each set point.
 *
 * Shapes    n states, m inputs, p outputs, q commanded in all plants: K m×n, F m×q; observer L n×p, A n×n, B n×m, C p×n
 * Units     the plants'; poles in 1/s or per sample
 * Throws    shape-mismatch; not-finite; bad-option for a step that is not above zero or fewer than one sample; too-large for
 *           more than 2^25 values or for poles and values beyond the largest double; no-convergence of the eigenvalues
 * Accuracy  poles as `eigenvalues`; samples about 1e-13 of the largest value for loops like the first, whose balancing all share
 * Source    as `respondToStep`; no array is made per plant but what the eigenvalues need
 */
export function respondEnsemble(request: EnsembleRequest): EnsembleResponses {
  const { law, plants, period, step, samples, visit } = request;
  const sizes = sizesOf(request);
  const { order, q } = sizes;
  const close = loopCloser(law, sizes);
  const fill = stepFiller({ n: order, inputs: q, signals: q, samples }, period === null ? step : null);
  const values = new Float64Array(q * q * samples);
  const lower = new Float64Array(values.length).fill(Number.POSITIVE_INFINITY);
  const upper = new Float64Array(values.length).fill(Number.NEGATIVE_INFINITY);
  const re = new Float64Array(plants.length * order);
  const im = new Float64Array(plants.length * order);
  const d = new Float64Array(q * q);
  const stable = plants.map((plant, index) => {
    const { a, b, c } = close(plant, index);
    const inside = placePolesOf(a, order, period !== null, re, im, index * order);
    if (!inside) return false;
    fill(a, b, c, d, values);
    widen(values, lower, upper);
    visit?.(values, index);
    return true;
  });
  for (const entries of [re, im]) requireInRange(entries, "eigenvalue");
  if (!stable.includes(true)) return { re, im, stable, band: null };
  requireInRange(lower, "response");
  requireInRange(upper, "response");
  return { re, im, stable, band: { lower, upper } };
}

function requireInRange(values: Float64Array, what: string): void {
  if (!values.every(Number.isFinite)) throw new NumericalError("too-large", { what, limit: Number.MAX_VALUE });
}

type Sizes = { readonly n: number; readonly m: number; readonly p: number; readonly q: number; readonly order: number };

function sizesOf({ law, plants, step, samples }: EnsembleRequest): Sizes {
  const { K, F, observer } = law;
  const [n, m, q] = [K.columns, K.rows, F.columns];
  const p = observer?.C.rows ?? 0;
  requireShape("F", F, m, q);
  if (observer) {
    requireShape("L", observer.L, n, p);
    requireShape("A", observer.A, n, n);
    requireShape("B", observer.B, n, m);
    requireShape("C", observer.C, p, n);
  }
  for (const [name, M] of Object.entries({ K, F, ...observer })) requireFinite(name, M);
  if (!(step > 0 && Number.isFinite(step))) throw new NumericalError("bad-option", { option: "step", given: step });
  if (!(Number.isInteger(samples) && samples > 0)) throw new NumericalError("bad-option", { option: "samples", given: samples });
  if (q * q * samples > MOST_VALUES) throw new NumericalError("too-large", { what: "response", limit: MOST_VALUES });
  plants.forEach(({ a, b, c, h }, plant) => {
    const expected = [n * n, n * m, observer ? p * n : c.length, q * n];
    const given = [a.length, b.length, c.length, h.length];
    if (expected.some((length, i) => length !== given[i])) throw new NumericalError("shape-mismatch", { plant, expected, given });
    for (const entries of [a, b, c, h])
      if (!entries.every(Number.isFinite)) throw new NumericalError("not-finite", { matrix: "plant", plant });
  });
  return { n, m, p, q, order: observer ? 2 * n : n };
}

type Closed = { readonly a: Float64Array; readonly b: Float64Array; readonly c: Float64Array };
type Scaling = { readonly order: Int32Array; readonly scale: Float64Array };

/** Closes one loop after the other in the same memory, in the coordinates that balance the first. */
function loopCloser(law: EnsembleLaw, sizes: Sizes): (plant: EnsemblePlant, index: number) => Closed {
  const { n, q, order } = sizes;
  const closePlain = plainCloser(law, sizes);
  const closed = { a: new Float64Array(order * order), b: new Float64Array(order * q), c: new Float64Array(q * order) };
  let scaling: Scaling | null = null;
  return (plant) => {
    const plain = closePlain(plant);
    scaling ??= balanceDynamics(plain.a, order);
    const { order: places, scale } = scaling;
    for (let i = 0; i < order; i++) {
      const from = places[i];
      for (let j = 0; j < order; j++) closed.a[i * order + j] = plain.a[from * order + places[j]] * (scale[j] / scale[i]);
      for (let r = 0; r < q; r++) {
        closed.b[i * q + r] = plain.b[from * q + r] / scale[i];
        closed.c[r * order + i] = from < n ? plant.h[r * n + from] * scale[i] : 0;
      }
    }
    return closed;
  };
}

/** [A - BK] with BF, or [A, -BK; LC, Ao - Bo K - L Co] with [BF; Bo F]. */
function plainCloser(law: EnsembleLaw, { n, m, p, q, order }: Sizes) {
  const { observer } = law;
  const [k, f] = [toFlat(law.K), toFlat(law.F)];
  const l = observer ? toFlat(observer.L) : null;
  const a = new Float64Array(order * order);
  const b = new Float64Array(order * q);
  const [bk, bf, lc] = [new Float64Array(n * n), new Float64Array(n * q), new Float64Array(n * n)];
  if (observer) {
    const belief = observer.A.clone().sub(observer.B.mmul(law.K)).sub(observer.L.mmul(observer.C));
    const fed = toFlat(observer.B.mmul(law.F));
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) a[(n + i) * order + n + j] = belief.get(i, j);
    b.set(fed, n * q);
  }
  return (plant: EnsemblePlant) => {
    flatProductInto(bk, plant.b, k, n, m, n);
    flatProductInto(bf, plant.b, f, n, m, q);
    if (l) flatProductInto(lc, l, plant.c, n, p, n);
    for (let i = 0; i < n; i++) {
      for (let j = 0; j < n; j++) {
        const fed = bk[i * n + j];
        if (l) {
          a[i * order + j] = plant.a[i * n + j];
          a[i * order + n + j] = -fed;
          a[(n + i) * order + j] = lc[i * n + j];
        } else a[i * order + j] = plant.a[i * n + j] - fed;
      }
    }
    b.set(bf);
    return { a, b };
  };
}

/** Writes the poles from `at` on and says whether all are inside the boundary. */
function placePolesOf(a: Float64Array, n: number, sampled: boolean, re: Float64Array, im: Float64Array, at: number): boolean {
  const { matrix, shift } = balance(a, n);
  reduceToHessenberg(matrix, n, null);
  francisIteration(matrix, n, false, null);
  const back = powerOfTwo(-shift);
  let inside = true;
  schurValues(matrix, n).forEach((value, k) => {
    const [x, y] = [value.re * back, value.im * back];
    re[at + k] = x;
    im[at + k] = y;
    if (!(sampled ? x * x + y * y < 1 : x < 0)) inside = false;
  });
  return inside;
}

function widen(values: Float64Array, lower: Float64Array, upper: Float64Array): void {
  for (let i = 0; i < values.length; i++) {
    const value = values[i];
    if (!(value >= lower[i])) lower[i] = value; // also when it is not a number, which is then refused
    if (!(value <= upper[i])) upper[i] = value;
  }
}
