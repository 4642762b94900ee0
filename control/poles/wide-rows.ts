import type { WideNumber } from "../linalg/wide-number";
import { SPLITTER } from "../linalg/wide-product-loops";
import { workArray } from "../linalg/work-array";

/** Rows of numbers kept as unevaluated sums hi + lo, about 32 digits, in one flat array each. */
export type WideRows = { readonly hi: Float64Array; readonly lo: Float64Array };

/** y[at + stride k] += factor x[from + stride k] for k < count. Source: Dekker, Numer. Math. 18 (1971) 224-242. */
export function addMultiple(
  y: WideRows,
  at: number,
  x: WideRows,
  from: number,
  count: number,
  stride: number,
  factor: WideNumber,
): void {
  const scaled = SPLITTER * factor.hi;
  const head = scaled - (scaled - factor.hi);
  const tail = factor.hi - head;
  for (let k = 0, i = at, j = from; k < count; k++, i += stride, j += stride) {
    const value = x.hi[j];
    const product = factor.hi * value;
    const c = SPLITTER * value;
    const valueHead = c - (c - value);
    const valueTail = value - valueHead;
    const below = tail * valueTail - (product - head * valueHead - tail * valueHead - head * valueTail);
    const old = y.hi[i];
    const sum = old + product;
    const part = sum - old;
    const lost = old - (sum - part) + (product - part) + (below + factor.hi * x.lo[j] + factor.lo * value + y.lo[i]);
    y.hi[i] = sum + lost;
    y.lo[i] = lost - (y.hi[i] - sum);
  }
}

/** Quotient of two such numbers by two steps of long division; the divisor is not zero. */
export function divideWide(a: WideNumber, b: WideNumber): WideNumber {
  const rest: WideRows = { hi: Float64Array.of(a.hi), lo: Float64Array.of(a.lo) };
  const divisor: WideRows = { hi: Float64Array.of(b.hi), lo: Float64Array.of(b.lo) };
  const first = a.hi / b.hi;
  addMultiple(rest, 0, divisor, 0, 1, 1, { hi: -first, lo: 0 });
  const second = rest.hi[0] / b.hi;
  addMultiple(rest, 0, divisor, 0, 1, 1, { hi: -second, lo: 0 });
  const third = rest.hi[0] / b.hi;
  const sum = first + second;
  const lost = second - (sum - first) + third;
  return { hi: sum + lost, lo: lost - (sum + lost - sum) };
}

export function wideAt(x: WideRows, at: number): WideNumber {
  return { hi: x.hi[at], lo: x.lo[at] };
}

export function negative({ hi, lo }: WideNumber): WideNumber {
  return { hi: -hi, lo: -lo };
}

export function wideZeros(count: number): WideRows {
  return { hi: workArray(count), lo: workArray(count) };
}
