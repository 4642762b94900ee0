import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { matrixExponential } from "./matrix-exponential";

/**
 * Sampled model of x' = A x + B u with u held constant over each period: x(k+1) = A x(k) + B u(k), exact at the samples.
 *
 * Shapes    A n×n, B n×m, period in seconds → A n×n, B n×m
 * Units     those of A and B per second → per sample
 * Throws    shape-mismatch; not-finite; bad-option for a period that is not above zero; too-large
 * Accuracy  as `matrixExponential` of [A B; 0 0] · period
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
  const block = Matrix.zeros(n + m, n + m);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) block.set(i, j, A.get(i, j) * period);
    for (let j = 0; j < m; j++) block.set(i, n + j, B.get(i, j) * period);
  }
  const exponential = matrixExponential(block);
  const held = { A: Matrix.zeros(n, n), B: Matrix.zeros(n, m) };
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) held.A.set(i, j, exponential.get(i, j));
    for (let j = 0; j < m; j++) held.B.set(i, j, exponential.get(i, n + j));
  }
  return held;
}
