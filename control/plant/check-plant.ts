import { modulus } from "../linalg/complex";
import { eigensystem } from "../linalg/eigensystem";
import { stabilityMargin } from "../structure/continuous-pole";
import { couplingReport } from "../structure/coupling-report";
import { describeModes } from "../structure/modes";
import { reachOfInputs, sightOfOutputs } from "../structure/plant-reach";
import { scalingReport } from "../structure/scaling-report";
import { settleAssumed } from "../structure/settle-assumed";
import { timeBaseSuspicion } from "../structure/time-base-suspicion";
import { transmissionZeros } from "../structure/transmission-zeros";
import type { TransmissionZero } from "../structure/zero-directions";
import { attempt } from "./attempt";
import type { PlantModel, TimeBase } from "./model";
import type { PlantChecks, ZeroReport } from "./report";
import { scalePlant } from "./scale-plant";

/**
 * Everything that is said about a plant before a design: modes, reach, sight, zeros, coupling, scaling, time base.
 * A part that fails carries its reason and leaves the others alone.
 *
 * Shapes    see `PlantModel` and `PlantChecks`
 * Units     rad/s and s; shares, distances and directions belong to signals divided by their largest acceptable deviations
 * Throws    shape-mismatch; not-finite
 * Accuracy  as stated by each part
 * Source    those of the parts
 */
export function checkPlant(model: PlantModel): PlantChecks {
  const scaled = scalePlant(model);
  const settled = once(() => settleAssumed(scaled));
  const spectrum = once(() => eigensystem(settled().A));
  const reach = once(() => reachOfInputs(settled(), spectrum().values));
  const sight = once(() => sightOfOutputs(settled(), model.timeBase, spectrum().values));
  const modes = once(() => describeModes(settled(), model.timeBase, spectrum(), reach(), sight()));
  const suspicion = attempt(() => timeBaseSuspicion(spectrum().values, model.timeBase));
  return {
    modes: attempt(modes),
    controllability: attempt(() => reach().report),
    observability: attempt(() => sight().report),
    stabilizable: attempt(() => modes().every((mode) => mode.stable || mode.controllable)),
    detectable: attempt(() => modes().every((mode) => mode.stable || mode.observable)),
    zeros: attempt(() => judgeZeros(transmissionZeros(scaled), model.timeBase)),
    coupling: attempt(() => couplingReport(model, scaled)),
    scaling: scalingReport(model, scaled),
    timeBaseSuspicion: suspicion.state === "computed" ? suspicion.value : null,
  };
}

/** A zero counts as minimum phase only when it lies inside the boundary by more than rounding beside the largest of them. */
function judgeZeros(zeros: readonly TransmissionZero[], timeBase: TimeBase): ZeroReport[] {
  const largest = zeros.reduce((size, zero) => Math.max(size, modulus(zero)), timeBase.kind === "sampled" ? 1 : 0);
  const rounding = 64 * zeros.length * Number.EPSILON * largest;
  return zeros.map(({ re, im, ...directions }) => {
    const { inputDirection, stateDirection, outputDirection } = directions;
    return {
      value: { re, im },
      minimumPhase: stabilityMargin({ re, im }, timeBase) > rounding,
      ...(inputDirection && stateDirection ? { inputDirection, stateDirection } : {}),
      ...(outputDirection ? { outputDirection } : {}),
    };
  });
}

/** Computes at most once; a refusal is remembered like a result. */
function once<T>(compute: () => T): () => T {
  let outcome: { value: T } | { error: unknown } | null = null;
  return () => {
    if (outcome === null) {
      try {
        outcome = { value: compute() };
      } catch (error) {
        outcome = { error };
      }
    }
    if ("error" in outcome) throw outcome.error;
    return outcome.value;
  };
}
