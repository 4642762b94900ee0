import { modulus } from "../linalg/complex";
import { pythagoras } from "../linalg/flat";
import type { FlatSystem } from "./reduce-system";
import { reduceSystem } from "./reduce-system";
import { reducedZeros } from "./reduced-zeros";
import { type RefinedZero, refineZeros } from "./refine-zeros";
import { pencilSystem, squarePencil } from "./square-pencil";

/** Zeros of two mixtures that agree to this are one zero of the system itself; those that a mixture adds agree by no rule. */
const AGREEMENT = 1e-8;
const AGREEMENT_AT_REST = 1e-13;

/**
 * Zeros of a system with more inputs than outputs, more outputs than inputs, or dependent ones: what two square mixtures of
 * its inputs and outputs have in common.
 *
 * Shapes    rank, the largest rank of the transfer matrix, ≤ min(m, p)
 * Units     those of the system
 * Throws    no-convergence
 * Accuracy  as `refineZeros`; two values that agree to 1e-8 are one
 * Source    Davison & Wang, Automatica 10 (1974) 643-658, for the definition; Davison, Int. J. Control 37 (1983) 1-25, for
 *           squaring (both from memory)
 */
export function commonZeros(system: FlatSystem, rank: number): RefinedZero[] {
  const [first, second] = [0, 1].map((kind) => {
    const pencil = squarePencil(system, rank, kind);
    return refineZeros(pencil, reducedZeros(reduceSystem(pencilSystem(pencil))));
  });
  const rate = Math.max(0, ...first.map(({ value }) => modulus(value)));
  const open = second.map(({ value }) => value);
  return first.filter(({ value }) => {
    const distances = open.map(({ re, im }) => pythagoras(re - value.re, im - value.im));
    const place = distances.indexOf(Math.min(...distances));
    if (place < 0 || distances[place] > AGREEMENT * modulus(value) + AGREEMENT_AT_REST * rate) return false;
    open.splice(place, 1);
    return true;
  });
}
