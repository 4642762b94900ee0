import { NumericalError } from "../errors";
import { addNarrow, addWide, type Split, split, type Wide, widen, wideProduct, wideTranspose } from "../linalg/double-double";
import { flatTranspose } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { flatSchur } from "../linalg/real-schur";
import { solveLyapunovBySchur } from "../linalg/solve-lyapunov";

/** W as wide numbers, and the size of its error beside its norm: what the last correction and rounding leave. */
export type WideGramian = { readonly w: Wide; readonly error: number };

const MOST_ROUNDS = 10;
/** Fewer digits than half of a double has are not worth the name. */
const ACCEPTED = 1e-8;
/** n of these are rounding of wide sums. */
const WIDE_ROUNDING = 2e-32;

/**
 * W with A W + W A' + B B' = 0, or A W A' - W + B B' = 0 when sampled, for stable A: corrected by Schur solves in double,
 * with B B' and what is left of the equation in twice the working precision.
 *
 * Shapes    a n×n, b n×m → w n×n, symmetric to the bit
 * Throws    inaccurate when corrections do not contract; singular; no-convergence
 * Accuracy  as its error says; about 1e-30 times the condition of the equation, down to 1e-16 of such corrections
 * Source    Bartels & Stewart, Commun. ACM 15 (1972) 820-826; Barraud, IEEE Trans. Autom. Control 22 (1977) 883-885;
 *           refinement: Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed. 2002, section 12
 */
export function wideGramian(a: Float64Array, b: Float64Array, n: number, m: number, sampled: boolean): WideGramian {
  const schur = flatSchur(a, n);
  const parts = split(a);
  const right = wideProduct(split(b), widen(flatTranspose(b, n, m)), n, m, n);
  const w = widen(new Float64Array(n * n));
  let defect = right;
  let last = Number.POSITIVE_INFINITY;
  let error = 1;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const step = solveLyapunovBySchur(schur, n, defect.hi, sampled);
    const size = flatNorm(step);
    if (size >= last / 2) break;
    addNarrow(w, step, 1);
    const whole = flatNorm(w.hi);
    // Corrections shrink by the same factor each time: the next one is what is left.
    error = whole === 0 ? 0 : round === 0 ? 1 : size / whole / Math.max(2, last / size);
    if (size <= WIDE_ROUNDING * whole) break;
    last = size;
    defect = defectOf(parts, w, right, n, sampled);
  }
  if (!(error <= ACCEPTED)) throw new NumericalError("inaccurate", { residual: error, bound: ACCEPTED });
  return { w, error: error + n * WIDE_ROUNDING };
}

function defectOf(a: Split, w: Wide, right: Wide, n: number, sampled: boolean): Wide {
  const product = wideProduct(a, w, n, n, n);
  const defect = { hi: right.hi.slice(), lo: right.lo.slice() };
  if (sampled) {
    addWide(defect, wideProduct(a, wideTranspose(product, n, n), n, n, n), 1);
    addWide(defect, w, -1);
  } else {
    addWide(defect, product, 1);
    addWide(defect, wideTranspose(product, n, n), 1);
  }
  return defect;
}
