import { modulus } from "../linalg/complex";
import { eigenvalues } from "../linalg/eigenvalues";
import { toFlat } from "../linalg/flat";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import type { System } from "../plant/scale-plant";
import { type BalancedSystem, balanceSystem } from "./balance-system";
import { commonZeros } from "./common-zeros";
import { reduceSystem } from "./reduce-system";
import { reducedZeros } from "./reduced-zeros";
import { refineZeros } from "./refine-zeros";
import { squarePencil } from "./square-pencil";
import { directedZero, type TransmissionZero } from "./zero-directions";

/**
 * Finite zeros from inputs to outputs: the values of s at which [A - sI, B; C, D] loses rank, hidden modes among them, each
 * as often as it occurs, with the motion that it blocks. Systems with more outputs than inputs, or the reverse, and systems
 * that lose rank everywhere, are handled. Zeros that lie at infinity within rounding are left out.
 *
 * Shapes    A n×n, B n×m, C p×n, D p×m → at most n values, conjugate pairs exactly conjugate, sorted by real part
 * Units     those of A; directions those of the signals
 * Throws    shape-mismatch; not-finite; no-convergence; too-large
 * Accuracy  their number is that of a system within 4 (n + m + p) ε of the balanced one; values are corrected in double-double
 *           against the given one: simple zeros are rounded correctly, one of multiplicity j is right to about ε^(2/j), and to
 *           the last digit where it is multiple exactly. A cluster that does not contract keeps the digits of double arithmetic
 * Source    Emami-Naeini & Van Dooren, Automatica 18 (1982) 415-430; directions: MacFarlane & Karcanias, Int. J. Control 24
 *           (1976) 33-74 (from memory)
 */
export function transmissionZeros({ A, B, C, D }: System): TransmissionZero[] {
  const n = A.rows;
  requireSquare("A", A);
  requireShape("B", B, n, B.columns);
  requireShape("C", C, C.rows, n);
  requireShape("D", D, C.rows, B.columns);
  for (const [name, M] of Object.entries({ A, B, C, D })) requireFinite(name, M);
  if (B.columns === 0 || C.rows === 0) return [];
  const system = { n, m: B.columns, p: C.rows, a: toFlat(A), b: toFlat(B), c: toFlat(C), d: toFlat(D) };
  const fastest = eigenvalues(A).reduce((size, pole) => Math.max(size, modulus(pole)), 0);
  const balanced = balanceSystem(system, fastest);
  return zerosOfBalanced(balanced)
    .filter(({ re, im }) => Number.isFinite(re) && Number.isFinite(im))
    .sort((x, y) => x.re - y.re || Math.abs(x.im) - Math.abs(y.im) || y.im - x.im);
}

function zerosOfBalanced(system: BalancedSystem): TransmissionZero[] {
  const reduced = reduceSystem(system);
  const rank = reduced.m;
  const square = system.m === rank && system.p === rank;
  const plain = () => reducedZeros(reduced);
  const refined =
    rank === 0
      ? plain().map((value) => ({ value, right: null, left: null }))
      : square
        ? refineZeros(squarePencil(system, rank, 0), plain())
        : commonZeros(system, rank);
  return refined.map((zero) => directedZero(zero, system, rank));
}
