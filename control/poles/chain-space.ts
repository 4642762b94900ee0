import { Matrix } from "ml-matrix";
import { toFlat } from "../linalg/flat";
import { solveComplex } from "../linalg/solve-linear";
import type { Admissible, InputRange } from "./admissible-vectors";
import type { ScaledPlant } from "./scale-plant";

/**
 * The shortest vector g(x) that (A - pole I - B F) g = x leaves to be had for some feedback, as a matrix: real parts first, then
 * imaginary parts, of row i, column j at i n + j. With it (A - B K) v = pole v + x for v = g(x) plus any admissible eigenvector.
 *
 * Shapes    A n×n, U n×(n - rank B), S n×k → two of n×n
 * Units     scaled states
 * Throws    singular when a mode stands at the pole that no input moves; not-finite
 * Accuracy  n ε times the condition of U'(A - pole I)
 * Source    Klein & Moore, IEEE Trans. Autom. Control 22 (1977) 140-141, from memory: principal vectors under feedback
 */
export function chainStep(
  { n, a }: ScaledPlant,
  { rank, unreached }: InputRange,
  { pole, size, re, im }: Admissible,
): { re: Float64Array; im: Float64Array } {
  const count = n - rank;
  // Rows: U'(A - pole I), which has to give U'x, then Sᴴ, which has to give nothing.
  const M = { re: Matrix.zeros(n, n), im: Matrix.zeros(n, n) };
  const wanted = { re: Matrix.zeros(n, n), im: Matrix.zeros(n, n) };
  for (let c = 0; c < count; c++) {
    for (let j = 0; j < n; j++) {
      let sum = 0;
      for (let i = 0; i < n; i++) sum += unreached[i * count + c] * a[i * n + j];
      const u = unreached[j * count + c];
      M.re.set(c, j, sum - pole.re * u);
      M.im.set(c, j, -pole.im * u);
      wanted.re.set(c, j, u);
    }
  }
  for (let k = 0; k < size; k++) {
    for (let j = 0; j < n; j++) {
      M.re.set(count + k, j, re[j * size + k]);
      M.im.set(count + k, j, -im[j * size + k]);
    }
  }
  const { X } = solveComplex(M, wanted);
  return { re: toFlat(X.re), im: toFlat(X.im) };
}
