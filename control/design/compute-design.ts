import { workScope } from "../linalg/work-array";
import { type ReferenceGain, referenceGain } from "../lqr/reference-gain";
import { attempt, attemptAfter, shown } from "../plant/attempt";
import type { PlantModel } from "../plant/model";
import type { Part } from "../plant/report";
import { scalePlant } from "../plant/scale-plant";
import { toRows } from "../plant/to-matrix";
import { respond } from "../response/respond";
import type { Evidence, ReferenceEvidence } from "./evidence";
import { findGain } from "./find-gain";
import { findObserver } from "./find-observer";
import { inputRoom } from "./input-room";
import { plantMatrices } from "./plant-matrices";
import type { Recipe } from "./recipe";
import { reportPoles } from "./report-poles";

/** Changes whenever a method changes any digit of the evidence. */
export const METHOD_VERSION = "1.1";

const ABSENT = { state: "absent" } as const;

/**
 * Everything a recipe gives on a plant: gains, poles, reference gain, observer, responses. Each part is computed, or refused
 * with the reason; a part that needs a refused one carries that one's reason. Without gains there are no poles, reference or
 * responses; without the observer the responses are those of the full state; without the reference gain there are no steps.
 *
 * Shapes    those of the plant; plain data in and out, Float64Array for the samples
 * Units     the signals' units, seconds, percent
 * Throws    nothing that user data can cause: refusals are results
 * Accuracy  as the parts state; the same bits for the same plant and recipe
 * Source    those of the parts
 */
export function computeDesign(model: PlantModel, recipe: Recipe): Evidence {
  const prepared = attempt(() => ({ plant: plantMatrices(model), scale: scalePlant(model).stateScale }));
  if (prepared.state === "refused") return refusedThroughout(prepared, recipe);
  const { plant, scale } = prepared.value;
  const { timeBase } = model;
  const sampled = timeBase.kind === "sampled";
  const gain = attempt(() => workScope(() => findGain(plant, recipe, timeBase)));
  const reference =
    recipe.reference.kind === "none"
      ? null
      : attemptAfter(gain, ({ K }) => workScope(() => referenceGain({ ...plant, K, sampled })));
  const { observer: wanted } = recipe;
  const observer = wanted.kind === "none" ? null : attempt(() => workScope(() => findObserver(plant, wanted, timeBase, scale)));
  const responses = attemptAfter(gain, ({ K, poles }) =>
    respond({
      plant,
      period: timeBase.kind === "sampled" ? timeBase.period : null,
      K,
      F: reference?.state === "computed" ? reference.value.F : null,
      observer: observer?.state === "computed" ? observer.value.inLoop : null,
      experiments: { ...recipe.test, amplitudes: model.commanded.map(({ amplitude }) => amplitude) },
      room: inputRoom(model),
      horizon: recipe.test.horizon,
      poles: { regulator: poles, observer: observer?.state === "computed" ? observer.value.errorPoles : [] },
    }),
  );
  return {
    methodVersion: METHOD_VERSION,
    gains: shown(gain, ({ evidence }) => evidence),
    poles: attemptAfter(gain, ({ closed }) => workScope(() => reportPoles(closed, timeBase, scale))),
    reference: reference === null ? ABSENT : shown(reference, referenceEvidence),
    observer: observer === null ? ABSENT : shown(observer, ({ evidence }) => evidence),
    responses,
  };
}

function refusedThroughout(reason: Part<never>, recipe: Recipe): Evidence {
  return {
    methodVersion: METHOD_VERSION,
    gains: reason,
    poles: reason,
    reference: recipe.reference.kind === "none" ? ABSENT : reason,
    observer: recipe.observer.kind === "none" ? ABSENT : reason,
    responses: reason,
  };
}

function referenceEvidence({ F, steadyState, reached, obstacle }: ReferenceGain): ReferenceEvidence {
  return { F: toRows(F), steadyState: toRows(steadyState), reached, obstacle };
}
