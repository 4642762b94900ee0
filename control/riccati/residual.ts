import { addNarrow, addWide, type Split, split, type Wide, widen, wideProduct, wideTranspose } from "../linalg/double-double";
import { flatTranspose } from "../linalg/flat";
import { workArray } from "../linalg/work-array";
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
  const kt = split(flatTranspose(k, m, n));
  const half = wideProduct(kt, lessHalf(right, wideProduct(kt, weight, n, m, m), n, m), n, m, n);
  let own = wideProduct(at, x, n, n, n);
  if (sampled) {
    own = wideProduct(at, wideTranspose(own, n, n), n, n, n);
    addWide(own, x, -1);
    for (let i = 0; i < own.hi.length; i++) {
      own.hi[i] *= 0.5;
      own.lo[i] *= 0.5;
    }
  }
  addWide(own, half, -1);
  return withTranspose(own, q, n);
}

/** W - (weight K) / 2 from K' weight: on the right of K' it makes both halves of the correction at once. */
function lessHalf(right: Wide, pull: Wide, n: number, m: number): Wide {
  const hi = workArray(m * n);
  const lo = workArray(m * n);
  for (let i = 0; i < m; i++) {
    for (let j = 0, at = i * n, from = i; j < n; j++, at++, from += m) {
      const sum = right.hi[at];
      const term = -0.5 * pull.hi[from];
      const total = sum + term;
      const part = total - sum;
      const rest = sum - (total - part) + (term - part) + (right.lo[at] - 0.5 * pull.lo[from]);
      hi[at] = total + rest;
      lo[at] = rest - (hi[at] - total);
    }
  }
  return { hi, lo };
}

/** T + T' + Q, summed in double-double and rounded; symmetric to the bit. */
function withTranspose({ hi, lo }: Wide, q: Float64Array, n: number): Float64Array {
  const sum = workArray(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0, at = i * n, mirror = i; j <= i; j++, at++, mirror += n) {
      const [x, y, z] = [hi[at], hi[mirror], q[at]];
      const first = x + y;
      const part = first - x;
      const second = first + z;
      const more = second - first;
      const below = x - (first - part) + (y - part) + (first - (second - more) + (z - more));
      sum[at] = sum[mirror] = second + (below + (lo[at] + lo[mirror]));
    }
  }
  return sum;
}
