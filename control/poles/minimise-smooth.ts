import { dotRow } from "./eigenvector-frame";
import type { DescentRoom } from "./search-scratch";

const MOST_HALVINGS = 12;
/** A step that promises to take off less than this share of the cost is not worth its evaluation. */
const SMALLEST_GAIN = 1e-7;

type Cost = (x: Float64Array, gradient: Float64Array) => number;

/**
 * A few quasi-Newton steps downhill from `room.x` for a positive cost that does not depend on the length of x; the last point
 * reached stands in `room.x`.
 *
 * Shapes    k variables; `cost` writes the gradient into its second argument; `room.inverse` k×k: a first inverse curvature
 * Units     none
 * Throws    nothing
 * Accuracy  the cost never rises; false when no step lowered it
 * Source    Nocedal & Wright, Numerical Optimization, 2nd ed. 2006, algorithm 6.1 with backtracking
 */
export function minimiseSmooth(cost: Cost, room: DescentRoom, k: number, steps: number): boolean {
  const { x, gradient, direction, trial, trialGradient, inverse } = room;
  let value = cost(x, gradient);
  if (!Number.isFinite(value)) return false;
  let moved = false;
  for (let step = 0; step < steps; step++) {
    for (let i = 0; i < k; i++) direction[i] = -dotRow(inverse, i * k, gradient, 0, k);
    const slope = dotRow(direction, 0, gradient, 0, k);
    if (!(slope < -SMALLEST_GAIN * value)) break;
    const reached = backtrack(cost, room, k, value, slope);
    if (reached === null) break;
    for (let i = 0; i < k; i++) {
      direction[i] = trial[i] - x[i];
      x[i] = trial[i];
      const turned = trialGradient[i];
      trialGradient[i] = turned - gradient[i];
      gradient[i] = turned;
    }
    if (step + 1 < steps) updateInverse(room, k);
    value = reached;
    moved = true;
  }
  return moved;
}

/** The first of the step and its halves that lowers the cost enough, left in `room.trial`; null when none does. */
function backtrack(cost: Cost, room: DescentRoom, k: number, value: number, slope: number): number | null {
  const { x, direction, trial, trialGradient } = room;
  let length = 1;
  for (let halving = 0; halving < MOST_HALVINGS; halving++) {
    for (let i = 0; i < k; i++) trial[i] = x[i] + length * direction[i];
    const reached = cost(trial, trialGradient);
    if (reached <= value + 1e-4 * length * slope) return reached;
    length /= 2;
  }
  return null;
}

/**
 * The inverse update of Broyden, Fletcher, Goldfarb and Shanno from the last step (in `direction`) and the change of the
 * gradient (in `trialGradient`); skipped where the curvature is not positive.
 */
function updateInverse({ direction: change, trialGradient: turn, bent, inverse }: DescentRoom, k: number): void {
  const curvature = dotRow(change, 0, turn, 0, k);
  if (!(curvature > 0) || !Number.isFinite(1 / curvature)) return;
  for (let i = 0; i < k; i++) bent[i] = dotRow(inverse, i * k, turn, 0, k);
  const factor = (1 + dotRow(turn, 0, bent, 0, k) / curvature) / curvature;
  for (let i = 0, at = 0; i < k; i++) {
    const ownChange = factor * change[i] - bent[i] / curvature;
    const ownBent = change[i] / curvature;
    for (let j = 0; j < k; j++, at++) inverse[at] += ownChange * change[j] - ownBent * bent[j];
  }
}
