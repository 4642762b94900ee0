import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { largestEntry } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import type { Complex } from "../plant/model";
import { reachGrowth } from "./reach-growth";
import { samePole, type WantedPole } from "./wanted-poles";

/**
 * Refuses poles repeated more often than independent eigenvectors allow, unless those are not asked for: the j most often
 * repeated ones together may not count more than the rank of [B AB ... A^(j-1)B].
 *
 * Shapes    A n×n, B n×m that reaches every mode, blocks covering n poles
 * Units     entries of like size
 * Throws    pole-multiplicity { pole, multiplicity, rank } unless allowed: `rank` is how often the pole may be repeated
 *           beside those repeated as often or more; for the first of them that is the rank of B
 * Accuracy  that of reachGrowth; poles that differ by rounding count as one
 * Source    Rosenbrock 1970: invariant polynomials that feedback can give; conjugate partitions
 */
export function requireFewRepeats(A: Matrix, B: Matrix, blocks: readonly WantedPole[], allowed: boolean): void {
  if (allowed) return;
  const counts = distinctPoles(blocks).toSorted((p, q) => q.multiplicity - p.multiplicity);
  if (counts[0].multiplicity === 1) return;
  const even = B.clone();
  for (let j = 0; j < B.columns; j++) {
    const largest = largestEntry(B.getColumn(j));
    if (largest > 0) even.mulColumn(j, powerOfTwo(-exponentOf(largest)));
  }
  const ranks = reachGrowth(A, even);
  let together = 0;
  for (const [j, { pole, multiplicity }] of counts.entries()) {
    const rank = ranks[Math.min(j, ranks.length - 1)] - together;
    together += multiplicity;
    if (multiplicity > rank) throw new NumericalError("pole-multiplicity", { pole, multiplicity, rank });
  }
}

/** Each pole once, both of a pair, with how often it is wanted. */
function distinctPoles(blocks: readonly WantedPole[]): { pole: Complex; multiplicity: number }[] {
  const first = blocks.filter((block, k) => blocks.findIndex((other) => samePole(other, block)) === k);
  return first.flatMap((block) => {
    const { re, im, width } = block;
    const multiplicity = blocks.filter((other) => samePole(other, block)).length;
    const upper = { pole: { re, im }, multiplicity };
    return width === 1 ? [upper] : [upper, { pole: { re, im: -im }, multiplicity }];
  });
}
