import { NumericalError } from "../errors";
import { addWide, split, widen, wideProduct } from "../linalg/double-double";
import { flatTranspose, largestEntry } from "../linalg/flat";
import { type FlatSchur, flatSchur } from "../linalg/real-schur";
import { schurValues } from "../linalg/schur-values";
import { solveLyapunovBySchur } from "../linalg/solve-lyapunov";
import type { FlatProblem } from "./problem";

/** A - BK, and the real Schur form of its transpose. */
export type Loop = { readonly matrix: Float64Array; readonly schur: FlatSchur };

/** A - BK with the products summed in double-double, then rounded. */
export function closedLoop({ n, m, a, b }: FlatProblem, k: Float64Array): Float64Array {
  const pulled = wideProduct(split(b), widen(k), n, m, n);
  const loop = widen(a);
  addWide(loop, pulled, -1);
  return loop.hi;
}

/** Throws not-stabilising with a pole of the loop that is on or outside the boundary; no-convergence. */
export function stableLoop(problem: FlatProblem, k: Float64Array): Loop {
  const { n, sampled } = problem;
  const matrix = closedLoop(problem, k);
  if (!Number.isFinite(largestEntry(matrix))) throw new NumericalError("no-convergence", { routine: "riccati-newton", limit: 1 });
  const schur = flatSchur(flatTranspose(matrix, n, n), n);
  for (const pole of schurValues(schur.t, n)) {
    const inside = sampled ? pole.re * pole.re + pole.im * pole.im < 1 : pole.re < 0;
    if (!inside) throw new NumericalError("not-stabilising", { pole });
  }
  return { matrix, schur };
}

/** Y with L'Y + YL + C = 0 for the loop L, or L'YL - Y + C = 0 when sampled; C and Y symmetric. */
export function solveInLoop({ n, sampled }: FlatProblem, { schur }: Loop, c: Float64Array): Float64Array {
  return solveLyapunovBySchur(schur, n, c, sampled);
}
