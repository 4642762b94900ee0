/**
 * What can go wrong in the core. Facts only: `control/words/` turns them into sentences with the user's signal names.
 * `of: "observer"` among the facts says that an observer was refused.
 */
export type NumericalErrorCode =
  | "shape-mismatch" // { expected, given } or one entry per matrix
  | "not-finite" // { matrix, row, column }
  | "too-large" // { what, limit, given }
  | "no-convergence" // { routine, limit }
  | "singular" // { matrix, row }
  | "not-symmetric" // { matrix, row, column }
  | "not-positive-definite" // { matrix, index }
  | "not-positive-semidefinite" // { matrix, eigenvalue, index? }
  | "not-stabilizable" // { pole: Complex, state: number, distance }
  | "not-detectable" // { pole: Complex, state: number, distance }
  | "not-controllable" // { pole: Complex, state: number, distance }
  | "not-observable" // { pole: Complex, state: number, distance }
  | "not-stable" // { pole: Complex, state: number }: a mode that does not decay, where a stable plant is asked for
  | "unweighted-boundary-mode" // { pole: Complex, state: number }: the weights do not see a mode on the stability boundary
  | "on-stability-boundary" // { distance }: no stabilising solution within working accuracy
  | "not-stabilising" // { pole: Complex }: a computed gain failed its own verification
  | "inaccurate" // { residual, bound }: a computed result failed its own verification
  | "pole-count" // { expected, given }
  | "poles-not-conjugate" // { index, pole: Complex }
  | "pole-multiplicity" // { pole: Complex, multiplicity, rank }
  | "too-sensitive" // { poleError?, pole?, limit }: rounding moves a wanted pole by more than the limit, relative to its size
  | "unstable-pole" // { index, pole: Complex }
  | "period-missing" // {}
  | "bad-option" // { option, given }
  | "bad-expression"; // { text, position, reason, name? }

/** The one error that the core throws on purpose: a code, and the facts that belong to it. */
export class NumericalError extends Error {
  readonly code: NumericalErrorCode;
  readonly data: Readonly<Record<string, unknown>>;

  constructor(code: NumericalErrorCode, data: Readonly<Record<string, unknown>> = {}) {
    super(code);
    this.name = "NumericalError";
    this.code = code;
    this.data = Object.fromEntries(Object.entries(data).filter(([, fact]) => holdsFinite(fact)));
  }
}

/** Facts travel as JSON, which has no NaN and no infinity: a fact that holds one anywhere is left out as a whole. */
function holdsFinite(fact: unknown): boolean {
  if (typeof fact === "number") return Number.isFinite(fact);
  return typeof fact !== "object" || fact === null || Object.values(fact).every(holdsFinite);
}
