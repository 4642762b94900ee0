import type { Wide } from "../linalg/double-double";
import { productError, type WideNumber } from "../linalg/wide-number";

/** (hi + lo) / k */
export function wideOver({ hi, lo }: WideNumber, k: number): WideNumber {
  const quotient = hi / k;
  const product = quotient * k;
  return { hi: quotient, lo: (hi - product - productError(quotient, k, product) + lo) / k };
}

/** Every entry times the same double, nothing lost. */
export function exactlyScaled(values: Float64Array, factor: number): Wide {
  const hi = values.map((entry) => entry * factor);
  return { hi, lo: values.map((entry, k) => productError(entry, factor, hi[k])) };
}

/** Every entry times a power of two. */
export function timesPower({ hi, lo }: Wide, power: number): Wide {
  return { hi: hi.map((entry) => entry * power), lo: lo.map((entry) => entry * power) };
}

/** sum + factor · x into sum. */
export function addScaled(sum: Wide, factor: WideNumber, x: Wide): void {
  for (let i = 0; i < x.hi.length; i++) {
    const product = factor.hi * x.hi[i];
    const below = productError(factor.hi, x.hi[i], product) + factor.hi * x.lo[i] + factor.lo * x.hi[i];
    const before = sum.hi[i];
    const total = before + product;
    const part = total - before;
    const low = sum.lo[i] + (before - (total - part) + (product - part)) + below;
    sum.hi[i] = total + low;
    sum.lo[i] = low - (sum.hi[i] - total);
  }
}
