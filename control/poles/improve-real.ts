import type { Admissible } from "./admissible-vectors";
import { dotRow, type Frame, replaceColumn } from "./eigenvector-frame";
import type { Scratch } from "./search-scratch";

/** Turns the column of a real pole to where the determinant of the eigenvectors is largest; returns by how much it grew. */
export function raiseDeterminantReal(frame: Frame, admissible: Admissible, { a, u }: Scratch): number {
  const { n, duals } = frame;
  const { size, re, pole } = admissible;
  projectRow(duals, pole.column * n, re, n, size, a, 0);
  const length = Math.sqrt(dotRow(a, 0, a, 0, size));
  if (!(length > 0)) return 1;
  combine(admissible, a, n, u);
  return replaceColumn(frame, pole.column, u) ? length : 1;
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
export function lowerConditionReal(frame: Frame, admissible: Admissible, { a, row: v, square: M, u }: Scratch): void {
  const { n, duals, norms } = frame;
  const { size, re, pole } = admissible;
  const j = pole.column;
  projectRow(duals, j * n, re, n, size, a, 0);
  for (let k = 0; k < size * size; k++) M[k] = k % (size + 1) === 0 ? 1 : 0;
  for (let i = 0; i < n; i++) {
    if (i === j) continue;
    const along = dotRow(duals, i * n, duals, j * n, n) / norms[j];
    projectRow(duals, i * n, re, n, size, v, 0);
    for (let k = 0; k < size; k++) v[k] -= along * a[k];
    for (let k = 0; k < size; k++) {
      const factor = v[k];
      for (let l = 0; l <= k; l++) M[k * size + l] += factor * v[l];
    }
  }
  if (!solveCholesky(M, a, size)) return;
  combine(admissible, a, n, u);
  replaceColumn(frame, j, u);
}

/** y'S for one row y of duals and a real part S, into `out` from `to` on. */
function projectRow(
  rows: Float64Array,
  at: number,
  S: Float64Array,
  n: number,
  size: number,
  out: Float64Array,
  to: number,
): void {
  let k = 0;
  for (; k + 1 < size; k += 2) {
    let first = 0;
    let second = 0;
    for (let i = 0, from = k; i < n; i++, from += size) {
      const y = rows[at + i];
      first += y * S[from];
      second += y * S[from + 1];
    }
    out[to + k] = first;
    out[to + k + 1] = second;
  }
  if (k === size) return;
  let last = 0;
  for (let i = 0, from = k; i < n; i++, from += size) last += rows[at + i] * S[from];
  out[to + k] = last;
}

/** The unit vector along S z, into x. */
function combine({ size, re }: Admissible, z: Float64Array, n: number, x: Float64Array): void {
  const length = Math.sqrt(dotRow(z, 0, z, 0, size));
  for (let i = 0; i < n; i++) x[i] = dotRow(re, i * size, z, 0, size) / length;
}

/** Overwrites z by the solution of M x = z for a positive definite M given by its lower triangle, lost too; false when it is not. */
function solveCholesky(M: Float64Array, z: Float64Array, size: number): boolean {
  for (let k = 0; k < size; k++) {
    for (let l = 0; l <= k; l++) {
      let sum = M[k * size + l];
      for (let q = 0; q < l; q++) sum -= M[k * size + q] * M[l * size + q];
      if (k !== l) M[k * size + l] = sum / M[l * size + l];
      else if (sum > 0 && Number.isFinite(sum)) M[k * size + k] = Math.sqrt(sum);
      else return false;
    }
    for (let q = 0; q < k; q++) z[k] -= M[k * size + q] * z[q];
    z[k] /= M[k * size + k];
  }
  for (let k = size - 1; k >= 0; k--) {
    for (let q = k + 1; q < size; q++) z[k] -= M[q * size + k] * z[q];
    z[k] /= M[k * size + k];
  }
  return dotRow(z, 0, z, 0, size) > 0;
}
