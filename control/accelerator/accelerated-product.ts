import { workArray, workCopy } from "../linalg/work-array";
import { accelerator } from "./accelerator";

/** Multiplications from which a call repays the copies it needs. */
const WORTH_A_CALL = 400;
const WORTH_A_WIDE_CALL = 60;

/** As `flatProduct`, to the bit, into `product` where it is given; null when the call is too small, too large or impossible here. */
export function acceleratedProduct(
  a: Float64Array,
  b: Float64Array,
  rows: number,
  inner: number,
  columns: number,
  product?: Float64Array,
): Float64Array | null {
  if (columns === 1 || rows * inner * columns < WORTH_A_CALL) return null;
  const c = 4 * inner;
  // Rows are taken by four: the last ones read on into b and write on behind c.
  const atA = c + (rows + 3) * columns;
  const atB = atA + rows * inner;
  const found = accelerator(atB + (columns + 3) * inner);
  if (!found) return null;
  const { kernel, numbers } = found;
  numbers.set(a, atA);
  numbers.set(b, atB);
  kernel.product(8 * atA, 8 * atB, 8 * c, rows, inner, columns, 0);
  const into = product ?? workArray(rows * columns);
  into.set(numbers.subarray(c, c + rows * columns));
  return into;
}

/** As `wideProduct`, to the bit; null as above. */
export function acceleratedWideProduct(
  a: Float64Array,
  b: { readonly hi: Float64Array; readonly lo: Float64Array },
  rows: number,
  inner: number,
  columns: number,
): { hi: Float64Array; lo: Float64Array } | null {
  if (columns === 1 || rows * inner * columns < WORTH_A_WIDE_CALL) return null;
  const parts = 8 * inner;
  const hi = parts + 3 * rows * inner;
  const lo = hi + rows * columns;
  const atA = lo + rows * columns;
  const bHi = atA + rows * inner;
  const bLo = bHi + inner * columns;
  const found = accelerator(bLo + inner * columns);
  if (!found) return null;
  const { kernel, numbers } = found;
  numbers.set(a, atA);
  numbers.set(b.hi, bHi);
  numbers.set(b.lo, bLo);
  kernel.wideProduct(8 * atA, 8 * bHi, 8 * bLo, 8 * hi, 8 * lo, rows, inner, columns, 0, 8 * parts);
  return { hi: workCopy(numbers.subarray(hi, lo)), lo: workCopy(numbers.subarray(lo, atA)) };
}
