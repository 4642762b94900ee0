import { Matrix } from "ml-matrix";
import { frobeniusNorm } from "../linalg/norms";
import { orthonormalBasis } from "../linalg/orthogonal";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { solveLinear } from "../linalg/solve-linear";
import type { GainAtPoint } from "./closed-loop-gain";

export type ScaledInverse = {
  /** m×q: the least X that brings gain X as near to the identity as it can, both in even units. */
  readonly X: Matrix;
  readonly rank: number;
  /** Powers of two that made the rows of the gain even. */
  readonly rowScale: readonly number[];
};

const ROUNDS = 4;

/**
 * Generalised inverse of a gain whose rows and columns are first brought to even sizes, with the rank decided against the
 * rounding that came with it.
 *
 * Shapes    gain and rounding q×m → m×q
 * Units     those of the inverse
 * Throws    not-finite; no-convergence
 * Accuracy  a direction counts when it stands above the scaled rounding, Frobenius, and max(q, m) ε of the largest
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 5.5
 */
export function scaledInverse({ gain, rounding }: GainAtPoint): ScaledInverse {
  const { even, rowScale, columnScale } = evenOut(gain);
  const noise = rounding.clone();
  for (let i = 0; i < noise.rows; i++) noise.mulRow(i, rowScale[i]);
  for (let j = 0; j < noise.columns; j++) noise.mulColumn(j, columnScale[j]);
  const tolerance = frobeniusNorm(noise) + Math.max(gain.rows, gain.columns) * Number.EPSILON * frobeniusNorm(even);
  const left = orthonormalBasis(even, tolerance);
  const rank = left.rank;
  if (rank === 0) return { X: Matrix.zeros(gain.columns, gain.rows), rank, rowScale };
  const right = orthonormalBasis(left.range.transpose().mmul(even).transpose(), 0);
  const rows = left.range.transpose();
  const X = right.range.mmul(solveLinear(rows.mmul(even).mmul(right.range), rows).X);
  for (let j = 0; j < gain.columns; j++) X.mulRow(j, columnScale[j]);
  for (let i = 0; i < gain.rows; i++) X.mulColumn(i, rowScale[i]);
  return { X, rank, rowScale };
}

function evenOut(gain: Matrix): { even: Matrix; rowScale: number[]; columnScale: number[] } {
  const even = gain.clone();
  const rowScale = new Array<number>(gain.rows).fill(1);
  const columnScale = new Array<number>(gain.columns).fill(1);
  for (let round = 0; round < ROUNDS; round++) {
    for (let i = 0; i < gain.rows; i++) {
      const factor = reciprocalPower(even.getRow(i));
      rowScale[i] *= factor;
      even.mulRow(i, factor);
    }
    for (let j = 0; j < gain.columns; j++) {
      const factor = reciprocalPower(even.getColumn(j));
      columnScale[j] *= factor;
      even.mulColumn(j, factor);
    }
  }
  return { even, rowScale, columnScale };
}

function reciprocalPower(entries: readonly number[]): number {
  const largest = Math.max(...entries.map(Math.abs));
  return largest === 0 ? 1 : powerOfTwo(-exponentOf(largest));
}
