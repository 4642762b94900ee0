import { largestEntry } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";

/** Row-major arrays: a n×n, b n×m, c p×n, d p×m. */
export type FlatSystem = {
  readonly n: number;
  readonly m: number;
  readonly p: number;
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly c: Float64Array;
  readonly d: Float64Array;
};

/** `timeScale` is the power of two by which a and b were multiplied, so that poles and zeros were too. */
export type BalancedSystem = FlatSystem & { readonly stateScale: Float64Array; readonly timeScale: number };

const MOST_ROUNDS = 60;
const MOST_EXPONENT = 400;

/**
 * The same system in states, inputs and outputs rescaled by powers of two so that the rows of [A B] and the columns
 * of [A; C] have like sizes, with inputs and outputs brought to the size of A, and A to the size of 1.
 *
 * Shapes    a n×n, b n×m, c p×n, d p×m → the same; old state = stateScale · new state
 * Accuracy  exact but for underflow of negligible entries; at most 60 rounds
 * Source    Parlett & Reinsch, Numer. Math. 13 (1969) 293-304, carried over to systems with inputs and outputs
 */
export function balanceSystem(system: FlatSystem): BalancedSystem {
  const { n, m, p } = system;
  const a = system.a.slice();
  const b = system.b.slice();
  const c = system.c.slice();
  const d = system.d.slice();
  const balanced = { n, m, p, a, b, c, d };
  sizeInputs(balanced, 1);
  sizeOutputs(balanced, 1);
  const timeScale = powerOfTwo(-exponentOf(largestEntry(a) || 1));
  for (let i = 0; i < a.length; i++) a[i] *= timeScale;
  for (let i = 0; i < b.length; i++) b[i] *= timeScale;
  const stateScale = new Float64Array(n).fill(1);
  for (let round = 0, moved = true; moved && round < MOST_ROUNDS; round++) {
    sizeInputs(balanced, largestEntry(a) || 1);
    sizeOutputs(balanced, largestEntry(a) || 1);
    moved = balanceStates(balanced, stateScale);
  }
  return { ...balanced, stateScale, timeScale };
}

/** One sweep over the states; true while some state still moved. */
function balanceStates({ n, m, p, a, b, c }: FlatSystem, stateScale: Float64Array): boolean {
  let moved = false;
  for (let i = 0; i < n; i++) {
    let row = 0;
    let column = 0;
    for (let j = 0; j < n; j++) {
      if (j === i) continue;
      row += Math.abs(a[i * n + j]);
      column += Math.abs(a[j * n + i]);
    }
    for (let j = 0; j < m; j++) row += Math.abs(b[i * m + j]);
    for (let k = 0; k < p; k++) column += Math.abs(c[k * n + i]);
    if (row === 0 || column === 0) continue;
    const half = Math.round((exponentOf(row) - exponentOf(column)) / 2);
    if (half === 0 || Math.abs(exponentOf(stateScale[i]) + half) > MOST_EXPONENT) continue;
    const f = powerOfTwo(half);
    if (column * f + row / f >= 0.95 * (column + row)) continue;
    moved = true;
    stateScale[i] *= f;
    for (let j = 0; j < n; j++) a[i * n + j] /= f;
    for (let j = 0; j < m; j++) b[i * m + j] /= f;
    for (let j = 0; j < n; j++) a[j * n + i] *= f;
    for (let k = 0; k < p; k++) c[k * n + i] *= f;
  }
  return moved;
}

/** Columns of [B; D] brought to one size; a column lost in rounding beside the largest stays that small. */
function sizeInputs({ n, m, p, b, d }: FlatSystem, target: number): void {
  const sizes = Array.from({ length: m }, (_, j) => Math.max(stridedLargest(b, n, m, j), stridedLargest(d, p, m, j)));
  scaleTo(sizes, target, (j, f) => {
    for (let i = 0; i < n; i++) b[i * m + j] *= f;
    for (let k = 0; k < p; k++) d[k * m + j] *= f;
  });
}

/** Rows of [C D], likewise. */
function sizeOutputs({ n, m, p, c, d }: FlatSystem, target: number): void {
  const sizes = Array.from({ length: p }, (_, k) =>
    Math.max(largestEntry(c.subarray(k * n, k * n + n)), largestEntry(d.subarray(k * m, k * m + m))),
  );
  scaleTo(sizes, target, (k, f) => {
    for (let j = 0; j < n; j++) c[k * n + j] *= f;
    for (let j = 0; j < m; j++) d[k * m + j] *= f;
  });
}

function scaleTo(sizes: readonly number[], target: number, scale: (index: number, f: number) => void): void {
  const largest = Math.max(0, ...sizes);
  if (largest === 0) return;
  sizes.forEach((size, index) => {
    const own = size > largest * Number.EPSILON ? size : largest;
    const shift = exponentOf(target) - exponentOf(own);
    if (shift !== 0) scale(index, powerOfTwo(shift));
  });
}

function stridedLargest(x: Float64Array, rows: number, columns: number, j: number): number {
  let largest = 0;
  for (let i = 0; i < rows; i++) largest = Math.max(largest, Math.abs(x[i * columns + j]));
  return largest;
}
