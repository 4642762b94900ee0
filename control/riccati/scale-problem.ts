import { NumericalError } from "../errors";
import { largestEntry } from "../linalg/flat";
import { exponentOf, powerOfTwo, timesPowerOfTwo } from "../linalg/power-of-two";
import { workArray } from "../linalg/work-array";
import type { FlatProblem } from "./problem";

/**
 * The scaled problem with what undoes it: X = 2^(cost - time) D⁻¹ Xs D⁻¹, K = E Ks D⁻¹, where `state` holds D,
 * `input` E, all exact powers of two.
 */
export type ScaledProblem = {
  readonly problem: FlatProblem;
  readonly state: Float64Array;
  readonly input: Float64Array;
  readonly cost: number;
  readonly time: number;
};

const LARGEST_SHIFT = 500;
const ROUNDS = 200;
const ORDINARY = powerOfTwo(400);
const SMALL_SHIFT = 500;

/**
 * Scales time, cost, inputs and states by powers of two so that A, B R⁻¹ B' and Q are of like size.
 *
 * Throws    too-large when the scaled problem still leaves the range of doubles
 * Accuracy  exact
 * Source    idea of Benner, Symplectic balancing of Hamiltonian matrices, SIAM J. Sci. Comput. 22 (2001) 1885-1904
 */
export function scaleProblem(given: FlatProblem, g: (scaled: FlatProblem) => Float64Array): ScaledProblem {
  const { n, m, sampled } = given;
  const cost = exponentOrZero(Math.max(largestEntry(given.q), largestEntry(given.r)));
  const input = Float64Array.from({ length: m }, (_, j) => inputScale(given, j, cost));
  const sizes = exponents(given, input, cost);
  const time = sampled ? 0 : sizes.time;
  const state = workArray(n).fill(powerOfTwo(sizes.state));
  const first = apply(given, state, input, cost, time);
  balanceStates(first, g(first), state);
  const problem = apply(given, state, input, cost, time);
  const parts = [problem.a, problem.b, problem.q, problem.r, problem.s];
  if (!parts.every((part) => Number.isFinite(largestEntry(part))))
    throw new NumericalError("too-large", { what: "scaled-problem", limit: Number.MAX_VALUE });
  return { problem, state, input, cost, time };
}

/**
 * Exponents of a unit of time in which A, and the square root of G times Q, are at most near one, and of one scale for all
 * states at which G and Q are of like size.
 */
function exponents({ n, m, a, b, q, sampled }: FlatProblem, input: Float64Array, cost: number): { time: number; state: number } {
  let inputs = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < m; j++)
      if (b[i * m + j] !== 0) inputs = Math.max(inputs, exponentOf(b[i * m + j]) + exponentOf(input[j]));
  }
  const sizeQ = largestEntry(q);
  const plant = largestEntry(a);
  if (inputs === Number.NEGATIVE_INFINITY || sizeQ === 0) return { time: exponentOrZero(plant), state: 0 };
  const weight = exponentOf(sizeQ) - cost;
  const both = Math.round((2 * inputs + weight) / 2);
  const time = sampled ? 0 : plant === 0 ? both : Math.max(exponentOf(plant), both);
  return { time, state: Math.round((2 * (inputs - time) - weight) / 4) };
}

function exponentOrZero(size: number): number {
  return size === 0 ? 0 : exponentOf(size);
}

/** Brings R_jj near one; where it is zero, the largest entry of column j of B. */
function inputScale({ n, m, b, r }: FlatProblem, j: number, cost: number): number {
  if (r[j * m + j] > 0) return powerOfTwo(-Math.round((exponentOf(r[j * m + j]) - cost) / 2));
  let largest = 0;
  for (let i = 0; i < n; i++) largest = Math.max(largest, Math.abs(b[i * m + j]));
  return powerOfTwo(-exponentOrZero(largest));
}

function apply(given: FlatProblem, state: Float64Array, input: Float64Array, cost: number, time: number): FlatProblem {
  const { n, m, sampled } = given;
  const d = Array.from(state, exponentOf);
  const e = Array.from(input, exponentOf);
  return {
    n,
    m,
    sampled,
    a: scaled(given.a, n, n, d, -1, time, d, 1),
    b: scaled(given.b, n, m, d, -1, time, e, 1),
    q: scaled(given.q, n, n, d, 1, cost, d, 1),
    r: scaled(given.r, m, m, e, 1, cost, e, 1),
    s: scaled(given.s, n, m, d, 1, cost, e, 1),
  };
}

/** Entry (i, j) times 2^(± left_i - less ± right_j). */
function scaled(
  from: Float64Array,
  rows: number,
  columns: number,
  left: readonly number[],
  leftSign: number,
  less: number,
  right: readonly number[],
  rightSign: number,
): Float64Array {
  const to = workArray(from.length);
  const factors = right.map((e) => powerOfTwo(rightSign * e));
  for (let at = 0, i = 0; i < rows; i++) {
    const own = leftSign * left[i] - less;
    const factor = powerOfTwo(own);
    for (let j = 0; j < columns; j++, at++) {
      const size = Math.abs(from[at]);
      // Two exact products, unless the first might leave the range.
      if (size < ORDINARY && size > 1 / ORDINARY && Math.abs(own) < SMALL_SHIFT) to[at] = from[at] * factor * factors[j];
      else if (size > 0) to[at] = timesPowerOfTwo(from[at], own + rightSign * right[j]);
    }
  }
  return to;
}

/** Coordinate descent over powers of two on the sum of sizes of all entries of [A G; Q A']. */
function balanceStates({ n, a, q }: FlatProblem, g: Float64Array, state: Float64Array): void {
  for (let round = 0; round < ROUNDS; round++) {
    let settled = true;
    for (let i = 0; i < n; i++) {
      const terms = sizesAgainst(i, n, a, g, q, state);
      const step = bestStep(terms, exponentOf(state[i]));
      if (step === 0) continue;
      settled = false;
      state[i] *= powerOfTwo(step);
    }
    if (settled) return;
  }
}

type Terms = { readonly falling: number; readonly rising: number; readonly falling2: number; readonly rising2: number };

/** Sums that change by 1/f, f, 1/f², f² when the scale of state i is multiplied by f. */
function sizesAgainst(i: number, n: number, a: Float64Array, g: Float64Array, q: Float64Array, state: Float64Array): Terms {
  let falling = 0;
  let rising = 0;
  for (let j = 0; j < n; j++) {
    if (j === i) continue;
    const up = state[j] / state[i];
    falling += Math.abs(a[i * n + j]) * up + Math.abs(g[i * n + j]) / state[i] / state[j];
    rising += Math.abs(a[j * n + i]) / up + Math.abs(q[i * n + j]) * state[i] * state[j];
  }
  const falling2 = Math.abs(g[i * n + i]) / state[i] / state[i];
  const rising2 = Math.abs(q[i * n + i]) * state[i] * state[i];
  // Off-diagonal entries of A, G and Q stand twice in the whole matrix, diagonal ones of G and Q once.
  return { falling: 2 * falling, rising: 2 * rising, falling2, rising2 };
}

/** Exponent that lowers the sum most, found by steps of falling length; 0 unless it gains five percent. */
function bestStep({ falling, rising, falling2, rising2 }: Terms, present: number): number {
  const size = (e: number) => {
    const f = powerOfTwo(e);
    return falling / f + rising * f + falling2 / f / f + rising2 * f * f;
  };
  if (falling + falling2 === 0 || rising + rising2 === 0) return 0;
  let best = 0;
  let least = size(0);
  for (const length of [64, 16, 4, 1]) {
    for (const direction of [length, -length]) {
      for (let e = best + direction; Math.abs(present + e) <= LARGEST_SHIFT; e += direction) {
        const next = size(e);
        if (!(next < least)) break;
        least = next;
        best = e;
      }
    }
  }
  return least < 0.99 * size(0) ? best : 0;
}
