import { acceleratedWideProduct } from "../accelerator/accelerated-product";
import { SPLITTER, wideProductByLoops } from "./wide-product-loops";
import { workArray, workCopy } from "./work-array";

/** Unevaluated sum hi + lo of two doubles per entry, |lo| ≤ ulp(hi) / 2: about 32 decimal digits. */
export type Wide = { readonly hi: Float64Array; readonly lo: Float64Array };

/** A matrix of doubles with each entry split into two halves of at most 26 bits, once, for exact products. */
export type Split = { readonly value: Float64Array; readonly head: Float64Array; readonly tail: Float64Array };

/** Entries must be below 2^990, or the split overflows. The halves are made when first asked for: the accelerator makes its own. */
export function split(value: Float64Array): Split {
  let made: { readonly head: Float64Array; readonly tail: Float64Array } | undefined;
  const halves = () => {
    made ??= halve(value);
    return made;
  };
  return {
    value,
    get head() {
      return halves().head;
    },
    get tail() {
      return halves().tail;
    },
  };
}

function halve(value: Float64Array): { head: Float64Array; tail: Float64Array } {
  const head = workArray(value.length);
  const tail = workArray(value.length);
  for (let i = 0; i < value.length; i++) {
    const c = SPLITTER * value[i];
    head[i] = c - (c - value[i]);
    tail[i] = value[i] - head[i];
  }
  return { head, tail };
}

export function widen(value: Float64Array): Wide {
  return { hi: workCopy(value), lo: workArray(value.length) };
}

/**
 * Product of a matrix of doubles and a wide one, as if summed with twice the working precision and then rounded to it.
 *
 * Shapes    a rows×inner, b inner×columns → rows×columns
 * Accuracy  |error| ≤ (γ²_inner + ε²) |a||b| per entry; needs arithmetic without extended precision, as ECMAScript has
 * Source    Ogita, Rump & Oishi, Accurate sum and dot product, SIAM J. Sci. Comput. 26 (2005) 1955-1988, algorithm 5.3
 */
export function wideProduct(a: Split, b: Wide, rows: number, inner: number, columns: number): Wide {
  return acceleratedWideProduct(a.value, b, rows, inner, columns) ?? wideProductByLoops(a, b, rows, inner, columns);
}

/** x + sign·y into x. */
export function addWide(x: Wide, y: Wide, sign: 1 | -1): void {
  for (let i = 0; i < x.hi.length; i++) {
    const term = sign * y.hi[i];
    const sum = x.hi[i];
    const total = sum + term;
    const part = total - sum;
    x.lo[i] += sum - (total - part) + (term - part) + sign * y.lo[i];
    x.hi[i] = total;
  }
  renormalise(x.hi, x.lo);
}

export function addNarrow(x: Wide, y: Float64Array, sign: 1 | -1): void {
  for (let i = 0; i < x.hi.length; i++) {
    const term = sign * y[i];
    const sum = x.hi[i];
    const total = sum + term;
    const part = total - sum;
    x.lo[i] += sum - (total - part) + (term - part);
    x.hi[i] = total;
  }
  renormalise(x.hi, x.lo);
}

export function wideTranspose(x: Wide, rows: number, columns: number): Wide {
  const hi = workArray(x.hi.length);
  const lo = workArray(x.hi.length);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < columns; j++) {
      hi[j * rows + i] = x.hi[i * columns + j];
      lo[j * rows + i] = x.lo[i * columns + j];
    }
  }
  return { hi, lo };
}

function renormalise(hi: Float64Array, lo: Float64Array): void {
  for (let i = 0; i < hi.length; i++) {
    const total = hi[i] + lo[i];
    lo[i] -= total - hi[i];
    hi[i] = total;
  }
}
