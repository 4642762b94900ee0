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

/** How far the last two coefficients of the interpolating polynomial reach; `values` holds POINTS numbers from `at` on. */
export function interpolationError(values: Float64Array, at: number): number {
  let last = 0;
  let other = 0;
  for (let j = 0; j < POINTS; j++) {
    const value = values[at + j] - values[at];
    other += TO_CHEBYSHEV_END[j] * value;
    last += TO_CHEBYSHEV_END[POINTS + j] * value;
  }
  return Math.abs(last) + Math.abs(other);
}

/** Bernstein coefficients of the polynomial through values at the nodes, plus `offset`; the end values are kept exactly. */
export function bernsteinCoefficients(values: Float64Array, at: number, offset: number): Float64Array {
  const start = values[at];
  const coefficients = new Float64Array(POINTS);
  for (let i = 1; i < DEGREE; i++) {
    let sum = 0;
    for (let j = 1; j < POINTS; j++) sum += TO_BERNSTEIN[i * POINTS + j] * (values[at + j] - start);
    coefficients[i] = sum + start + offset;
  }
  coefficients[0] = start + offset;
  coefficients[DEGREE] = values[at + DEGREE] + offset;
  return coefficients;
}
