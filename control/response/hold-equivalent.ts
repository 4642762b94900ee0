import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { roundedExponential } from "./matrix-exponential";
import { exactlyScaled } from "./wide-scalar";

/**
 * Sampled model of x' = A x + B u with u held constant over each period: x(k+1) = A x(k) + B u(k), exact at the samples.
 *
 * Shapes    A n×n, B n×m, period in seconds → A n×n, B n×m
 * Units     those of A and B per second → per sample
 * Throws    shape-mismatch; not-finite; bad-option for a period that is not above zero; too-large
 * Accuracy  as `matrixExponential` of [A B; 0 0] · period, the product with the period included
 * Source    Van Loan, IEEE Trans. Automatic Control 23 (1978) 395-404
 */
export function holdEquivalent({ A, B, period }: { A: Matrix; B: Matrix; period: number }): { A: Matrix; B: Matrix } {
  requireSquare("A", A);
  requireShape("B", B, A.rows, B.columns);
  requireFinite("A", A);
  requireFinite("B", B);
  if (!(period > 0) || !Number.isFinite(period)) throw new NumericalError("bad-option", { option: "period", given: period });
  const n = A.rows;
  const m = B.columns;
  const size = n + m;
  const block = new Float64Array(size * size);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) block[i * size + j] = A.get(i, j);
    for (let j = 0; j < m; j++) block[i * size + n + j] = B.get(i, j);
  }
  const exponential = roundedExponential(exactlyScaled(block, period), size);
  const held = { A: Matrix.zeros(n, n), B: Matrix.zeros(n, m) };
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) held.A.set(i, j, exponential[i * size + j]);
    for (let j = 0; j < m; j++) held.B.set(i, j, exponential[i * size + n + j]);
  }
  return held;
}
