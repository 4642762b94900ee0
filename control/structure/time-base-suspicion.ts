import { modulus } from "../linalg/complex";
import type { Complex, TimeBase } from "../plant/model";
import type { TimeBaseSuspicion } from "../plant/report";

/** Poles of a well sampled model gather about 1; a sampled pole beyond 3 would triple its motion with every sample. */
const NEAR_ONE = 0.3;
const FAR_ABOVE_ONE = 3;

/**
 * A matrix declared continuous whose poles all lie inside the unit circle, half of them (and two at least) near 1,
 * is probably a sampled one; one declared sampled with a pole far outside the circle is probably continuous.
 */
export function timeBaseSuspicion(values: readonly Complex[], timeBase: TimeBase): TimeBaseSuspicion {
  if (timeBase.kind === "sampled") return values.some((pole) => modulus(pole) > FAR_ABOVE_ONE) ? { looks: "continuous" } : null;
  const inside = values.every((pole) => modulus(pole) <= 1 + Math.sqrt(Number.EPSILON));
  const near = values.filter(({ re, im }) => modulus({ re: re - 1, im }) <= NEAR_ONE).length;
  return inside && near >= Math.max(2, values.length / 2) ? { looks: "sampled" } : null;
}
