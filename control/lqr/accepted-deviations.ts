import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";

/**
 * Diagonal weights from the largest acceptable deviation of each state and effort of each input: 1 / deviation².
 *
 * Shapes    states n (null leaves a state unweighted), inputs m → state n×n, input m×m
 * Units     deviations in the signals' units, so that each weighted square has none
 * Throws    bad-option, with the index, for a deviation that is not positive and finite, or whose square leaves the doubles
 * Accuracy  two roundings per weight
 * Source    Bryson & Ho, Applied Optimal Control, Blaisdell 1969, section 5.2
 */
export function weightsFromDeviations(
  states: readonly (number | null)[],
  inputs: readonly number[],
): { state: Matrix; input: Matrix } {
  return {
    state: Matrix.diag(states.map((deviation, index) => (deviation === null ? 0 : weightOf("states", deviation, index)))),
    input: Matrix.diag(inputs.map((effort, index) => weightOf("inputs", effort, index))),
  };
}

function weightOf(option: "states" | "inputs", deviation: number, index: number): number {
  const weight = 1 / (deviation * deviation);
  if (!(deviation > 0 && weight > 0 && Number.isFinite(weight)))
    throw new NumericalError("bad-option", { option, given: deviation, index });
  return weight;
}
