import { flatProduct, flatProductInto } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { flatOneNorm } from "../linalg/solve-linear";
import { workArray, workCopy } from "../linalg/work-array";
import { NODES, POINTS } from "./cell-basis";

/** Everything to cross a cell of length h: the state at its end, and all signals at its nodes, from the state at its start. */
export type Cell = { readonly h: number; readonly phi: Float64Array; readonly nodes: Float64Array };

/** log2 of NODE_GRID */
const GRID_LEVELS = 5;
/** Norm of a step up to which its transition is summed afresh, as a power of two; the series then ends below 1e-17 of itself. */
const SERIES_EXPONENT = -3;
const TERMS = 12;
const GROUP = 3;

/**
 * Cells of length 2^level seconds for z' = a z, made when first asked for. Transitions are kept as Φ - I, which a short step
 * does not cost digits; twice the length is 2Ψ + Ψ².
 *
 * Shapes    a n×n, rows signals×n → phi n×n, nodes (signals · POINTS)×n, the nodes of a signal together
 * Throws    nothing; entries beyond the range of doubles become infinite
 * Accuracy  as scaling and squaring from a norm of 1/8
 */
export function cellLadder(a: Float64Array, n: number, rows: Float64Array): (level: number) => Cell {
  const norm = flatOneNorm(a, n);
  const seriesLevel = norm === 0 ? 1023 : SERIES_EXPONENT - 1 - exponentOf(norm);
  const grown = new Map<number, Float64Array>();
  const cells = new Map<number, Cell>();
  const growthOf = (level: number): Float64Array => {
    let from = level;
    while (from > seriesLevel && !grown.has(from)) from--;
    let psi = grown.get(from) ?? seriesGrowth(a, n, from);
    grown.set(from, psi);
    for (let k = from + 1; k <= level; k++) {
      psi = doubledGrowth(psi, n);
      grown.set(k, psi);
    }
    return psi;
  };
  return (level) => {
    const known = cells.get(level);
    if (known) return known;
    const nodes = signalsAtNodes(
      [0, 1, 2].map((k) => growthOf(level - GRID_LEVELS + k)),
      n,
      rows,
    );
    const phi = growthOf(level).slice();
    for (let i = 0; i < n * n; i += n + 1) phi[i] += 1;
    const cell = { h: powerOfTwo(level), phi, nodes };
    cells.set(level, cell);
    return cell;
  };
}

/** exp(x) - I for x = a 2^level: X + X²/2! + ..., the terms taken together by threes. */
function seriesGrowth(a: Float64Array, n: number, level: number): Float64Array {
  const h = powerOfTwo(level);
  const x = a.map((entry) => entry * h);
  const square = flatProduct(x, x, n, n, n);
  const cube = flatProduct(square, x, n, n, n);
  const factorials = [1];
  for (let k = 1; k < TERMS; k++) factorials.push(factorials[k - 1] * k);
  let sum: Float64Array = workArray(n * n);
  for (let first = TERMS - GROUP; first >= 0; first -= GROUP) {
    if (first < TERMS - GROUP) sum = flatProduct(sum, cube, n, n, n);
    for (let i = 0; i < sum.length; i++) sum[i] += square[i] / factorials[first + 2] + x[i] / factorials[first + 1];
    if (first > 0) for (let i = 0; i < n * n; i += n + 1) sum[i] += 1 / factorials[first];
  }
  return sum;
}

function doubledGrowth(psi: Float64Array, n: number): Float64Array {
  const doubled = flatProduct(psi, psi, n, n, n);
  for (let i = 0; i < doubled.length; i++) doubled[i] += 2 * psi[i];
  return doubled;
}

/** The signals' rows moved from node to node, by 1, 2, 3 or 4 steps of the grid; `growth` is Φ - I of 1, 2 and 4 steps. */
function signalsAtNodes(growth: readonly Float64Array[], n: number, rows: Float64Array): Float64Array {
  const [one, two, four] = growth;
  const three = flatProduct(one, two, n, n, n);
  for (let i = 0; i < three.length; i++) three[i] += one[i] + two[i];
  const by = [one, one, two, three, four];
  const signals = n === 0 ? 0 : rows.length / n;
  const nodes = workArray(signals * POINTS * n);
  let [moved, more] = [workCopy(rows), workArray(rows.length)];
  for (let node = 0; node < POINTS; node++) {
    if (node > 0) {
      flatProductInto(more, moved, by[NODES[node] - NODES[node - 1]], signals, n, n);
      for (let i = 0; i < more.length; i++) more[i] += moved[i];
      [moved, more] = [more, moved];
    }
    for (let i = 0, from = 0; i < signals; i++)
      for (let to = (i * POINTS + node) * n, end = to + n; to < end; to++) nodes[to] = moved[from++];
  }
  return nodes;
}
