import { Matrix } from "ml-matrix";
import { modulus } from "../linalg/complex";
import { eigenvalues } from "../linalg/eigenvalues";
import type { Complex } from "../plant/model";
import type { WideComplex } from "./hyman-step";
import { loopPoles } from "./loop-poles";
import { matchPoles } from "./match-poles";

export type AchievedPoles = {
  /** In the order of the wanted ones. */
  readonly poles: readonly Complex[];
  /** Distance of each from where it was wanted. */
  readonly errors: readonly number[];
  /** Found with 32 digits, so that the errors are those of the gain and not of the check. */
  readonly exact: boolean;
};

/**
 * Where a gain really puts the poles.
 *
 * Shapes    A n×n, B n×m, K m×n, n wanted poles, pairs adjacent with im > 0 first
 * Units     those of the plant's plane
 * Throws    not-finite; no-convergence
 * Accuracy  exact ones: to four digits of the error itself; else plain eigenvalues, n ε times their condition
 * Source    as `loopPoles` and `eigenvalues`
 */
export function achievedPoles(A: Matrix, B: Matrix, K: Matrix, wanted: readonly Complex[]): AchievedPoles {
  const exact = loopPoles(A, B, K, wanted);
  if (!exact) {
    const poles = matchPoles(wanted, eigenvalues(Matrix.sub(A, B.mmul(K))));
    return { poles, errors: wanted.map((pole, k) => modulus(difference(pole, poles[k]))), exact: false };
  }
  const inPlace = exact.every((pole, k) => isNearest(pole, k, wanted));
  const found = inPlace ? exact : matchPoles(wanted, exact);
  return {
    poles: found.map(({ re, im }) => ({ re, im })),
    errors: wanted.map((pole, k) => modulus(wideDifference(found[k], pole))),
    exact: true,
  };
}

/** Whether no other wanted pole is nearer; where each pole is where it belongs, no pairing is needed. */
function isNearest(pole: Complex, place: number, wanted: readonly Complex[]): boolean {
  const own = modulus(difference(pole, wanted[place]));
  return wanted.every((other, k) => k === place || modulus(difference(pole, other)) >= own);
}

function difference(one: Complex, other: Complex): Complex {
  return { re: one.re - other.re, im: one.im - other.im };
}

function wideDifference(one: WideComplex, other: Complex): Complex {
  return { re: one.re - other.re + one.reLow, im: one.im - other.im + one.imLow };
}
