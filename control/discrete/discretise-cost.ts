import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { addWide, type Wide, wideTranspose } from "../linalg/double-double";
import { toFlat } from "../linalg/flat";
import { powerOfTwo } from "../linalg/power-of-two";
import { requireFinite, requireShape, requireSquare, requireSymmetric } from "../linalg/require";
import { flatOneNorm } from "../linalg/solve-linear";
import { balanceWide, rescaled } from "../response/balance-dynamics";
import { squaringsFor, wideSeries, wideTimesWide } from "../response/wide-exponential";
import { addScaled, exactlyScaled, timesPower, wideOver } from "../response/wide-scalar";
import { symmetricFlat, weightRefusal } from "../riccati/check-problem";

export type ContinuousCost = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly Q: Matrix;
  readonly R: Matrix;
  readonly S?: Matrix;
  /** Seconds */
  readonly period: number;
};

export type SampledCost = {
  readonly Ad: Matrix;
  readonly Bd: Matrix;
  readonly Qd: Matrix;
  readonly Rd: Matrix;
  readonly Sd: Matrix;
};

/** Terms of the integral's series, whose norms fall by four and more each: the first left out is below 1e-33. */
const TERMS = 22;

/**
 * Sampled plant and sampled cost that are worth exactly as much as the continuous ones while u is held over each period:
 * the integral of x'Q x + 2 x'S u + u'R u over a period is x(k)'Qd x(k) + 2 x(k)'Sd u(k) + u(k)'Rd u(k).
 *
 * Shapes    A n×n, B n×m, Q n×n, R m×m, S n×m (zero when absent) → Ad n×n, Bd n×m, Qd n×n, Rd m×m, Sd n×m
 * Units     those of Q, R and S times seconds
 * Throws    shape-mismatch; not-finite; not-symmetric; not-positive-semidefinite (the weights together); bad-option for a
 *           period that is not above zero; too-large
 * Accuracy  summed with twice the digits of a double, so that entries are correct but in the last place; [Qd Sd; Sd' Rd] is a
 *           sum of congruences of [Q S; S' R], symmetric, and semidefinite but for the rounding of its entries
 * Source    Van Loan, IEEE Trans. Automatic Control 23 (1978) 395-404; the integral here by its series and by doubling,
 *           W(2t) = W(t) + Φ(t)'W(t)Φ(t), which subtracts nothing
 */
export function discretiseCost({ A, B, Q, R, S, period }: ContinuousCost): SampledCost {
  const n = A.rows;
  const m = B.columns;
  const cross = S ?? Matrix.zeros(n, m);
  check({ A, B, Q, R, S: cross, period });
  const flat = { a: toFlat(A), b: toFlat(B), q: symmetricFlat(Q), r: symmetricFlat(R), s: toFlat(cross) };
  const refusal = weightRefusal({ n, m, sampled: true, ...flat });
  if (refusal) throw refusal;
  const size = n + m;
  const dynamics = new Float64Array(size * size);
  const weights = new Float64Array(size * size);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      dynamics[i * size + j] = flat.a[i * n + j];
      weights[i * size + j] = flat.q[i * n + j];
    }
    for (let j = 0; j < m; j++) {
      dynamics[i * size + n + j] = flat.b[i * m + j];
      weights[i * size + n + j] = flat.s[i * m + j];
      weights[(n + j) * size + i] = flat.s[i * m + j];
    }
  }
  for (let i = 0; i < m; i++) for (let j = 0; j < m; j++) weights[(n + i) * size + n + j] = flat.r[i * m + j];
  const { phi, cost } = heldCost(exactlyScaled(dynamics, period), exactlyScaled(weights, period), size);
  for (const entries of [phi, cost])
    if (!entries.every(Number.isFinite)) throw new NumericalError("too-large", { what: "cost", limit: Number.MAX_VALUE });
  const part = (from: Float64Array, rows: number, columns: number, top: number, left: number) =>
    new Matrix(
      Array.from({ length: rows }, (_, i) => Array.from({ length: columns }, (__, j) => from[(top + i) * size + left + j])),
    );
  return {
    Ad: part(phi, n, n, 0, 0),
    Bd: part(phi, n, m, 0, n),
    Qd: part(cost, n, n, 0, 0),
    Rd: part(cost, m, m, n, n),
    Sd: part(cost, n, m, 0, n),
  };
}

function check({ A, B, Q, R, S, period }: Required<ContinuousCost>): void {
  const n = A.rows;
  const m = B.columns;
  requireSquare("A", A);
  requireShape("B", B, n, m);
  requireShape("Q", Q, n, n);
  requireShape("R", R, m, m);
  requireShape("S", S, n, m);
  if (n === 0 || m === 0) throw new NumericalError("shape-mismatch", { A: [n, n], B: [n, m] });
  for (const [name, M] of Object.entries({ A, B, Q, R, S })) requireFinite(name, M);
  requireSymmetric("Q", Q);
  requireSymmetric("R", R);
  if (!(period > 0) || !Number.isFinite(period)) throw new NumericalError("bad-option", { option: "period", given: period });
}

/** exp(M) and the integral of exp(M't) N exp(Mt) over 0 ≤ t ≤ 1, rounded. */
function heldCost(M: Wide, N: Wide, size: number): { phi: Float64Array; cost: Float64Array } {
  const { wide, order, scale } = balanceWide(M, size);
  const norm = Math.max(flatOneNorm(wide.hi, size), flatOneNorm(wideTranspose(wide, size, size).hi, size));
  const halvings = squaringsFor(norm);
  const step = timesPower(wide, powerOfTwo(-halvings));
  const start = timesPower(congruent(N, size, order, scale), powerOfTwo(-halvings));
  let cost = seriesIntegral(step, start, size);
  let phi = wideSeries(step, size);
  for (let k = 0; k < halvings; k++) {
    const transposed = wideTranspose(phi, size, size);
    addWide(cost, wideTimesWide(transposed, wideTimesWide(cost, phi, size), size), 1);
    cost = symmetrised(cost, size);
    phi = wideTimesWide(phi, phi, size);
  }
  const result = { phi: new Float64Array(size * size), cost: new Float64Array(size * size) };
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) {
      const at = order[i] * size + order[j];
      result.phi[at] = rescaled(phi.hi[i * size + j], scale[i], scale[j]);
      result.cost[at] = cost.hi[i * size + j] / scale[i] / scale[j];
    }
  }
  return result;
}

/** The weights in balanced coordinates. */
function congruent({ hi, lo }: Wide, size: number, order: Int32Array, scale: Float64Array): Wide {
  const moved = (from: Float64Array) =>
    from.map((_, at) => {
      const [i, j] = [Math.floor(at / size), at % size];
      return from[order[i] * size + order[j]] * scale[i] * scale[j];
    });
  return { hi: moved(hi), lo: moved(lo) };
}

/** Integral over one short step: N + (X'N + NX)/2! + ..., each term from the one before. */
function seriesIntegral(X: Wide, N: Wide, size: number): Wide {
  const transposed = wideTranspose(X, size, size);
  const one = wideOver({ hi: 1, lo: 0 }, 1);
  const sum: Wide = { hi: N.hi.slice(), lo: N.lo.slice() };
  let term = N;
  for (let k = 2; k <= TERMS; k++) {
    const half = wideTimesWide(transposed, term, size);
    addWide(half, wideTranspose(half, size, size), 1);
    const next: Wide = { hi: new Float64Array(size * size), lo: new Float64Array(size * size) };
    addScaled(next, wideOver(one, k), half);
    term = next;
    addScaled(sum, one, term);
  }
  return symmetrised(sum, size);
}

/** The upper triangle takes what the lower one holds. */
function symmetrised({ hi, lo }: Wide, size: number): Wide {
  for (let i = 0; i < size; i++) {
    for (let j = i + 1; j < size; j++) {
      hi[i * size + j] = hi[j * size + i];
      lo[i * size + j] = lo[j * size + i];
    }
  }
  return { hi, lo };
}
