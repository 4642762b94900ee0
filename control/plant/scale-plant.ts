import type { Matrix } from "ml-matrix";
import { requireFinite } from "../linalg/require";
import type { InputSignal, PlantModel, ScaledSignal } from "./model";
import { toMatrix } from "./to-matrix";

export type System = { readonly A: Matrix; readonly B: Matrix; readonly C: Matrix; readonly D: Matrix };

export type ScaledPlant = System & {
  readonly stateScale: Float64Array;
  readonly inputScale: Float64Array;
  readonly outputScale: Float64Array;
  readonly assumedStates: readonly number[];
  readonly assumedInputs: readonly number[];
  readonly assumedOutputs: readonly number[];
};

/**
 * The plant in units of its signals' largest acceptable deviations: x = stateScale · (scaled x), likewise u and y.
 * An input without a deviation takes the way to its nearest limit. Signals that have neither are listed: an output takes
 * what the states' deviations make of it, anything else takes 1.
 *
 * Shapes    n states, m inputs, p outputs → A n×n, B n×m, C p×n, D p×m
 * Units     scaled signals have none; A and B keep 1/s (none when sampled)
 * Throws    shape-mismatch, not-finite (also when a scale drives an entry beyond the range of numbers)
 * Accuracy  each entry within two roundings
 * Source    Bryson & Ho, Applied Optimal Control, 1975, for scaling by acceptable deviations
 */
export function scalePlant(model: PlantModel): ScaledPlant {
  const n = model.states.length;
  const m = model.inputs.length;
  const p = model.outputs.length;
  const states = declared(model.states.map(deviation));
  const inputs = declared(
    model.inputs.map((input, j) => deviation(input) ?? wayToLimit(input, model.operatingPoint.inputs[j] ?? 0)),
  );
  const outputs = declared(model.outputs.map(deviation));
  const C = toMatrix("C", model.C, p, n);
  for (const k of outputs.assumed) outputs.scale[k] = madeByStates(C, k, states.scale);
  return {
    A: scaled("A", toMatrix("A", model.A, n, n), states.scale, states.scale),
    B: scaled("B", toMatrix("B", model.B, n, m), states.scale, inputs.scale),
    C: scaled("C", C, outputs.scale, states.scale),
    D: scaled("D", toMatrix("D", model.D, p, m), outputs.scale, inputs.scale),
    stateScale: states.scale,
    inputScale: inputs.scale,
    outputScale: outputs.scale,
    assumedStates: states.assumed,
    assumedInputs: inputs.assumed,
    assumedOutputs: outputs.assumed,
  };
}

function deviation(signal: ScaledSignal): number | null {
  return usable(signal.scale);
}

function wayToLimit(input: InputSignal, rest: number): number | null {
  const up = input.upper === null ? null : usable(input.upper - rest);
  const down = input.lower === null ? null : usable(rest - input.lower);
  if (up === null || down === null) return up ?? down;
  return Math.min(up, down);
}

function madeByStates(C: Matrix, row: number, stateScale: Float64Array): number {
  let largest = 0;
  for (let j = 0; j < C.columns; j++) largest = Math.max(largest, Math.abs(C.get(row, j)) * stateScale[j]);
  return usable(largest) ?? 1;
}

function usable(scale: number | null): number | null {
  return scale !== null && Number.isFinite(scale) && scale > 0 ? scale : null;
}

function declared(scales: readonly (number | null)[]): { scale: Float64Array; assumed: number[] } {
  return {
    scale: Float64Array.from(scales, (scale) => scale ?? 1),
    assumed: scales.flatMap((scale, i) => (scale === null ? [i] : [])),
  };
}

function scaled(name: string, M: Matrix, rowScale: Float64Array, columnScale: Float64Array): Matrix {
  for (let i = 0; i < M.rows; i++) {
    for (let j = 0; j < M.columns; j++) {
      const entry = M.get(i, j);
      if (entry !== 0) M.set(i, j, (entry * columnScale[j]) / rowScale[i]);
    }
  }
  requireFinite(name, M);
  return M;
}
