import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { type Balanced, balance } from "../linalg/balance";
import { eigensystem } from "../linalg/eigensystem";
import { flatTranspose, largestEntry, toFlat } from "../linalg/flat";
import { exponentOf, powerOfTwo, timesPowerOfTwo } from "../linalg/power-of-two";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { stabilityMargin } from "./continuous-pole";
import { eigenvalueAccuracy } from "./eigenvalue-accuracy";
import { participation } from "./modes";
import { type WideGramian, wideGramian } from "./wide-gramian";

export type GramianProblem = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly C: Matrix;
  readonly timeBase: "continuous" | "sampled";
};

/** Both symmetric and positive semidefinite; `error` bounds what either may be off, beside its norm in balanced units. */
export type Gramians = { readonly controllability: Matrix; readonly observability: Matrix; readonly error: number };

/** Gramians in balanced states, as wide numbers. Their own units: b and c were multiplied by powers of two. */
export type WideGramians = {
  readonly n: number;
  readonly reach: WideGramian;
  readonly sight: WideGramian;
  readonly balanced: Balanced;
  readonly inputExponent: number;
  readonly outputExponent: number;
};

/**
 * Controllability and observability gramians of a stable plant: A W + W A' + B B' = 0 and A'W + W A + C'C = 0, sampled
 * A W A' - W + B B' = 0 and A'W A - W + C'C = 0.
 *
 * Shapes    A n×n, B n×m, C p×n → two n×n
 * Units     [state]² / [input]² times s, and the reverse with outputs; sampled without s
 * Throws    shape-mismatch; not-finite; not-stable { pole, state } for a plant with a mode that does not decay, which has no
 *           gramians; too-large; inaccurate; no-convergence
 * Accuracy  correctly rounded but for equations of condition beyond 1e14; residuals in double-double
 * Source    Moore, IEEE Trans. Automatic Control 26 (1981) 17-32; Bartels & Stewart, Commun. ACM 15 (1972) 820-826
 */
export function gramians(problem: GramianProblem): Gramians {
  const { n, reach, sight, balanced, inputExponent, outputExponent } = wideGramians(problem);
  const { order, scale, shift } = balanced;
  const controllability = Matrix.zeros(n, n);
  const observability = Matrix.zeros(n, n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const [w, v] = [reach.w.hi[i * n + j], sight.w.hi[i * n + j]];
      controllability.set(order[i], order[j], timesPowerOfTwo(w * scale[i] * scale[j], shift - 2 * inputExponent));
      observability.set(order[i], order[j], timesPowerOfTwo(v / scale[i] / scale[j], shift - 2 * outputExponent));
    }
  }
  for (const W of [controllability, observability]) {
    if (!W.to1DArray().every(Number.isFinite))
      throw new NumericalError("too-large", { what: "gramian", limit: Number.MAX_VALUE });
  }
  return { controllability, observability, error: Math.max(reach.error, sight.error) + Number.EPSILON / 2 };
}

/** As `gramians`, before rounding to doubles and to the given units. */
export function wideGramians({ A, B, C, timeBase }: GramianProblem): WideGramians {
  requireSquare("A", A);
  const n = A.rows;
  requireShape("B", B, n, B.columns);
  requireShape("C", C, C.rows, n);
  for (const [name, M] of Object.entries({ A, B, C })) requireFinite(name, M);
  requireStable(A, timeBase);
  const sampled = timeBase === "sampled";
  const balanced = balance(toFlat(A), n);
  const { matrix, order, scale, shift } = balanced;
  if (sampled && shift !== 0) throw new NumericalError("too-large", { what: "A", limit: powerOfTwo(300) });
  const b = new Float64Array(n * B.columns);
  const c = new Float64Array(C.rows * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < B.columns; j++) b[i * B.columns + j] = B.get(order[i], j) / scale[i];
    for (let k = 0; k < C.rows; k++) c[k * n + i] = C.get(k, order[i]) * scale[i];
  }
  const inputExponent = sizeToOne(b);
  const outputExponent = sizeToOne(c);
  const reach = wideGramian(matrix, b, n, B.columns, sampled);
  const sight = wideGramian(flatTranspose(matrix, n, n), flatTranspose(c, C.rows, n), n, C.rows, sampled);
  return { n, reach, sight, balanced, inputExponent, outputExponent };
}

/** Multiplies x by the power of two that brings its largest entry to 1, and returns the exponent. */
function sizeToOne(x: Float64Array): number {
  const exponent = -exponentOf(largestEntry(x) || 1);
  for (let i = 0; i < x.length; i++) x[i] = timesPowerOfTwo(x[i], exponent);
  return exponent;
}

/** Names the least stable mode and the state with the largest share in it. */
function requireStable(A: Matrix, timeBase: GramianProblem["timeBase"]): void {
  const spectrum = eigensystem(A);
  const accuracy = eigenvalueAccuracy(toFlat(A), A.rows, spectrum);
  const kind = timeBase === "sampled" ? ({ kind: "sampled", period: 1 } as const) : ({ kind: "continuous" } as const);
  let worst = -1;
  let least = Number.POSITIVE_INFINITY;
  spectrum.values.forEach((pole, k) => {
    const margin = stabilityMargin(pole, kind);
    if (margin > accuracy[k] || margin >= least) return;
    least = margin;
    worst = k;
  });
  if (worst < 0) return;
  const shares = participation(spectrum, worst);
  throw new NumericalError("not-stable", { pole: spectrum.values[worst], state: shares.indexOf(Math.max(...shares)) });
}
