import { addNarrow, type Wide, widen } from "../linalg/double-double";
import { largestEntry } from "../linalg/flat";
import { factorLu, type Lu, solveLu } from "../linalg/lu";
import { flatNorm } from "../linalg/norms";
import { pencilResidual, type SquarePencil } from "./square-pencil";

/** M v = E v s: v spans the null directions that belong to the eigenvalues of s. */
export type ZeroBlock = { readonly v: Wide; readonly s: Wide; readonly k: number };

const MOST_STEPS = 8;
/** A step of this size beside s leaves digits beyond those of a double. */
const SETTLED = 1e-20;
/** Steps this small beside the whole pencil are rounding of its wide numbers. */
const WIDE_ROUNDING = 1e-29;
/** While steps are this large the equations are set up afresh. */
const LARGE = 1e-6;

/**
 * Refines a block of zeros and its directions by Newton's method with residuals in twice the working precision.
 * Null when the steps do not contract.
 *
 * Shapes    start size×k → v size×k, s k×k
 * Accuracy  steps end below 1e-20 of s, or at ε where the pencil is too ill conditioned for that; at most 8
 * Source    Dongarra, Moler & Wilkinson, SIAM J. Numer. Anal. 20 (1983) 23-45, for values and vectors improved together
 */
export function refineBlock(pencil: SquarePencil, start: Float64Array, k: number): ZeroBlock | null {
  const { v, s } = plainBlock(pencil, start, k);
  const floor = WIDE_ROUNDING * flatNorm(pencil.matrix.hi);
  let factors: Lu | null = null;
  let last = Number.POSITIVE_INFINITY;
  for (let step = 0; step < MOST_STEPS; step++) {
    if (factors === null || last > LARGE) factors = factorLu(newtonMatrix(pencil, v.hi, s.hi, start, k), k * (pencil.size + k));
    if (factors.zeroPivot >= 0) return null;
    const change = newtonStep(pencil, factors, v, s, k);
    if (!change.s.every(Number.isFinite) || !change.v.every(Number.isFinite)) return null;
    addNarrow(v, change.v, 1);
    addNarrow(s, change.s, 1);
    const size = Math.max(flatNorm(change.s) / (flatNorm(s.hi) + floor / SETTLED), flatNorm(change.v) / flatNorm(v.hi));
    if (size <= SETTLED) return { v, s, k };
    if (step > 2 && size > LARGE && size > last) return null;
    last = size;
  }
  return last <= Number.EPSILON ? { v, s, k } : null;
}

/** A block as good as its start, which is in doubles. */
export function plainBlock(pencil: SquarePencil, start: Float64Array, k: number): ZeroBlock {
  return { v: widen(start), s: widen(quotientOf(pencil, start, k)), k };
}

/** The s that leaves least of M v - E v s, for v in doubles. */
function quotientOf({ n, size, matrix }: SquarePencil, v: Float64Array, k: number): Float64Array {
  const gram = new Float64Array(k * k);
  const right = new Float64Array(k * k);
  for (let i = 0; i < n; i++) {
    const image = new Float64Array(k);
    for (let l = 0; l < size; l++) for (let j = 0; j < k; j++) image[j] += matrix.hi[i * size + l] * v[l * k + j];
    for (let a = 0; a < k; a++) {
      for (let b = 0; b < k; b++) {
        gram[a * k + b] += v[i * k + a] * v[i * k + b];
        right[a * k + b] += v[i * k + a] * image[b];
      }
    }
  }
  const factors = factorLu(gram, k);
  return factors.zeroPivot >= 0 ? right : solveLu(factors, right, k);
}

/** Rows: column after column of M dv - E dv s - E v ds, then start' dv. Columns: dv column after column, then ds. */
function newtonMatrix(
  { n, size, matrix }: SquarePencil,
  v: Float64Array,
  s: Float64Array,
  start: Float64Array,
  k: number,
): Float64Array {
  const width = k * (size + k);
  const whole = new Float64Array(width * width);
  for (let j = 0; j < k; j++) {
    for (let i = 0; i < size; i++) {
      const row = (j * size + i) * width;
      for (let l = 0; l < size; l++) whole[row + j * size + l] = matrix.hi[i * size + l];
      if (i >= n) continue;
      for (let l = 0; l < k; l++) {
        whole[row + l * size + i] -= s[l * k + j];
        whole[row + k * size + l * k + j] = -v[i * k + l];
      }
    }
    for (let a = 0; a < k; a++) {
      const row = (k * size + a * k + j) * width;
      for (let l = 0; l < size; l++) whole[row + j * size + l] = start[l * k + a];
    }
  }
  return whole;
}

function newtonStep(pencil: SquarePencil, factors: Lu, v: Wide, s: Wide, k: number): { v: Float64Array; s: Float64Array } {
  const { size } = pencil;
  const residual = pencilResidual(pencil, v, s, k).hi;
  const right = new Float64Array(k * (size + k));
  for (let j = 0; j < k; j++) for (let i = 0; i < size; i++) right[j * size + i] = -residual[i * k + j];
  const step = largestEntry(right) === 0 ? right : solveLu(factors, right, 1);
  const change = new Float64Array(size * k);
  for (let j = 0; j < k; j++) for (let i = 0; i < size; i++) change[i * k + j] = step[j * size + i];
  return { v: change, s: step.slice(k * size) };
}
