import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { observerByPoles } from "../observer/observer-by-poles";
import { observerFromNoise } from "../observer/observer-from-noise";
import { reducedObserver } from "../observer/reduced-observer";
import type { Complex, TimeBase } from "../plant/model";
import { toMatrix, toRows } from "../plant/to-matrix";
import { requireStablePoles } from "../poles/require-stable-poles";
import { resolvePoles } from "../poles/resolve-poles";
import type { ObserverInLoop } from "../response/close-loop";
import type { ObserverEvidence } from "./evidence";
import { stablePolesOf } from "./find-gain";
import type { PlantMatrices } from "./plant-matrices";
import type { ObserverRecipe, PoleEntry, WantedPoles } from "./recipe";
import { reportPlainPoles, reportPoles } from "./report-poles";

export type FoundObserver = {
  readonly inLoop: ObserverInLoop;
  /** Eigenvalues of the estimation error. */
  readonly errorPoles: readonly Complex[];
  readonly evidence: ObserverEvidence;
};
type Wanted = Exclude<ObserverRecipe, { kind: "none" }>;

/**
 * Observer by the recipe's method, its estimation error verified to fade.
 *
 * Shapes    scale n: the states' largest acceptable deviations, for naming the main state of each pole
 * Throws    as `observerByPoles`, `observerFromNoise`, `reducedObserver`, `resolvePoles`; unstable-pole; not-stabilising { pole }
 * Accuracy  as those
 */
export function findObserver(plant: PlantMatrices, wanted: Wanted, timeBase: TimeBase, scale: Float64Array): FoundObserver {
  try {
    return find(plant, wanted, timeBase, scale);
  } catch (error) {
    if (!(error instanceof NumericalError)) throw error;
    throw new NumericalError(error.code, { ...error.data, of: "observer" });
  }
}

function find(plant: PlantMatrices, wanted: Wanted, timeBase: TimeBase, scale: Float64Array): FoundObserver {
  if (wanted.kind === "reduced") return reduced(plant, wanted, timeBase);
  const { A, C } = plant;
  const { L, residual, bound, method } =
    wanted.kind === "poles"
      ? observerByPoles({ A, C, poles: stablePoles(wanted.poles, timeBase), allowDefective: wanted.allowDefective })
      : observerFromNoise({
          A,
          C,
          processNoise: toMatrix("process noise", wanted.process, A.rows, A.rows),
          measurementNoise: toMatrix("measurement noise", wanted.measurement, C.rows, C.rows),
          sampled: timeBase.kind === "sampled",
        });
  const error = Matrix.sub(A, L.mmul(C));
  const errorPoles = stablePolesOf(error, timeBase);
  const poles = reportPoles(error, timeBase, scale);
  return { inLoop: { kind: "full", L }, errorPoles, evidence: { kind: "full", L: toRows(L), residual, bound, poles, method } };
}

function stablePoles(entries: readonly PoleEntry[], timeBase: TimeBase) {
  const poles = resolvePoles(entries, timeBase);
  requireStablePoles(poles, timeBase);
  return poles;
}

function reduced({ A, B, C, D }: PlantMatrices, wanted: WantedPoles, timeBase: TimeBase): FoundObserver {
  const poles = stablePoles(wanted.poles, timeBase);
  const { allowDefective } = wanted;
  const { order, Fw, Fy, Fu, Gw, Gy, residual, bound, method } = reducedObserver({ A, B, C, D, poles, allowDefective });
  const errorPoles = stablePolesOf(Fw, timeBase);
  const rows = { Fw: toRows(Fw), Fy: toRows(Fy), Fu: toRows(Fu), Gw: toRows(Gw), Gy: toRows(Gy) };
  return {
    inLoop: { kind: "reduced", Fw, Fy, Fu, Gw, Gy },
    errorPoles,
    evidence: { kind: "reduced", order, ...rows, residual, bound, poles: reportPlainPoles(errorPoles, timeBase), method },
  };
}
