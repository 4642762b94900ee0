import { NumericalError } from "../errors";
import { wideTranspose } from "../linalg/double-double";
import { flatNorm } from "../linalg/norms";
import { timesPowerOfTwo } from "../linalg/power-of-two";
import { type GramianProblem, wideGramians } from "./gramians";
import { wideByWide } from "./wide-by-wide";
import { wideFactor } from "./wide-factor";
import { wideSingularValues } from "./wide-singular-values";

/** Largest first, one per state; `errors` bounds how far each may be off. */
export type HankelValues = { readonly values: readonly number[]; readonly errors: readonly number[] };

/**
 * Hankel singular values of a stable plant: how much of what the inputs put into the states comes back at the outputs. They
 * do not depend on the choice of states; hidden ones count as zeros.
 *
 * Shapes    A n×n, B n×m, C p×n → n values
 * Units     those of the gain from inputs to outputs; scale inputs and outputs first
 * Throws    as `gramians`
 * Accuracy  relative n ε while a value is above about 1e-14 of the geometric mean of the gramians' norms, in balanced states;
 *           below that as its error says, which falls as 1 over the value: gramians, their factors and the product are in
 *           double-double. Values whose squares are lost even there are zero
 * Source    Moore, IEEE Trans. Automatic Control 26 (1981) 17-32; Laub, Heath, Paige & Ward, ibid. 32 (1987) 115-122, for
 *           the factors
 */
export function hankelValues(problem: GramianProblem): HankelValues {
  const { n, reach, sight, balanced, inputExponent, outputExponent } = wideGramians(problem);
  const inward = wideFactor(reach.w, n, reach.error);
  const outward = wideFactor(sight.w, n, sight.error);
  const [r, s] = [outward.rank, inward.rank];
  const product = wideByWide(wideTranspose(outward.l, n, r), inward.l, r, n, s);
  const found = r <= s ? wideSingularValues(product, r, s) : wideSingularValues(wideTranspose(product, r, s), s, r);
  const size = flatNorm(reach.w.hi) * flatNorm(sight.w.hi) * (reach.error + sight.error);
  const exponent = balanced.shift - inputExponent - outputExponent;
  const values = Array.from({ length: n }, (_, k) => timesPowerOfTwo(found[k] ?? 0, exponent));
  const lost = Math.sqrt(8 * n * size);
  const errors = Array.from({ length: n }, (_, k) => {
    const value = found[k] ?? 0;
    const error = value > lost ? (4 * n * size) / value : lost;
    return timesPowerOfTwo(error + 8 * n * Number.EPSILON * value, exponent);
  });
  if (![...values, ...errors].every(Number.isFinite))
    throw new NumericalError("too-large", { what: "Hankel value", limit: Number.MAX_VALUE });
  return { values, errors };
}
