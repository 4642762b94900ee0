import type { Matrix } from "ml-matrix";
import type { PlantModel } from "../plant/model";
import { toMatrix } from "../plant/to-matrix";

export type PlantMatrices = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly C: Matrix;
  readonly D: Matrix;
  readonly H: Matrix;
  readonly J: Matrix;
};

/** The matrices of a plant in its own units. Throws shape-mismatch, not-finite. */
export function plantMatrices(model: PlantModel): PlantMatrices {
  const n = model.states.length;
  const m = model.inputs.length;
  const p = model.outputs.length;
  const q = model.commanded.length;
  return {
    A: toMatrix("A", model.A, n, n),
    B: toMatrix("B", model.B, n, m),
    C: toMatrix("C", model.C, p, n),
    D: toMatrix("D", model.D, p, m),
    H: toMatrix("H", model.H, q, n),
    J: toMatrix("J", model.J, q, m),
  };
}
