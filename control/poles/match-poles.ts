import { modulus } from "../linalg/complex";
import type { Complex } from "../plant/model";

/**
 * Pairs achieved poles with wanted ones, the closest two first.
 *
 * Shapes    two lists of k poles → the achieved ones in the order of the wanted
 * Units     those of the plant's plane
 * Throws    nothing
 * Accuracy  exact; where poles stand far apart beside their errors, the pairing with the least largest distance
 * Source    greedy matching
 */
export function matchPoles<T extends Complex>(wanted: readonly Complex[], achieved: readonly T[]): T[] {
  const pairs = wanted.flatMap((pole, i) =>
    achieved.map((other, j) => ({ i, j, distance: modulus({ re: pole.re - other.re, im: pole.im - other.im }) })),
  );
  pairs.sort((p, q) => p.distance - q.distance || p.i - q.i || p.j - q.j);
  const matched = new Array<T>(wanted.length);
  const taken = new Set<number>();
  for (const { i, j } of pairs) {
    if (matched[i] !== undefined || taken.has(j)) continue;
    matched[i] = achieved[j];
    taken.add(j);
  }
  return matched;
}
