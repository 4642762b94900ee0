import { NumericalError } from "../errors";
import type { Complex, TimeBase } from "../plant/model";

/**
 * Refuses wanted poles that would not let a loop settle: re ≥ 0 for a continuous plant, |z| ≥ 1 for a sampled one.
 *
 * Shapes    any number of poles
 * Units     those of the plant's plane
 * Throws    unstable-pole { index, pole } for the first such place in the list of poles
 * Accuracy  exact comparison, |z| up to rounding of re² + im²
 * Source    stability of a linear loop
 */
export function requireStablePoles(poles: readonly Complex[], timeBase: TimeBase): void {
  const index = poles.findIndex((pole) => !isStablePole(pole, timeBase.kind === "sampled"));
  if (index >= 0) throw new NumericalError("unstable-pole", { index, pole: poles[index] });
}

export function isStablePole({ re, im }: Complex, sampled: boolean): boolean {
  return sampled ? re * re + im * im < 1 : re < 0;
}
