import type { WideNumber } from "../linalg/wide-number";
import { workArray, workCopy } from "../linalg/work-array";
import type { WantedPole } from "./wanted-poles";
import { type EliminationStep, eliminateColumn, swapEntries } from "./wide-hessenberg";
import { addMultiple, divideWide, negative, type WideRows, wideAt, wideZeros } from "./wide-rows";

/**
 * The one gain that places the poles of a plant with a single input, with some 32 digits carried throughout:
 * elimination to Hessenberg form with the input on the first state, then one row of the wanted polynomial.
 *
 * Shapes    a n×n row-major, b n, blocks covering n poles → n; null when the input does not reach every state
 * Units     gain in input per state of the plant given
 * Throws    nothing
 * Accuracy  each entry the double next to the exact one or its neighbour while the reachability matrix has condition below
 *           about 1e15; the plant's own sensitivity to rounding of the gain remains
 * Source    Ackermann 1972; the row recursion on a Hessenberg form after Datta, Numerical Methods for Linear Control
 *           Systems, 2004 (from memory)
 */
export function singleInputGain(a: Float64Array, b: Float64Array, n: number, blocks: readonly WantedPole[]): Float64Array | null {
  const h: WideRows = { hi: workCopy(a), lo: workArray(n * n) };
  const input: WideRows = { hi: workCopy(b), lo: workArray(n) };
  const steps: EliminationStep[] = [];
  const divisors: WideNumber[] = [];
  for (let pivot = 0; pivot < n; pivot++) {
    // The column to clear is the input first, then column pivot - 1 of the matrix.
    const step = eliminateColumn(h, n, pivot, (i) => (pivot === 0 ? wideAt(input, i) : wideAt(h, i * n + pivot - 1)));
    if (!step) return null;
    if (pivot === 0) divisors.push(wideAt(input, step.row));
    else divisors.push(wideAt(h, pivot * n + pivot - 1));
    steps.push(step);
  }
  const row = polynomialRow(h, n, blocks, divisors);
  for (const { pivot, row: other, factors } of steps.toReversed()) {
    for (let i = pivot + 1; i < n; i++) addMultiple(row, pivot, row, i, 1, 1, negative(wideAt(factors, i)));
    swapEntries(row, pivot, other);
  }
  return row.hi.every(Number.isFinite) ? row.hi : null;
}

/** Last row of the wanted polynomial of H over the product of the divisors, which are used from the last to the first. */
function polynomialRow(h: WideRows, n: number, blocks: readonly WantedPole[], divisors: WideNumber[]): WideRows {
  let row = wideZeros(n);
  row.hi[n - 1] = 1;
  let used = n;
  for (const { re, im, width } of blocks) {
    let next = timesShifted(row, h, n, re);
    if (width === 2) {
      next = timesShifted(next, h, n, re);
      addMultiple(next, 0, row, 0, n, 1, squareOf(im));
    }
    for (let k = 0; k < width; k++) {
      used--;
      for (let j = 0; j < n; j++) {
        const { hi, lo } = divideWide(wideAt(next, j), divisors[used]);
        next.hi[j] = hi;
        next.lo[j] = lo;
      }
    }
    row = next;
  }
  return row;
}

/** row (H - shift I) */
function timesShifted(row: WideRows, h: WideRows, n: number, shift: number): WideRows {
  const next = wideZeros(n);
  for (let i = 0; i < n; i++) if (row.hi[i] !== 0) addMultiple(next, 0, h, i * n, n, 1, wideAt(row, i));
  addMultiple(next, 0, row, 0, n, 1, { hi: -shift, lo: 0 });
  return next;
}

function squareOf(x: number): WideNumber {
  const square = wideZeros(1);
  addMultiple(square, 0, { hi: Float64Array.of(x), lo: workArray(1) }, 0, 1, 1, { hi: x, lo: 0 });
  return wideAt(square, 0);
}
