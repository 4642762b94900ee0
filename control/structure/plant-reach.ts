import { flatTranspose, largestEntry, toFlat } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import type { Complex, TimeBase } from "../plant/model";
import type { System } from "../plant/scale-plant";
import { analyseReach, type ReachAnalysis } from "./reach-analysis";

/** What the inputs of a scaled plant reach. */
export function reachOfInputs({ A, B }: Pick<System, "A" | "B">, values: readonly Complex[]): ReachAnalysis {
  return analyseReach(toFlat(A), toFlat(B), A.rows, B.columns, values);
}

/**
 * What the outputs of a scaled plant see, by duality. C has no 1/s beside a continuous A: it is brought to the size of A
 * by a power of two, so that the distances do not depend on the unit of time.
 */
export function sightOfOutputs({ A, C }: Pick<System, "A" | "C">, timeBase: TimeBase, values: readonly Complex[]): ReachAnalysis {
  const n = A.rows;
  const a = toFlat(A);
  const rate = timeBase.kind === "continuous" ? powerOfTwo(exponentOf(largestEntry(a) || 1)) : 1;
  const c = toFlat(C).map((entry) => entry * rate);
  return analyseReach(flatTranspose(a, n, n), flatTranspose(c, C.rows, n), n, C.rows, values);
}
