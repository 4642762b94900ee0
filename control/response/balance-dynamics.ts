import { NumericalError } from "../errors";
import { balance } from "../linalg/balance";
import type { Wide } from "../linalg/double-double";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { workArray } from "../linalg/work-array";

/** x[order[k]] = scale[k] z[k] turns x' = A x into z' = matrix z. */
export type BalancedDynamics = { readonly matrix: Float64Array; readonly order: Int32Array; readonly scale: Float64Array };

const MOST_EXPONENT = 300;

/**
 * Balanced coordinates for a dynamic matrix: strongly connected blocks scaled as `balance` does, then whole blocks shrunk
 * so that no one-way coupling is larger than the blocks themselves. Powers of two and a permutation only.
 *
 * Shapes    a n×n row-major → matrix n×n block upper triangular, order n, scale n
 * Throws    too-large for entries beyond 2^300
 * Accuracy  exact but for underflow of entries that are negligible beside the largest
 * Source    Parlett & Reinsch, Numer. Math. 13 (1969) 293-304; the second step ours
 */
export function balanceDynamics(a: Float64Array, n: number): BalancedDynamics {
  const { matrix, order, scale, shift } = balance(a, n);
  if (shift < 0) throw new NumericalError("too-large", { what: "entry", limit: powerOfTwo(MOST_EXPONENT) });
  if (shift > 0) for (let k = 0; k < matrix.length; k++) matrix[k] *= powerOfTwo(-shift);
  const starts = blockStarts(matrix, n);
  const size = largestBlockSum(matrix, n, starts);
  if (size === 0) return { matrix, order, scale };
  for (let block = 1; block + 1 < starts.length; block++) shrinkBlock(matrix, n, starts[block], starts[block + 1], size, scale);
  return { matrix, order, scale };
}

/** The same for a matrix with twice the digits, judged by its leading parts. */
export function balanceWide(a: Wide, n: number): BalancedDynamics & { readonly wide: Wide } {
  const balanced = balanceDynamics(a.hi, n);
  const { matrix, order, scale } = balanced;
  const lo = workArray(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) lo[i * n + j] = rescaled(a.lo[order[i] * n + order[j]], scale[j], scale[i]);
  }
  return { ...balanced, wide: { hi: matrix, lo } };
}

/** entry · up / down, in the order that cannot overflow on the way. */
export function rescaled(entry: number, up: number, down: number): number {
  return up > 1 === down > 1 ? entry * (up / down) : (entry * up) / down;
}

/** Places where the lower left of a block upper triangular matrix is empty. */
function blockStarts(b: Float64Array, n: number): number[] {
  const starts = [0];
  let reach = 0;
  for (let j = 0; j < n; j++) {
    for (let i = n - 1; i > reach; i--) {
      if (b[i * n + j] !== 0) {
        reach = i;
        break;
      }
    }
    if (reach === j) {
      starts.push(j + 1);
      reach = j + 1;
    }
  }
  return starts;
}

/** Largest column sum inside the diagonal blocks. */
function largestBlockSum(b: Float64Array, n: number, starts: readonly number[]): number {
  let largest = 0;
  for (let block = 0; block + 1 < starts.length; block++) {
    for (let j = starts[block]; j < starts[block + 1]; j++) {
      let sum = 0;
      for (let i = starts[block]; i < starts[block + 1]; i++) sum += Math.abs(b[i * n + j]);
      if (sum > largest) largest = sum;
    }
  }
  return largest;
}

/** Columns `from` to `to` - 1 are brought down until what stands above their block is at most `size`. */
function shrinkBlock(b: Float64Array, n: number, from: number, to: number, size: number, scale: Float64Array): void {
  let above = 0;
  for (let j = from; j < to; j++) {
    let sum = 0;
    for (let i = 0; i < from; i++) sum += Math.abs(b[i * n + j]);
    if (sum > above) above = sum;
  }
  if (above <= size) return;
  const down = exponentOf(above) - exponentOf(size) + 1;
  for (let j = from; j < to; j++) if (Math.abs(exponentOf(scale[j]) - down) > 2 * MOST_EXPONENT) return;
  const factor = powerOfTwo(-down);
  const back = powerOfTwo(down);
  for (let j = from; j < to; j++) {
    scale[j] *= factor;
    for (let i = 0; i < from; i++) b[i * n + j] *= factor;
    for (let k = to; k < n; k++) b[j * n + k] *= back;
  }
}
