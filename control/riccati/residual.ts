import { addNarrow, addWide, type Split, split, type Wide, widen, wideProduct, wideTranspose } from "../linalg/double-double";
import { flatTranspose } from "../linalg/flat";
import type { FlatProblem } from "./problem";

/** The coefficient matrices of a problem, split once for exact products. */
export type SplitProblem = FlatProblem & {
  readonly at: Split;
  readonly bt: Split;
  readonly ra: Split;
  readonly st: Float64Array;
};

export function splitProblem(problem: FlatProblem): SplitProblem {
  const { n, m, a, b, r, s } = problem;
  return {
    ...problem,
    at: split(flatTranspose(a, n, n)),
    bt: split(flatTranspose(b, n, m)),
    ra: split(r),
    st: flatTranspose(s, n, m),
  };
}

/** W = B'X + S' and R, or W = B'XA + S' and R + B'XB when sampled: the two sides of the equation R K = W for the gain. */
export type GainSystem = { readonly weight: Wide; readonly right: Wide };

export function gainSystem(problem: SplitProblem, x: Wide): GainSystem {
  const { n, m, sampled, bt, at, r, st } = problem;
  const product = wideProduct(bt, x, m, n, n);
  if (!sampled) {
    addNarrow(product, st, 1);
    return { weight: widen(r), right: product };
  }
  const turned = wideTranspose(product, m, n);
  const right = wideTranspose(wideProduct(at, turned, n, n, m), n, m);
  addNarrow(right, st, 1);
  const weight = wideProduct(bt, turned, m, n, m);
  addNarrow(weight, r, 1);
  return { weight, right };
}

/**
 * Residual of the Riccati equation with the gain K held as data, so that an error of K enters squared:
 * A'X + XA + Q - K'W - W'K + K'RK, or A'XA - X + Q - K'W - W'K + K'(R + B'XB)K when sampled.
 *
 * Shapes    x n×n symmetric, k m×n → n×n symmetric
 * Accuracy  summed in double-double
 * Source    Newton's method after Kleinman, IEEE Trans. Autom. Control 13 (1968) 114-115; Hewer, ibid. 16 (1971) 382-384
 */
export function riccatiResidual(problem: SplitProblem, x: Wide, k: Float64Array, { weight, right }: GainSystem): Float64Array {
  const { n, m, sampled, at, q } = problem;
  const residual = widen(q);
  const product = wideProduct(at, x, n, n, n);
  if (sampled) {
    addWide(residual, wideProduct(at, wideTranspose(product, n, n), n, n, n), 1);
    addWide(residual, x, -1);
  } else {
    addWide(residual, product, 1);
    addWide(residual, wideTranspose(product, n, n), 1);
  }
  const kt = split(flatTranspose(k, m, n));
  // W - (weight K) / 2 on the right makes both halves of the correction at once.
  const pull = wideTranspose(wideProduct(kt, wideTranspose(weight, m, m), n, m, m), n, m);
  halve(pull);
  const rest = { hi: right.hi.slice(), lo: right.lo.slice() };
  addWide(rest, pull, -1);
  const half = wideProduct(kt, rest, n, m, n);
  addWide(residual, half, -1);
  addWide(residual, wideTranspose(half, n, n), -1);
  return symmetricPart(residual.hi, n);
}

function halve({ hi, lo }: Wide): void {
  for (let i = 0; i < hi.length; i++) {
    hi[i] *= 0.5;
    lo[i] *= 0.5;
  }
}

function symmetricPart(a: Float64Array, n: number): Float64Array {
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) a[i * n + j] = a[j * n + i] = 0.5 * (a[i * n + j] + a[j * n + i]);
  return a;
}
