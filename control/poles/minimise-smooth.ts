import { dotRow } from "./eigenvector-frame";

const MOST_HALVINGS = 12;

/**
 * A few quasi-Newton steps downhill from x for a positive cost that does not depend on the length of x.
 *
 * Shapes    x k → k; `cost` writes the gradient into its second argument
 * Units     none
 * Throws    nothing
 * Accuracy  the cost never rises; null when no step lowered it
 * Source    Nocedal & Wright, Numerical Optimization, 2nd ed. 2006, algorithm 6.1 with backtracking
 */
export function minimiseSmooth(
  cost: (x: Float64Array, gradient: Float64Array) => number,
  start: Float64Array,
  steps: number,
): Float64Array | null {
  const k = start.length;
  let x = start;
  let gradient = new Float64Array(k);
  let value = cost(x, gradient);
  if (!Number.isFinite(value)) return null;
  // The curvature of a cost without length is about twice its value over the squared length.
  const H = new Float64Array(k * k);
  for (let i = 0; i < k; i++) H[i * k + i] = dotRow(x, 0, x, 0, k) / (2 * value);
  let moved = false;
  for (let step = 0; step < steps; step++) {
    const direction = new Float64Array(k);
    for (let i = 0; i < k; i++) direction[i] = -dotRow(H, i * k, gradient, 0, k);
    const slope = dotRow(direction, 0, gradient, 0, k);
    if (!(slope < -Number.EPSILON * value)) break;
    const found = backtrack(cost, x, value, direction, slope);
    if (!found) break;
    const change = Float64Array.from({ length: k }, (_, i) => found.x[i] - x[i]);
    const turn = Float64Array.from({ length: k }, (_, i) => found.gradient[i] - gradient[i]);
    updateInverse(H, change, turn, k);
    x = found.x;
    gradient = found.gradient;
    value = found.value;
    moved = true;
  }
  return moved ? x : null;
}

function backtrack(
  cost: (x: Float64Array, gradient: Float64Array) => number,
  x: Float64Array,
  value: number,
  direction: Float64Array,
  slope: number,
): { x: Float64Array; gradient: Float64Array<ArrayBuffer>; value: number } | null {
  const gradient = new Float64Array(x.length);
  let length = 1;
  for (let halving = 0; halving < MOST_HALVINGS; halving++) {
    const trial = x.map((entry, i) => entry + length * direction[i]);
    const reached = cost(trial, gradient);
    if (reached <= value + 1e-4 * length * slope) return { x: trial, gradient, value: reached };
    length /= 2;
  }
  return null;
}

/** The inverse update of Broyden, Fletcher, Goldfarb and Shanno; skipped where the curvature is not positive. */
function updateInverse(H: Float64Array, change: Float64Array, turn: Float64Array, k: number): void {
  const curvature = dotRow(change, 0, turn, 0, k);
  if (!(curvature > 0) || !Number.isFinite(1 / curvature)) return;
  const bent = new Float64Array(k);
  for (let i = 0; i < k; i++) bent[i] = dotRow(H, i * k, turn, 0, k);
  const factor = (1 + dotRow(turn, 0, bent, 0, k) / curvature) / curvature;
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < k; j++) {
      H[i * k + j] += factor * change[i] * change[j] - (bent[i] * change[j] + change[i] * bent[j]) / curvature;
    }
  }
}
