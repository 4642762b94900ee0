import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { largestEntry, toFlat } from "./flat";
import { requireFinite, requireSymmetric } from "./require";

const SWEEP_LIMIT = 60;

/**
 * Eigenvalues of a symmetric matrix, smallest first, by two-sided Jacobi rotations.
 *
 * Shapes    M n×n → n values
 * Units     those of M
 * Throws    shape-mismatch; not-finite; not-symmetric; no-convergence after 60 sweeps
 * Accuracy  c n ε of the largest; of a scaled positive definite matrix small ones keep relative accuracy
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, algorithm 8.5.3
 */
export function symmetricEigenvalues(M: Matrix): number[] {
  requireFinite("M", M);
  requireSymmetric("M", M);
  const n = M.rows;
  const a = toFlat(M);
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) a[i * n + j] = a[j * n + i] = 0.5 * (a[i * n + j] + a[j * n + i]);
  for (let sweep = 0; ; sweep++) {
    if (sweep === SWEEP_LIMIT) throw new NumericalError("no-convergence", { routine: "symmetric-jacobi", limit: SWEEP_LIMIT });
    let turned = false;
    for (let p = 0; p < n - 1; p++) for (let q = p + 1; q < n; q++) turned = rotate(a, n, p, q) || turned;
    if (!turned) break;
  }
  return Array.from({ length: n }, (_, i) => a[i * n + i]).sort((x, y) => x - y);
}

/** Zeroes entry (p, q); false when it is negligible beside its diagonal entries or the whole. */
function rotate(a: Float64Array, n: number, p: number, q: number): boolean {
  const off = a[p * n + q];
  const app = a[p * n + p];
  const aqq = a[q * n + q];
  const size = Math.sqrt(Math.abs(app)) * Math.sqrt(Math.abs(aqq));
  if (Math.abs(off) <= 0.25 * Number.EPSILON * size || Math.abs(off) <= 1e-300 + 1e-18 * largestRow(a, n, p, q)) return false;
  const zeta = (aqq - app) / (2 * off);
  const t = (zeta >= 0 ? 1 : -1) / (Math.abs(zeta) + Math.sqrt(1 + zeta * zeta));
  const cos = 1 / Math.sqrt(1 + t * t);
  const sin = cos * t;
  for (let k = 0; k < n; k++) {
    if (k === p || k === q) continue;
    const x = a[k * n + p];
    const y = a[k * n + q];
    a[k * n + p] = a[p * n + k] = cos * x - sin * y;
    a[k * n + q] = a[q * n + k] = sin * x + cos * y;
  }
  a[p * n + p] = app - t * off;
  a[q * n + q] = aqq + t * off;
  a[p * n + q] = a[q * n + p] = 0;
  return true;
}

function largestRow(a: Float64Array, n: number, p: number, q: number): number {
  return Math.max(largestEntry(a.subarray(p * n, p * n + n)), largestEntry(a.subarray(q * n, q * n + n)));
}
