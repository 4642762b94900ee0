import { NumericalError } from "../errors";
import { eigensystem } from "../linalg/eigensystem";
import { fromFlat } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { eigenvalueAccuracy } from "../structure/eigenvalue-accuracy";
import { boundaryMargin } from "./check-modes";
import { closedLoop } from "./closed-loop";
import type { FlatProblem } from "./problem";
import type { Refined } from "./refine";
import { loopDistance } from "./well-within-reach";

/** Roundings counted for each entry of the loop. */
const ROUNDINGS = 8;

/**
 * Refuses a loop that rounding alone may have put on the stable side. The Lyapunov solution of the loop proves most; where it does
 * not, each pole has to be further from the boundary than it may be from its true place.
 *
 * Throws    on-stability-boundary with the pole's distance; no-convergence
 * Source    Hinrichsen & Pritchard, Systems Control Lett. 7 (1986) 1-10 (from memory); `eigenvalueAccuracy`
 */
export function requireProvenStability(problem: FlatProblem, refined: Refined): void {
  const { n, sampled } = problem;
  const loop = closedLoop(problem, refined.gain.k.hi);
  const size = flatNorm(loop);
  const rounding = ROUNDINGS * n * Number.EPSILON * (sampled ? Math.max(1, size) : size);
  if (loopDistance(problem, refined) > rounding) return;
  const system = eigensystem(fromFlat(loop, n, n));
  const accuracy = eigenvalueAccuracy(loop, n, system);
  system.values.forEach((pole, k) => {
    const distance = boundaryMargin(pole, sampled);
    if (!(distance > accuracy[k])) throw new NumericalError("on-stability-boundary", { distance });
  });
}
