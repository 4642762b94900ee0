import { Matrix } from "ml-matrix";
import { NumericalError } from "@/control/errors";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import { outputCoordinates } from "@/control/observer/output-coordinates";
import type { Complex, PlantModel, Rows } from "@/control/plant/model";

export type PlantFacts = {
  /** The plant's own poles, without control. */
  readonly poles: readonly Complex[];
  /** States that the outputs do not show at once: the order of a reduced observer. */
  readonly hidden: number;
};

const matrix = (rows: Rows) => new Matrix(rows.map((row) => [...row]));

/** What the recipe's start values are made from. Loaded only when asked for. */
export function plantFacts(model: PlantModel): PlantFacts {
  const order = model.states.length;
  return {
    poles: orElse([], () => eigenvalues(matrix(model.A))),
    hidden:
      model.outputs.length === 0 ? order : orElse(order, () => order - outputCoordinates(matrix(model.A), matrix(model.C)).rank),
  };
}

/** A plant whose numbers the core refuses still gets a recipe to fill in; solving it says why. */
function orElse<T>(otherwise: T, work: () => T): T {
  try {
    return work();
  } catch (error) {
    if (error instanceof NumericalError) return otherwise;
    throw error;
  }
}
