import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { flatCholesky } from "../linalg/cholesky";
import { largestEntry, toFlat } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { requireFinite, requireShape, requireSymmetric } from "../linalg/require";
import { symmetricEigenvalues } from "../linalg/symmetric-eigenvalues";
import { workArray, workCopy } from "../linalg/work-array";
import type { FlatProblem } from "./problem";

export type RiccatiProblem = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly Q: Matrix;
  readonly R: Matrix;
  readonly S?: Matrix;
  readonly sampled?: boolean;
  /** Try a problem whose weights are indefinite: it may have a stabilising solution, but no regulator problem stands behind it. */
  readonly allowIndefinite?: boolean;
};

/** `indefinite` holds the refusal that was waived by `allowIndefinite`; `definite` weights see every state. */
export type CheckedProblem = {
  readonly problem: FlatProblem;
  readonly indefinite: NumericalError | null;
  readonly definite: boolean;
};

type WeightVerdict = { readonly refusal: NumericalError | null; readonly definite: boolean };

/** Pivots of weights scaled to a unit diagonal above which no direction is unweighted in any sense. */
const PLAINLY_POSITIVE = 1e-6;

/** Shapes, finiteness and symmetry, then the definiteness of the weights; the flat problem with Q and R exactly symmetric. */
export function checkProblem({ A, B, Q, R, S, sampled = false, allowIndefinite = false }: RiccatiProblem): CheckedProblem {
  const n = A.rows;
  const m = B.columns;
  requireShape("A", A, n, n);
  requireShape("B", B, n, m);
  requireShape("Q", Q, n, n);
  requireShape("R", R, m, m);
  const cross = S ?? Matrix.zeros(n, m);
  requireShape("S", cross, n, m);
  if (n === 0 || m === 0) throw new NumericalError("shape-mismatch", { A: [n, n], B: [n, m] });
  for (const [name, M] of [
    ["A", A],
    ["B", B],
    ["Q", Q],
    ["R", R],
    ["S", cross],
  ] as const)
    requireFinite(name, M);
  requireSymmetric("Q", Q);
  requireSymmetric("R", R);
  const problem = { n, m, sampled, a: toFlat(A), b: toFlat(B), q: symmetricFlat(Q), r: symmetricFlat(R), s: toFlat(cross) };
  if (!sampled) flatCholesky(problem.r, m, "R");
  const { refusal, definite } = judgeWeights(problem);
  if (refusal && !allowIndefinite) throw refusal;
  return { problem, indefinite: refusal, definite };
}

export function symmetricFlat(M: Matrix): Float64Array {
  const n = M.rows;
  const flat = toFlat(M);
  for (let i = 0; i < n; i++)
    for (let j = 0; j < i; j++) flat[i * n + j] = flat[j * n + i] = 0.5 * flat[i * n + j] + 0.5 * flat[j * n + i];
  return flat;
}

/** Why [Q S; S' R] is no weight, or null. */
export function weightRefusal(problem: FlatProblem): NumericalError | null {
  return judgeWeights(problem).refusal;
}

/** The block [Q S; S' R], scaled by powers of two to a diagonal near one, may be negative only by rounding. */
function judgeWeights({ n, m, q, r, s }: FlatProblem): WeightVerdict {
  const size = n + m;
  const entry = (i: number, j: number): number => {
    if (i < n) return j < n ? q[i * n + j] : s[i * m + j - n];
    return j < n ? s[j * m + i - n] : r[(i - n) * m + j - n];
  };
  const scale = Array.from({ length: size }, (_, i) => {
    const diagonal = Math.abs(entry(i, i));
    return diagonal === 0 ? 1 : powerOfTwo(-Math.round(exponentOf(diagonal) / 2));
  });
  const block = workArray(size * size);
  for (let i = 0; i < size; i++)
    for (let j = 0; j <= i; j++) block[i * size + j] = block[j * size + i] = entry(i, j) * scale[i] * scale[j];
  if (!Number.isFinite(largestEntry(block))) throw new NumericalError("too-large", { what: "weights", limit: Number.MAX_VALUE });
  // Rounding of entries typed in decimal, or of a product C'C, is a few n ε of the unit diagonal.
  const tolerance = 16 * size * Number.EPSILON;
  const pivot = leastPivot(workCopy(block), size);
  if (pivot >= 0) return { refusal: null, definite: pivot > PLAINLY_POSITIVE };
  const least = symmetricEigenvalues(
    new Matrix(Array.from({ length: size }, (_, i) => [...block.subarray(i * size, i * size + size)])),
  )[0];
  if (least >= -tolerance) return { refusal: null, definite: false };
  const given = new Matrix(Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, j) => entry(i, j))));
  const matrix = s.some((x) => x !== 0) ? "[Q S; S' R]" : blame(given, n);
  const index = firstNegative(block, size, tolerance);
  const refusal = new NumericalError("not-positive-semidefinite", {
    matrix,
    eigenvalue: symmetricEigenvalues(given)[0],
    ...(index !== null && { index: matrix === "R" ? index - n : index }),
  });
  return { refusal, definite: false };
}

/** Without a cross term the block splits: which of the two is to blame. */
function blame(block: Matrix, n: number): "Q" | "R" {
  const q = symmetricEigenvalues(block.subMatrix(0, n - 1, 0, n - 1))[0];
  const r = symmetricEigenvalues(block.subMatrix(n, block.rows - 1, n, block.rows - 1))[0];
  return q <= r ? "Q" : "R";
}

/** The place at which elimination without pivoting first meets less than nothing; null where it never does. */
function firstNegative(block: Float64Array, n: number, tolerance: number): number | null {
  const a = workCopy(block);
  for (let k = 0; k < n; k++) {
    const pivot = a[k * n + k];
    if (pivot < -tolerance) return k;
    if (pivot <= tolerance) {
      for (let j = k + 1; j < n; j++) if (a[k * n + j] * a[k * n + j] > tolerance) return k;
      continue;
    }
    for (let i = k + 1; i < n; i++) {
      const factor = a[i * n + k] / pivot;
      if (factor !== 0) for (let j = k + 1; j < n; j++) a[i * n + j] -= factor * a[k * n + j];
    }
  }
  return null;
}

/** Quick proof by elimination without pivoting: the least pivot, zero for an exactly zero row, -1 where nothing is proved. */
function leastPivot(a: Float64Array, n: number): number {
  let least = Number.POSITIVE_INFINITY;
  for (let k = 0; k < n; k++) {
    const pivot = a[k * n + k];
    least = Math.min(least, pivot);
    if (pivot === 0) {
      for (let j = k + 1; j < n; j++) if (a[k * n + j] !== 0) return -1;
      continue;
    }
    if (pivot < n * Number.EPSILON) return -1;
    for (let i = k + 1; i < n; i++) {
      const factor = a[k * n + i] / pivot;
      if (factor !== 0) for (let j = i; j < n; j++) a[i * n + j] -= factor * a[k * n + j];
    }
  }
  return least;
}
