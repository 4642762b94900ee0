import { flatProduct } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { flatOneNorm } from "../linalg/solve-linear";
import { NODE_GRID, NODES, POINTS } from "./cell-basis";
import { flatExponential } from "./matrix-exponential";

/** Everything to cross a cell of length h: the state at its end, and all signals at its nodes, from the state at its start. */
export type Cell = { readonly h: number; readonly phi: Float64Array; readonly nodes: Float64Array };

/** Norm of A times the step up to which a step's transition is computed afresh; longer ones are squares, as inside the exponential. */
const FRESH_NORM = 4;
const GRID_SQUARINGS = 5;

/**
 * Cells of length 2^level seconds for z' = a z, made when first asked for.
 *
 * Shapes    a n×n, rows signals×n → phi n×n, nodes (signals · POINTS)×n, the nodes of a signal together
 * Throws    too-large
 * Accuracy  as `matrixExponential`
 */
export function cellLadder(a: Float64Array, n: number, rows: Float64Array): (level: number) => Cell {
  const norm = flatOneNorm(a, n);
  const freshLevel = norm === 0 ? 1023 : exponentOf(FRESH_NORM / norm);
  const steps = new Map<number, Float64Array>();
  const cells = new Map<number, Cell>();
  const stepOf = (level: number): Float64Array => {
    let phi = steps.get(level);
    if (phi) return phi;
    let from = level;
    while (from > freshLevel && !steps.has(from - 1)) from--;
    for (let k = from; k <= level; k++) {
      const shorter = k > freshLevel ? steps.get(k - 1) : undefined;
      phi = shorter ? flatProduct(shorter, shorter, n, n, n) : exponentialOfStep(a, n, k);
      steps.set(k, phi);
    }
    return phi ?? exponentialOfStep(a, n, level);
  };
  return (level) => {
    const known = cells.get(level);
    if (known) return known;
    const step = stepOf(level - GRID_SQUARINGS);
    const cell = { h: powerOfTwo(level), phi: squared(step, n, GRID_SQUARINGS), nodes: signalsAtNodes(step, n, rows) };
    cells.set(level, cell);
    return cell;
  };
}

function exponentialOfStep(a: Float64Array, n: number, level: number): Float64Array {
  const h = powerOfTwo(level);
  return flatExponential(
    a.map((entry) => entry * h),
    n,
  );
}

function signalsAtNodes(step: Float64Array, n: number, rows: Float64Array): Float64Array {
  const signals = n === 0 ? 0 : rows.length / n;
  const nodes = new Float64Array(signals * POINTS * n);
  let moved = rows;
  let node = 0;
  for (let place = 0; place <= NODE_GRID; place++) {
    if (place > 0) moved = flatProduct(moved, step, signals, n, n);
    if (NODES[node] !== place) continue;
    for (let i = 0; i < signals; i++) nodes.set(moved.subarray(i * n, (i + 1) * n), (i * POINTS + node) * n);
    node++;
  }
  return nodes;
}

/** Φ², Φ⁴, ... : `times` squarings. */
function squared(phi: Float64Array, n: number, times: number): Float64Array {
  let power = phi;
  for (let k = 0; k < times; k++) power = flatProduct(power, power, n, n, n);
  return power;
}
