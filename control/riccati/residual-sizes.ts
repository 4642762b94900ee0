import { flatProduct, flatTransposedProduct, largestEntry } from "../linalg/flat";
import { workArray, workCopy } from "../linalg/work-array";
import type { FlatProblem } from "./problem";

/**
 * What rounding in double-double may hide in each entry of a residual: 4 (n + m) ε² of the sizes of the terms that were
 * summed. The gain that was held as data is off by ε / 2, which enters squared.
 *
 * Shapes    x n×n, k m×n → n×n, not negative
 */
export function residualFloor(problem: FlatProblem, x: Float64Array, k: Float64Array): Float64Array {
  const { n, m, s, q, sampled } = problem;
  const a = sizesOf(problem.a);
  const b = sizesOf(problem.b);
  const gain = sizesOf(k);
  const size = sizesOf(x);
  const states = flatTransposedProduct(a, size, n, n, n);
  const inputs = flatTransposedProduct(b, size, n, m, n);
  const right = sampled ? flatProduct(inputs, a, m, n, n) : workCopy(inputs);
  for (let i = 0; i < n; i++) for (let j = 0; j < m; j++) right[j * n + i] += Math.abs(s[i * m + j]);
  const weight = sizesOf(problem.r);
  const more = sampled ? flatProduct(inputs, b, m, n, m) : null;
  if (more) for (let at = 0; at < more.length; at++) weight[at] += more[at];
  const pulled = flatTransposedProduct(gain, right, m, n, n);
  const costs = flatTransposedProduct(gain, flatProduct(weight, gain, m, m, n), m, n, n);
  const own = sampled ? flatProduct(states, a, n, n, n) : states;
  const unit = 4 * (n + m) * Number.EPSILON * Number.EPSILON;
  const floor = workArray(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const [at, mirror] = [i * n + j, j * n + i];
      const state = sampled ? own[at] + size[at] : own[at] + own[mirror];
      floor[at] = unit * (state + Math.abs(q[at]) + pulled[at] + pulled[mirror] + costs[at]);
    }
  }
  return floor;
}

function sizesOf(a: Float64Array): Float64Array {
  const sizes = workArray(a.length);
  for (let i = 0; i < a.length; i++) sizes[i] = Math.abs(a[i]);
  return sizes;
}

/** Diagonal matrix D with -D ≤ M ≤ D for every symmetric M whose entries are at most the given sizes. */
export function diagonalMajorant(sizes: Float64Array, n: number): Float64Array {
  const majorant = workArray(n * n);
  const largest = largestEntry(sizes);
  if (largest === 0) return majorant;
  // Weights near the square roots of the diagonal make the majorant of a rank-one pattern no larger than n times it.
  const w = Float64Array.from({ length: n }, (_, i) => Math.sqrt(sizes[i * n + i] + largest * Number.EPSILON * Number.EPSILON));
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += sizes[i * n + j] / w[j];
    majorant[i * n + i] = w[i] * sum;
  }
  return majorant;
}
