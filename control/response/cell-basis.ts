import { factorLu, solveLu } from "../linalg/lu";

/** Places of the values in a cell, in parts of its length: near the Chebyshev points, on a grid that powers of one step reach. */
export const NODES = [0, 1, 2, 5, 8, 12, 16, 20, 24, 27, 30, 31, 32] as const;
export const NODE_GRID = 32;
export const POINTS = NODES.length;
const DEGREE = POINTS - 1;

/** Coefficients in the Bernstein basis from values at the nodes, POINTS×POINTS row-major. */
const TO_BERNSTEIN = solveLu(factorLu(collocation(bernstein), POINTS), identity(), POINTS);
/** Last two coefficients in the Chebyshev basis, which tell how well the polynomial follows, 2×POINTS. */
const TO_CHEBYSHEV_END = solveLu(factorLu(collocation(chebyshev), POINTS), identity(), POINTS).slice((POINTS - 2) * POINTS);

function identity(): Float64Array {
  return Float64Array.from({ length: POINTS * POINTS }, (_, k) => (k % (POINTS + 1) === 0 ? 1 : 0));
}

function collocation(basis: (k: number, t: number) => number): Float64Array {
  return Float64Array.from({ length: POINTS * POINTS }, (_, index) => {
    const place = NODES[Math.floor(index / POINTS)] / NODE_GRID;
    return basis(index % POINTS, place);
  });
}

function bernstein(k: number, t: number): number {
  let value = 1;
  for (let j = 0; j < k; j++) value *= (t * (DEGREE - j)) / (j + 1);
  for (let j = 0; j < DEGREE - k; j++) value *= 1 - t;
  return value;
}

function chebyshev(k: number, t: number): number {
  const x = 2 * t - 1;
  let before = 1;
  let here = k === 0 ? 1 : x;
  for (let j = 1; j < k; j++) [before, here] = [here, 2 * x * here - before];
  return here;
}

/** Largest size of the interpolating polynomial over the cell for values of size one at the nodes, from a grid with some to spare. */
export const LEBESGUE = 1.05 * lebesgue(2048);

function lebesgue(steps: number): number {
  let most = 0;
  for (let step = 0; step <= steps; step++) {
    const t = (NODE_GRID * step) / steps;
    let sum = 0;
    for (const node of NODES) {
      let value = 1;
      for (const other of NODES) if (other !== node) value *= (t - other) / (node - other);
      sum += Math.abs(value);
    }
    most = Math.max(most, sum);
  }
  return most;
}

/** How far the last two coefficients of the interpolating polynomial reach; `values` holds POINTS numbers from `at` on. */
export function interpolationError(values: Float64Array, at: number): number {
  const start = values[at];
  let last = 0;
  let other = 0;
  for (let j = 1; j < POINTS; j++) {
    const value = values[at + j] - start;
    other += TO_CHEBYSHEV_END[j] * value;
    last += TO_CHEBYSHEV_END[POINTS + j] * value;
  }
  return Math.abs(last) + Math.abs(other);
}

/** Bernstein coefficients of the polynomial through values at the nodes, plus `offset`, into `b`; the end values are kept exactly. */
export function bernsteinCoefficients(values: Float64Array, at: number, offset: number, b: Float64Array): void {
  const start = values[at];
  for (let i = 1; i < DEGREE; i += 2) {
    const row = i * POINTS;
    let sum = 0;
    let next = 0; // of row i + 1; beyond the last inner row it is not used
    for (let j = 1; j < POINTS; j++) {
      const value = values[at + j] - start;
      sum += TO_BERNSTEIN[row + j] * value;
      next += TO_BERNSTEIN[row + POINTS + j] * value;
    }
    b[i] = sum + start + offset;
    b[i + 1] = next + start + offset;
  }
  b[0] = start + offset;
  b[DEGREE] = values[at + DEGREE] + offset;
}
