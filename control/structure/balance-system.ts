import { balance } from "../linalg/balance";
import { largestEntry } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { MOST_EXPONENT } from "./balance-states";
import type { FlatSystem } from "./reduce-system";

/**
 * `timeScale` is the power of two by which a and b were multiplied, so that poles and zeros were too. Old state =
 * stateScale · new state, likewise inputs; new output = outputScale · old output.
 */
export type BalancedSystem = FlatSystem & {
  readonly timeScale: number;
  readonly stateScale: Float64Array;
  readonly inputScale: Float64Array;
  readonly outputScale: Float64Array;
};

/** Few, because a system without a rate of its own (a chain of integrators) would go on shrinking. */
const MOST_PASSES = 4;
const MOST_ROUNDS = 40;
/** A may be as much larger than its fastest mode: shrunk further, all modes and zeros would crowd about rest. */
const MOST_OVER_RATE = 16;
const CHAIN_ROUNDING = 1 / 64;

/**
 * The same system in states, inputs and outputs rescaled by powers of two so that the rows of [A B] and the columns
 * of [A; C] have like sizes, with inputs, outputs and A brought to the size of 1. A state whose way in and way out together
 * are lost in rounding beside the fastest mode keeps its scale: blowing up rounding would make it look connected.
 *
 * Shapes    a n×n, b n×m, c p×n, d p×m → the same
 * Units     spectralRadius, the largest modulus of an eigenvalue of a, as a
 * Accuracy  exact but for underflow of negligible entries; at most 4 passes of 40 rounds
 * Source    Parlett & Reinsch, Numer. Math. 13 (1969) 293-304, carried over to systems with inputs and outputs
 */
export function balanceSystem(given: FlatSystem, spectralRadius: number): BalancedSystem {
  const { n, m, p } = given;
  const system = {
    ...given,
    a: given.a.slice(),
    b: given.b.slice(),
    c: given.c.slice(),
    d: given.d.slice(),
    inputScale: new Float64Array(m).fill(1),
    outputScale: new Float64Array(p).fill(1),
  };
  const { a, b } = system;
  const inner = innerStates(system);
  const ownRate = reliableRate(given, spectralRadius);
  const exponents = new Int32Array(n);
  let timeScale = 1;
  for (let pass = 0; pass < MOST_PASSES; pass++) {
    sizeSignals(system);
    const size = Math.min(largestBetween(a, n, inner), MOST_OVER_RATE * ownRate * timeScale || Number.POSITIVE_INFINITY);
    const factor = powerOfTwo(-exponentOf(size || spectralRadius * timeScale || largestEntry(a) || 1));
    if (pass > 0 && factor === 1) break;
    timeScale *= factor;
    for (let i = 0; i < a.length; i++) a[i] *= factor;
    for (let i = 0; i < b.length; i++) b[i] *= factor;
    const fastest = spectralRadius * timeScale;
    const lost = 16 * n * Number.EPSILON * fastest * fastest;
    for (let round = 0, moved = true; moved && round < MOST_ROUNDS; round++) {
      sizeSignals(system);
      moved = moveStates(system, exponents, lost);
    }
  }
  sizeSignals(system);
  return { ...system, timeScale, stateScale: Float64Array.from(exponents, powerOfTwo) };
}

/** The largest modulus of an eigenvalue; zero where, beside the balanced A, it may be the rounding of a chain of integrators. */
function reliableRate({ n, a }: FlatSystem, spectralRadius: number): number {
  const { matrix, shift } = balance(a, n);
  return spectralRadius > CHAIN_ROUNDING * largestEntry(matrix) * powerOfTwo(-shift) ? spectralRadius : 0;
}

type Sized = Omit<BalancedSystem, "timeScale" | "stateScale">;

/** States on a way from an input to an output: only these say how fast the whole is, the unit of the others is free. */
function innerStates({ n, m, p, a, b, c }: FlatSystem): number[] {
  let states = Array.from({ length: n }, (_, i) => i);
  for (let left = n + 1; states.length < left; ) {
    left = states.length;
    states = states.filter((i) => {
      const driven = states.some((j) => j !== i && a[i * n + j] !== 0) || largestEntry(b.subarray(i * m, i * m + m)) > 0;
      const heard = states.some((j) => j !== i && a[j * n + i] !== 0) || stridedLargest(c, p, n, i) > 0;
      return driven && heard;
    });
  }
  return states;
}

function largestBetween(a: Float64Array, n: number, states: readonly number[]): number {
  let largest = 0;
  for (const i of states) for (const j of states) largest = Math.max(largest, Math.abs(a[i * n + j]));
  return largest;
}

/** One sweep over the states; true while some state still moved. */
function moveStates({ n, m, p, a, b, c }: FlatSystem, exponents: Int32Array, lost: number): boolean {
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
    if (row === 0 && column === 0) continue;
    // A state that drives nothing, or that nothing drives, takes the size of the whole.
    row ||= 1;
    column ||= 1;
    const half = Math.round((exponentOf(row) - exponentOf(column)) / 2);
    if (row * column <= lost || half === 0 || Math.abs(exponents[i] + half) > MOST_EXPONENT) continue;
    const f = powerOfTwo(half);
    if (column * f + row / f >= 0.95 * (column + row)) continue;
    moved = true;
    exponents[i] += half;
    for (let j = 0; j < n; j++) a[i * n + j] /= f;
    for (let j = 0; j < m; j++) b[i * m + j] /= f;
    for (let j = 0; j < n; j++) a[j * n + i] *= f;
    for (let k = 0; k < p; k++) c[k * n + i] *= f;
  }
  return moved;
}

/** Columns of [B; D] and rows of [C D] brought to the size of 1; one lost in rounding beside the largest stays that small. */
function sizeSignals({ n, m, p, b, c, d, inputScale, outputScale }: Sized): void {
  const inputs = Array.from({ length: m }, (_, j) => Math.max(stridedLargest(b, n, m, j), stridedLargest(d, p, m, j)));
  scaleToOne(inputs, (j, f) => {
    inputScale[j] *= f;
    for (let i = 0; i < n; i++) b[i * m + j] *= f;
    for (let k = 0; k < p; k++) d[k * m + j] *= f;
  });
  const outputs = Array.from({ length: p }, (_, k) =>
    Math.max(largestEntry(c.subarray(k * n, k * n + n)), largestEntry(d.subarray(k * m, k * m + m))),
  );
  scaleToOne(outputs, (k, f) => {
    outputScale[k] *= f;
    for (let j = 0; j < n; j++) c[k * n + j] *= f;
    for (let j = 0; j < m; j++) d[k * m + j] *= f;
  });
}

function scaleToOne(sizes: readonly number[], scale: (index: number, f: number) => void): void {
  const largest = Math.max(0, ...sizes);
  if (largest === 0) return;
  sizes.forEach((size, index) => {
    const shift = -exponentOf(size > largest * Number.EPSILON ? size : largest);
    if (shift !== 0) scale(index, powerOfTwo(shift));
  });
}

function stridedLargest(x: Float64Array, rows: number, columns: number, j: number): number {
  let largest = 0;
  for (let i = 0; i < rows; i++) largest = Math.max(largest, Math.abs(x[i * columns + j]));
  return largest;
}
