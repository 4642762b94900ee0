import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { referenceGain } from "../lqr/reference-gain";
import { attempt } from "../plant/attempt";
import type { PlantModel, TimeBase } from "../plant/model";
import type { Part } from "../plant/report";
import { respond } from "../response/respond";
import type { Summary } from "./evidence";
import { findGain, stablePolesOf } from "./find-gain";
import { inputRoom } from "./input-room";
import { type PlantMatrices, plantMatrices } from "./plant-matrices";
import type { Recipe } from "./recipe";

/** Worst figures over steps of everything commanded, with the full state fed back by u = -K x + F r. Throws as `respond`. */
export function stepSummary(model: PlantModel, plant: PlantMatrices, K: Matrix): Summary {
  const sampled = model.timeBase.kind === "sampled";
  const { F } = referenceGain({ ...plant, K, sampled });
  const { summary } = respond({
    plant,
    period: periodOf(model.timeBase),
    K,
    F,
    observer: null,
    experiments: {
      amplitudes: model.commanded.map(({ amplitude }) => amplitude),
      initialState: model.states.map(() => 0),
      inputDisturbance: model.inputs.map(() => 0),
    },
    room: inputRoom(model),
    horizon: null,
  });
  return summary.fullState;
}

const periodOf = (timeBase: TimeBase) => (timeBase.kind === "sampled" ? timeBase.period : null);

/**
 * The figures by which recipes are weighed against each other, without the curves.
 *
 * Shapes    those of the plant
 * Units     as `Summary`
 * Throws    nothing that user data can cause: a recipe that has no gains, or no responses, is refused with its reason
 * Accuracy  as `respond`
 * Source    as `respond`
 */
export function recipeFigures(model: PlantModel, recipe: Recipe): Part<Summary> {
  return attempt(() => {
    const plant = plantMatrices(model);
    return stepSummary(model, plant, findGain(plant, recipe, model.timeBase).K);
  });
}

/** The same with a gain that was found elsewhere; null where it does not hold the plant. */
export function gainFigures(model: PlantModel, plant: PlantMatrices, K: Matrix): Summary | null {
  try {
    stablePolesOf(Matrix.sub(plant.A, plant.B.mmul(K)), model.timeBase);
    return stepSummary(model, plant, K);
  } catch (error) {
    if (error instanceof NumericalError) return null;
    throw error;
  }
}
