import { NumericalError } from "../errors";
import { flatIdentity, flatProduct, flatTranspose } from "../linalg/flat";
import { factorLu, inverseOneNorm, type Lu, solveLu } from "../linalg/lu";
import { flatNorm } from "../linalg/norms";
import { flatOneNorm } from "../linalg/solve-linear";
import type { PlainProblem } from "./remove-cross-term";

const STEP_LIMIT = 40;
const SETTLED = 1e-6;
const CAYLEY_FACTORS = [1, 2, 0.5, 4, 0.25, 8, 0.125];

type Triple = { e: Float64Array; g: Float64Array; h: Float64Array };

/**
 * Rough stabilising solution by structure-preserving doubling.
 *
 * Throws    no-convergence after 40 doublings or when no Cayley parameter gives well conditioned inverses
 * Accuracy  ordinarily near rounding, but it can drift to another solution: the caller must verify
 * Source    Chu, Fan & Lin, Linear Algebra Appl. 396 (2005) 55-80 (continuous); Chu, Fan, Lin & Wang,
 *           Int. J. Control 77 (2004) 767-788 (sampled)
 */
export function startByDoubling(problem: PlainProblem): Float64Array {
  const { n } = problem;
  const triple = problem.sampled ? { e: problem.a.slice(), g: problem.g.slice(), h: problem.q.slice() } : cayleyTriple(problem);
  for (let step = 0; step < STEP_LIMIT; step++) {
    const before = triple.h;
    double(triple, n);
    const size = flatNorm(triple.h);
    const change = flatNorm(triple.h.map((x, i) => x - before[i]));
    if (!Number.isFinite(size) || !Number.isFinite(change)) break;
    // Changes fall quadratically: the next one would not show, or is left to the refinement.
    if (change <= SETTLED * size) return triple.h;
  }
  throw new NumericalError("no-convergence", { routine: "doubling", limit: STEP_LIMIT });
}

/** E ← E W E, G ← G + E W G E', H ← H + E' H W E with W = (I + G H)⁻¹. */
function double(triple: Triple, n: number): void {
  const { e, g, h } = triple;
  const whole = flatProduct(g, h, n, n, n);
  for (let i = 0; i < n; i++) whole[i * n + i] += 1;
  const factors = factorLu(whole, n);
  if (factors.zeroPivot >= 0) throw new NumericalError("no-convergence", { routine: "doubling", limit: STEP_LIMIT });
  const et = flatTranspose(e, n, n);
  const we = solveLu(factors, e, n);
  const wg = solveLu(factors, g, n);
  triple.g = symmetric(flatProduct(flatProduct(e, wg, n, n, n), et, n, n, n), g, n);
  triple.h = symmetric(flatProduct(et, flatProduct(h, we, n, n, n), n, n, n), h, n);
  triple.e = flatProduct(e, we, n, n, n);
}

/** Symmetric part of the increment, plus the symmetric matrix it is added to. */
function symmetric(increment: Float64Array, to: Float64Array, n: number): Float64Array {
  const sum = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++)
      sum[i * n + j] = sum[j * n + i] = to[i * n + j] + 0.5 * (increment[i * n + j] + increment[j * n + i]);
  }
  return sum;
}

/** Start of the doubling for the continuous equation, with the first factor whose two inverses are well conditioned. */
function cayleyTriple({ n, a, g, q }: PlainProblem): Triple {
  const sizeA = flatNorm(a);
  const middle = Math.sqrt((sizeA * sizeA + flatNorm(g) * flatNorm(q)) / n);
  let best: { triple: Triple; condition: number } | null = null;
  for (const factor of CAYLEY_FACTORS) {
    const attempt = tryCayley(n, a, g, q, middle * factor);
    if (attempt && (!best || attempt.condition > best.condition)) best = attempt;
    if (best && best.condition > 1e-4) break;
  }
  if (!best) throw new NumericalError("no-convergence", { routine: "doubling", limit: CAYLEY_FACTORS.length });
  return best.triple;
}

function tryCayley(
  n: number,
  a: Float64Array,
  g: Float64Array,
  q: Float64Array,
  gamma: number,
): { triple: Triple; condition: number } | null {
  const shifted = a.slice();
  for (let i = 0; i < n; i++) shifted[i * n + i] -= gamma;
  const inner = factorLu(shifted, n);
  if (inner.zeroPivot >= 0) return null;
  const solvedG = solveLu(inner, g, n);
  const outer = flatTranspose(shifted, n, n);
  const product = flatProduct(q, solvedG, n, n, n);
  for (let i = 0; i < outer.length; i++) outer[i] += product[i];
  const factors = factorLu(outer, n);
  if (factors.zeroPivot >= 0) return null;
  // W = (A_γ' + H A_γ⁻¹ G)⁻¹; E = I + 2γ W', G = 2γ A_γ⁻¹ G W, H = 2γ W H A_γ⁻¹.
  const w = solveLu(factors, flatIdentity(n), n);
  const e = flatTranspose(w, n, n).map((x) => 2 * gamma * x);
  for (let i = 0; i < n; i++) e[i * n + i] += 1;
  const hInverse = flatProduct(q, solveLu(inner, flatIdentity(n), n), n, n, n);
  const zero = new Float64Array(n * n);
  const triple = {
    e,
    g: symmetric(
      flatProduct(solvedG, w, n, n, n).map((x) => 2 * gamma * x),
      zero,
      n,
    ),
    h: symmetric(
      flatProduct(w, hInverse, n, n, n).map((x) => 2 * gamma * x),
      zero,
      n,
    ),
  };
  return { triple, condition: Math.min(reciprocalCondition(shifted, n, inner), reciprocalCondition(outer, n, factors)) };
}

function reciprocalCondition(a: Float64Array, n: number, factors: Lu): number {
  return 1 / (flatOneNorm(a, n) * inverseOneNorm(factors));
}
