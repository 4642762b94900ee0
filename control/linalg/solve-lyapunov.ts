import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { balance } from "./balance";
import { addNarrow, addWide, split, type Wide, widen, wideProduct, wideTranspose } from "./double-double";
import { flatProduct, flatTranspose, fromFlat, toFlat } from "./flat";
import { flatNorm } from "./norms";
import { powerOfTwo } from "./power-of-two";
import { type FlatSchur, flatSchur } from "./real-schur";
import { requireFinite, requireShape, requireSquare, requireSymmetric } from "./require";
import { solveTriangularLyapunov } from "./triangular-lyapunov";

export type LyapunovProblem = { readonly A: Matrix; readonly Q: Matrix; readonly timeBase: "continuous" | "sampled" };
export type LyapunovSolution = { readonly X: Matrix; readonly residual: number; readonly bound: number };

const REFINEMENTS = 3;

/**
 * Solves A X + X A' + Q = 0, or A X A' - X + Q = 0 for a sampled plant: for stable A and positive semidefinite Q the
 * covariance or gramian. A need not be stable as long as no two eigenvalues cancel.
 *
 * Shapes    A n×n, Q n×n symmetric → X n×n symmetric
 * Units     [X] = [Q] / [A], sampled [X] = [Q]
 * Throws    shape-mismatch; not-finite; not-symmetric; singular when two eigenvalues add to zero (multiply to one);
 *           too-large; inaccurate when the residual stays above the bound; no-convergence
 * Accuracy  residual relative to |A||X| + |Q| after balancing, held against 4 n ε; refined with double-double residuals
 * Source    Bartels & Stewart, Commun. ACM 15 (1972) 820-826; Barraud, IEEE Trans. Autom. Control 22 (1977) 883-885
 */
export function solveLyapunov({ A, Q, timeBase }: LyapunovProblem): LyapunovSolution {
  requireSquare("A", A);
  requireShape("Q", Q, A.rows, A.rows);
  requireFinite("A", A);
  requireFinite("Q", Q);
  requireSymmetric("Q", Q);
  const n = A.rows;
  const sampled = timeBase === "sampled";
  const { matrix: a, order, scale, shift } = balance(toFlat(A), n);
  if (sampled && shift !== 0) throw new NumericalError("too-large", { what: "A", limit: powerOfTwo(300) });
  const q = balancedWeight(toFlat(Q), n, order, scale);
  const { x, residual } = refine(a, q, n, sampled);
  const bound = 4 * n * Number.EPSILON;
  if (!(residual <= bound)) throw new NumericalError("inaccurate", { residual, bound });
  const whole = new Float64Array(n * n);
  const factor = powerOfTwo(shift);
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++) whole[order[i] * n + order[j]] = x[i * n + j] * scale[i] * scale[j] * factor;
  if (!whole.every(Number.isFinite)) throw new NumericalError("too-large", { what: "solution", limit: Number.MAX_VALUE });
  return { X: fromFlat(whole, n, n), residual, bound };
}

/** Q in the balanced coordinates, made exactly symmetric. */
function balancedWeight(q: Float64Array, n: number, order: Int32Array, scale: Float64Array): Float64Array {
  const balanced = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const mean = 0.5 * q[order[i] * n + order[j]] + 0.5 * q[order[j] * n + order[i]];
      balanced[i * n + j] = mean / scale[i] / scale[j];
    }
  }
  return balanced;
}

function refine(a: Float64Array, q: Float64Array, n: number, sampled: boolean): { x: Float64Array; residual: number } {
  const schur = flatSchur(a, n);
  const parts = split(a);
  const x = widen(new Float64Array(n * n));
  let defect = q;
  for (let round = 0; round <= REFINEMENTS; round++) {
    addNarrow(x, solveLyapunovBySchur(schur, n, defect, sampled), 1);
    defect = lyapunovDefect(parts, x, q, n, sampled).hi;
  }
  const rounded = widen(x.hi);
  const left = flatNorm(lyapunovDefect(parts, rounded, q, n, sampled).hi);
  const size = flatNorm(x.hi) * (sampled ? 1 + flatNorm(a) * flatNorm(a) : 2 * flatNorm(a)) + flatNorm(q);
  return { x: x.hi, residual: size === 0 ? 0 : left / size };
}

function lyapunovDefect(a: ReturnType<typeof split>, x: Wide, q: Float64Array, n: number, sampled: boolean): Wide {
  const product = wideProduct(a, x, n, n, n);
  const defect = widen(q);
  if (sampled) {
    addWide(defect, wideProduct(a, wideTranspose(product, n, n), n, n, n), 1);
    addWide(defect, x, -1);
  } else {
    addWide(defect, product, 1);
    addWide(defect, wideTranspose(product, n, n), 1);
  }
  return defect;
}

/**
 * Y with A Y + Y A' + C = 0 (sampled: A Y A' - Y + C = 0) from the Schur form of A, for symmetric C; symmetric to the bit.
 * Throws singular as `solveTriangularLyapunov` does.
 */
export function solveLyapunovBySchur({ t, qt }: FlatSchur, n: number, c: Float64Array, sampled: boolean): Float64Array {
  const q = flatTranspose(qt, n, n);
  const inside = flatProduct(flatProduct(qt, c, n, n, n), q, n, n, n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) inside[i * n + j] = inside[j * n + i] = -0.5 * (inside[i * n + j] + inside[j * n + i]);
  }
  solveTriangularLyapunov(t, n, inside, sampled);
  const y = flatProduct(flatProduct(q, inside, n, n, n), qt, n, n, n);
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) y[i * n + j] = y[j * n + i] = 0.5 * (y[i * n + j] + y[j * n + i]);
  return y;
}
