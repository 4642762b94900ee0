import { flatCholesky, solveCholesky } from "../linalg/cholesky";
import { flatProduct, flatTranspose, flatTransposedProduct } from "../linalg/flat";
import { workArray, workCopy } from "../linalg/work-array";
import type { FlatProblem } from "./problem";

/** a and q after u = v - R⁻¹ S' x, and g = B R⁻¹ B': the three coefficients of the equation without cross term. */
export type PlainProblem = {
  readonly n: number;
  readonly sampled: boolean;
  readonly a: Float64Array;
  readonly g: Float64Array;
  readonly q: Float64Array;
};

/** Throws not-positive-definite when R is not. Good to cond(R) ε, enough for a start that is refined on B and R themselves. */
export function removeCrossTerm(problem: FlatProblem, name: string): PlainProblem {
  const { n, m, sampled, b, r, s } = problem;
  const l = flatCholesky(r, m, name);
  const half = solveLower(l, m, flatTranspose(b, n, m), n);
  const g = flatTransposedProduct(half, half, m, n, n);
  if (s.every((entry) => entry === 0)) return { n, sampled, a: problem.a, g, q: problem.q };
  const gain = solveCholesky(l, m, flatTranspose(s, n, m), n);
  const shift = flatProduct(b, gain, n, m, n);
  const halfS = solveLower(l, m, flatTranspose(s, n, m), n);
  const less = flatTransposedProduct(halfS, halfS, m, n, n);
  return { n, sampled, a: difference(problem.a, shift), g, q: difference(problem.q, less) };
}

function difference(a: Float64Array, b: Float64Array): Float64Array {
  const c = workArray(a.length);
  for (let i = 0; i < a.length; i++) c[i] = a[i] - b[i];
  return c;
}

function solveLower(l: Float64Array, m: number, b: Float64Array, columns: number): Float64Array {
  const x = workCopy(b);
  for (let i = 0; i < m; i++) {
    for (let j = 0; j < columns; j++) {
      let sum = x[i * columns + j];
      for (let k = 0; k < i; k++) sum -= l[i * m + k] * x[k * columns + j];
      x[i * columns + j] = sum / l[i * m + i];
    }
  }
  return x;
}
