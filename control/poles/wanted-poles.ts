import { NumericalError } from "../errors";
import type { Complex } from "../plant/model";

/** One wanted real pole, or one conjugate pair with im > 0, and the columns its eigenvectors take. */
export type WantedPole = {
  readonly re: number;
  readonly im: number;
  readonly column: number;
  readonly width: 1 | 2;
  /** First column of the vector before it in a chain of principal vectors; absent for an eigenvector. */
  readonly after?: number;
};

/** NEARLY_EQUAL · ε is how far apart two poles may be, relative to their size, and still count as one repeated pole. */
const NEARLY_EQUAL = 8;

/**
 * Sorts wanted poles into real ones and exactly conjugate pairs.
 *
 * Shapes    n poles → blocks whose widths add up to n
 * Units     those of the plant's plane
 * Throws    pole-count; not-finite; poles-not-conjugate { index, pole } for a complex pole without its exact partner
 * Accuracy  exact
 * Source    a real loop has poles in conjugate pairs
 */
export function groupPoles(poles: readonly Complex[], expected: number): WantedPole[] {
  if (poles.length !== expected) throw new NumericalError("pole-count", { expected, given: poles.length });
  const partnerTaken = new Array<boolean>(poles.length).fill(false);
  const blocks: WantedPole[] = [];
  let column = 0;
  poles.forEach((pole, index) => {
    if (!Number.isFinite(pole.re) || !Number.isFinite(pole.im)) {
      throw new NumericalError("not-finite", { matrix: "poles", row: index, column: 0 });
    }
    if (partnerTaken[index]) return;
    if (pole.im !== 0) {
      const partner = poles.findIndex(
        (other, k) => k > index && !partnerTaken[k] && other.re === pole.re && other.im === -pole.im,
      );
      if (partner < 0) throw new NumericalError("poles-not-conjugate", { index, pole });
      partnerTaken[partner] = true;
    }
    const width = pole.im === 0 ? 1 : 2;
    blocks.push({ re: pole.re, im: Math.abs(pole.im), column, width });
    column += width;
  });
  return blocks;
}

/** The blocks as a list of poles, column by column. */
export function polesOf(blocks: readonly WantedPole[]): Complex[] {
  return blocks.flatMap(({ re, im, width }) =>
    width === 1
      ? [{ re, im: 0 }]
      : [
          { re, im },
          { re, im: -im },
        ],
  );
}

/** Whether two blocks want the same pole, up to rounding. */
export function samePole(one: WantedPole, other: WantedPole): boolean {
  const tolerance = NEARLY_EQUAL * Number.EPSILON * (Math.abs(one.re) + one.im);
  return one.width === other.width && Math.abs(one.re - other.re) + Math.abs(one.im - other.im) <= tolerance;
}
