import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { toFlat } from "../linalg/flat";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { balanceDynamics } from "./balance-dynamics";
import { stepFiller } from "./step-filler";

export type StepProblem = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly C: Matrix;
  readonly D: Matrix;
  /** Seconds between the moments of a continuous system; null: a sampled one, at its own samples. */
  readonly step: number | null;
  readonly samples: number;
};

/** 256 MB */
export const MOST_VALUES = 33_554_432;

/**
 * Samples, without figures, of the answers of x' = A x + B u, y = C x + D u (sampled: x(k+1) = ...) to a unit step of each
 * input from rest, all inputs and outputs together. The system need not be stable.
 *
 * Shapes    A n×n, B n×m, C p×n, D p×m → row-major m×p×samples: `values[(input * p + output) * samples + k]` at t = k * step
 * Units     those of the outputs per unit of each input; step in seconds
 * Throws    shape-mismatch; not-finite; bad-option for a step not above zero or no samples; too-large for more than 2^25 values
 *           or values beyond the largest double
 * Accuracy  about 1e-14 of the largest value, times the norm of A over its slowest rate where that is large
 * Source    Van Loan, IEEE Trans. Automatic Control 23 (1978) 395-404; sixteen moments at a time
 */
export function respondToStep({ A, B, C, D, step, samples }: StepProblem): Float64Array {
  const n = A.rows;
  const inputs = B.columns;
  const signals = C.rows;
  requireSquare("A", A);
  requireShape("B", B, n, inputs);
  requireShape("C", C, signals, n);
  requireShape("D", D, signals, inputs);
  for (const [name, M] of Object.entries({ A, B, C, D })) requireFinite(name, M);
  if (step !== null && !(step > 0 && Number.isFinite(step)))
    throw new NumericalError("bad-option", { option: "step", given: step });
  if (!(Number.isInteger(samples) && samples > 0)) throw new NumericalError("bad-option", { option: "samples", given: samples });
  const count = inputs * signals * samples;
  if (count > MOST_VALUES) throw new NumericalError("too-large", { what: "response", limit: MOST_VALUES, given: count });
  const { matrix, order, scale } = balanceDynamics(toFlat(A), n);
  const values = new Float64Array(count);
  const b = new Float64Array(n * inputs);
  const c = new Float64Array(signals * n);
  for (let k = 0; k < n; k++) {
    for (let j = 0; j < inputs; j++) b[k * inputs + j] = B.get(order[k], j) / scale[k];
    for (let i = 0; i < signals; i++) c[i * n + k] = C.get(i, order[k]) * scale[k];
  }
  stepFiller({ n, inputs, signals, samples }, step)(matrix, b, c, toFlat(D), values);
  for (const value of values)
    if (!Number.isFinite(value)) throw new NumericalError("too-large", { what: "response", limit: Number.MAX_VALUE });
  return values;
}
