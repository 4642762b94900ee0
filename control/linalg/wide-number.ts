import { SPLITTER } from "./wide-product-loops";

/** Unevaluated sum hi + lo of two doubles, |lo| ≤ ulp(hi) / 2: one number with about 32 decimal digits. */
export type WideNumber = { readonly hi: number; readonly lo: number };

export const ZERO: WideNumber = { hi: 0, lo: 0 };

/** a·b minus its rounded value, exactly, for sizes below 2^990 (Dekker, Numer. Math. 18 (1971) 224-242). */
export function productError(a: number, b: number, product: number): number {
  const ac = SPLITTER * a;
  const ah = ac - (ac - a);
  const al = a - ah;
  const bc = SPLITTER * b;
  const bh = bc - (bc - b);
  const bl = b - bh;
  return al * bl - (product - ah * bh - al * bh - ah * bl);
}

/**
 * Sums, products, quotients and square roots of single wide numbers.
 *
 * Accuracy  a few ε² of the result (sums: of the larger term); entries between 2^-450 and 2^450
 * Source    Dekker, Numer. Math. 18 (1971) 224-242
 */
export function wideSum(x: WideNumber, y: WideNumber): WideNumber {
  const total = x.hi + y.hi;
  const part = total - x.hi;
  const below = x.hi - (total - part) + (y.hi - part) + (x.lo + y.lo);
  return normal(total, below);
}

export function wideDifference(x: WideNumber, y: WideNumber): WideNumber {
  return wideSum(x, { hi: -y.hi, lo: -y.lo });
}

export function wideTimes(x: WideNumber, y: WideNumber): WideNumber {
  const product = x.hi * y.hi;
  return normal(product, productError(x.hi, y.hi, product) + (x.hi * y.lo + x.lo * y.hi));
}

/** y ≠ 0. */
export function wideQuotient(x: WideNumber, y: WideNumber): WideNumber {
  const first = x.hi / y.hi;
  const rest = wideDifference(x, wideTimes({ hi: first, lo: 0 }, y));
  const second = rest.hi / y.hi;
  const last = wideDifference(rest, wideTimes({ hi: second, lo: 0 }, y));
  return wideSum(normal(first, second), { hi: last.hi / y.hi, lo: 0 });
}

/** Of a number that is not negative. */
export function wideRoot(x: WideNumber): WideNumber {
  if (!(x.hi > 0)) return ZERO;
  const root = Math.sqrt(x.hi);
  const rest = wideDifference(x, wideTimes({ hi: root, lo: 0 }, { hi: root, lo: 0 }));
  return normal(root, rest.hi / (2 * root));
}

function normal(hi: number, lo: number): WideNumber {
  const total = hi + lo;
  return { hi: total, lo: lo - (total - hi) };
}
