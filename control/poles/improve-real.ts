import type { Admissible } from "./admissible-vectors";
import { dotRow, type Frame, replaceColumn } from "./eigenvector-frame";

/** Turns the column of a real pole to where the determinant of the eigenvectors is largest; returns by how much it grew. */
export function raiseDeterminantReal(frame: Frame, admissible: Admissible): number {
  const { n } = frame;
  const a = projectedDual(frame, admissible, admissible.pole.column);
  const length = Math.sqrt(dotRow(a, 0, a, 0, a.length));
  if (!(length > 0)) return 1;
  const x = combine(admissible, a, n);
  return replaceColumn(frame, admissible.pole.column, x) ? length : 1;
}

/**
 * Turns the column of a real pole to the admissible unit vector with the least |X⁻¹|, all other columns held.
 * With y its dual row and wᵢ the other dual rows made orthogonal to y, |X⁻¹|² is a constant plus
 * |y|² (|z|² + Σ (wᵢ'S z)²) / (y'S z)², least at z = (I + Σ S'wᵢwᵢ'S)⁻¹ S'y.
 *
 * Shapes    S n×k, X n×n
 * Units     none
 * Throws    nothing; a step that rounding spoils is not taken
 * Accuracy  the exact minimum over one column, to rounding
 * Source    in the spirit of Byers & Nash, Int. J. Control 49 (1989) 97-117
 */
export function lowerConditionReal(frame: Frame, admissible: Admissible): void {
  const { n, duals, norms } = frame;
  const { size, pole } = admissible;
  const j = pole.column;
  const a = projectedDual(frame, admissible, j);
  const M = new Float64Array(size * size);
  for (let k = 0; k < size; k++) M[k * size + k] = 1;
  for (let i = 0; i < n; i++) {
    if (i === j) continue;
    const along = dotRow(duals, i * n, duals, j * n, n) / norms[j];
    const v = projectedDual(frame, admissible, i);
    for (let k = 0; k < size; k++) v[k] -= along * a[k];
    for (let k = 0; k < size; k++) for (let l = 0; l <= k; l++) M[k * size + l] += v[k] * v[l];
  }
  const z = solveCholesky(M, a, size);
  if (z) replaceColumn(frame, j, combine(admissible, z, n));
}

/** S'y for dual row i. */
function projectedDual({ n, duals }: Frame, { size, re }: Admissible, row: number): Float64Array {
  const out = new Float64Array(size);
  for (let i = 0; i < n; i++) {
    const y = duals[row * n + i];
    for (let k = 0; k < size; k++) out[k] += y * re[i * size + k];
  }
  return out;
}

/** The unit vector along S z. */
function combine({ size, re }: Admissible, z: Float64Array, n: number): Float64Array {
  const length = Math.sqrt(dotRow(z, 0, z, 0, size));
  const x = new Float64Array(n);
  for (let i = 0; i < n; i++) x[i] = dotRow(re, i * size, z, 0, size) / length;
  return x;
}

/** Solves M z = a for a positive definite M given by its lower triangle, which is overwritten; null when it is not. */
function solveCholesky(M: Float64Array, a: Float64Array, size: number): Float64Array | null {
  const z = a.slice();
  for (let k = 0; k < size; k++) {
    for (let l = 0; l <= k; l++) {
      let sum = M[k * size + l];
      for (let q = 0; q < l; q++) sum -= M[k * size + q] * M[l * size + q];
      if (k !== l) M[k * size + l] = sum / M[l * size + l];
      else if (sum > 0 && Number.isFinite(sum)) M[k * size + k] = Math.sqrt(sum);
      else return null;
    }
    for (let q = 0; q < k; q++) z[k] -= M[k * size + q] * z[q];
    z[k] /= M[k * size + k];
  }
  for (let k = size - 1; k >= 0; k--) {
    for (let q = k + 1; q < size; q++) z[k] -= M[q * size + k] * z[q];
    z[k] /= M[k * size + k];
  }
  return z.some((entry) => entry !== 0) ? z : null;
}
