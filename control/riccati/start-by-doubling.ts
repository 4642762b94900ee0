import { NumericalError } from "../errors";
import { flatIdentity, flatProduct, flatTranspose } from "../linalg/flat";
import { factorLu, type Lu, solveLu } from "../linalg/lu";
import { flatNorm } from "../linalg/norms";
import { flatOneNorm } from "../linalg/solve-linear";
import { workCopy } from "../linalg/work-array";
import type { PlainProblem } from "./remove-cross-term";

const STEP_LIMIT = 40;
/** Changes fall quadratically: after one this small the next step leaves 1e-12, enough for the refinement. */
const NEARLY_SETTLED = 1e-3;
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
  const triple = problem.sampled ? { e: problem.a, g: problem.g, h: workCopy(problem.q) } : cayleyTriple(problem);
  for (let step = 0; step < STEP_LIMIT; step++) {
    const before = triple.h;
    double(triple, n);
    const size = flatNorm(triple.h);
    for (let i = 0; i < before.length; i++) before[i] -= triple.h[i];
    const change = flatNorm(before);
    if (!Number.isFinite(size) || !Number.isFinite(change)) break;
    if (change <= NEARLY_SETTLED * size) return lastStep(triple, n);
  }
  throw new NumericalError("no-convergence", { routine: "doubling", limit: STEP_LIMIT });
}

/** The same for H alone. */
function lastStep({ e, g, h }: Triple, n: number): Float64Array {
  const we = solveLu(innerFactors(g, h, n), e, n);
  return symmetric(flatProduct(flatTranspose(e, n, n), flatProduct(h, we, n, n, n), n, n, n), h, n);
}

/** E ← E W E, G ← G + E W G E', H ← H + E' H W E with W = (I + G H)⁻¹. */
function double(triple: Triple, n: number): void {
  const { e, g, h } = triple;
  const factors = innerFactors(g, h, n);
  const et = flatTranspose(e, n, n);
  const we = solveLu(factors, e, n);
  const wg = solveLu(factors, g, n);
  triple.g = symmetric(flatProduct(flatProduct(e, wg, n, n, n), et, n, n, n), g, n);
  triple.h = symmetric(flatProduct(et, flatProduct(h, we, n, n, n), n, n, n), h, n);
  triple.e = flatProduct(e, we, n, n, n);
}

/** Of I + G H */
function innerFactors(g: Float64Array, h: Float64Array, n: number): Lu {
  const whole = flatProduct(g, h, n, n, n);
  for (let i = 0; i < n; i++) whole[i * n + i] += 1;
  const factors = factorLu(whole, n);
  if (factors.zeroPivot >= 0) throw new NumericalError("no-convergence", { routine: "doubling", limit: STEP_LIMIT });
  return factors;
}

/** Symmetric part of the increment, in its place, plus the symmetric matrix it is added to, if any. */
function symmetric(increment: Float64Array, to: Float64Array | null, n: number): Float64Array {
  for (let i = 0; i < n; i++) {
    for (let j = 0, at = i * n, mirror = i; j <= i; j++, at++, mirror += n) {
      const mean = 0.5 * (increment[at] + increment[mirror]);
      increment[at] = increment[mirror] = to ? to[at] + mean : mean;
    }
  }
  return increment;
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
  const shifted = workCopy(a);
  for (let i = 0; i < n; i++) shifted[i * n + i] -= gamma;
  const inner = factorLu(shifted, n);
  if (inner.zeroPivot >= 0) return null;
  const solvedG = solveLu(inner, g, n);
  const outer = flatTranspose(shifted, n, n);
  const product = flatProduct(q, solvedG, n, n, n);
  for (let i = 0; i < outer.length; i++) outer[i] += product[i];
  const factors = factorLu(outer, n);
  if (factors.zeroPivot >= 0) return null;
  // W = 2γ (A_γ' + H A_γ⁻¹ G)⁻¹; E = I + W', G = A_γ⁻¹ G W, H = W H A_γ⁻¹.
  const identity = flatIdentity(n);
  const w = solveLu(factors, identity, n);
  const innerInverse = solveLu(inner, identity, n);
  const growth = Math.max(flatOneNorm(shifted, n) * flatOneNorm(innerInverse, n), flatOneNorm(outer, n) * flatOneNorm(w, n));
  for (let i = 0; i < w.length; i++) w[i] *= 2 * gamma;
  const e = flatTranspose(w, n, n);
  for (let i = 0; i < n; i++) e[i * n + i] += 1;
  const hInverse = flatProduct(q, innerInverse, n, n, n);
  const triple = {
    e,
    g: symmetric(flatProduct(solvedG, w, n, n, n), null, n),
    h: symmetric(flatProduct(w, hInverse, n, n, n), null, n),
  };
  return { triple, condition: 1 / growth };
}
