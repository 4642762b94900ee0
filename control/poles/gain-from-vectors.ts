import { Matrix } from "ml-matrix";
import { flatProduct, flatTranspose, fromFlat, toFlat } from "../linalg/flat";
import { orthonormalBasis } from "../linalg/orthogonal";
import { solveLinear } from "../linalg/solve-linear";
import type { InputRange } from "./admissible-vectors";
import { columnsAsMatrix, type Frame } from "./eigenvector-frame";
import type { ScaledPlant } from "./scale-plant";
import type { WantedPole } from "./wanted-poles";

/**
 * The gain that makes given admissible vectors the eigenvectors of A - B K; of several such gains the one of least norm.
 *
 * Shapes    X n×n → K m×n
 * Units     K in the units of the plant as given, inputs that repeat others share the work in those units
 * Throws    singular when the vectors are dependent to working accuracy
 * Accuracy  (A - B K) X - X Λ is c n ε κ(X) of its terms
 * Source    Kautsky, Nichols & Van Dooren, Int. J. Control 41 (1985) 1129-1155, with K X in place of K
 */
export function gainFromVectors(plant: ScaledPlant, range: InputRange, frame: Frame, blocks: readonly WantedPole[]): Matrix {
  const { n, m, a, b, state, input, time } = plant;
  const { rank, reached } = range;
  const X = columnsAsMatrix(frame);
  const wanted = residualColumns(a, toFlat(X), blocks, n);
  const reachedPart = flatTranspose(reached, n, rank);
  const Z = fromFlat(flatProduct(reachedPart, b, rank, n, m), rank, m);
  const effect = fromFlat(flatProduct(reachedPart, wanted, rank, n, n), rank, n);
  const inputs = inputsFor(Z, effect, input);
  const K = solveLinear(X.transpose(), inputs.transpose()).X.transpose();
  for (let i = 0; i < m; i++) for (let j = 0; j < n; j++) K.set(i, j, K.get(i, j) / state[j] / time);
  return K;
}

/** A X - X Λ in real form, Λ with ones between the vectors of a chain: what B K X has to be. */
export function residualColumns(a: Float64Array, x: Float64Array, blocks: readonly WantedPole[], n: number): Float64Array {
  const out = flatProduct(a, x, n, n, n);
  for (const { re, im, column, width, after } of blocks) {
    for (let i = 0; i < n; i++) {
      const at = i * n + column;
      for (let k = 0; k < width && after !== undefined; k++) out[at + k] -= x[i * n + after + k];
      out[at] -= re * x[at];
      if (width === 1) continue;
      out[at] += im * x[at + 1];
      out[at + 1] -= re * x[at + 1] + im * x[at];
    }
  }
  return out;
}

/** Solves Z diag(1 / input) U = effect, with the least U where inputs are redundant. */
function inputsFor(Z: Matrix, effect: Matrix, input: Float64Array): Matrix {
  if (Z.rows === 0) return Matrix.zeros(Z.columns, effect.columns);
  if (Z.rows === Z.columns) {
    const { X } = solveLinear(Z, effect);
    for (let i = 0; i < X.rows; i++) X.mulRow(i, input[i]);
    return X;
  }
  const given = Z.clone();
  for (let j = 0; j < Z.columns; j++) given.mulColumn(j, 1 / input[j]);
  const { range } = orthonormalBasis(given.transpose(), 0);
  return range.mmul(solveLinear(given.mmul(range), effect).X);
}
