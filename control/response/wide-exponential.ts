import { addNarrow, split, type Wide, wideProduct } from "../linalg/double-double";
import { flatProduct } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { flatOneNorm } from "../linalg/solve-linear";
import type { WideNumber } from "../linalg/wide-number";
import { workArray } from "../linalg/work-array";
import { addScaled, timesPower, wideOver } from "./wide-scalar";

/** Terms of the series up to X¹⁹ with |X| ≤ 1/8, where the next one is below 1e-36; taken together by fives. */
const TERMS = 20;
const GROUP = 5;
const SMALL_EXPONENT = 4;

/** 1/k!, each with twice the digits of a double. */
const INVERSE_FACTORIALS = inverseFactorials();

/**
 * Exponential with twice the digits of a double, by its Taylor series after scaling to norm 1/8, and squaring.
 *
 * Shapes    a n×n row-major, hi + lo, balanced → n×n
 * Accuracy  about 2^squarings · 1e-31, so that norms up to 1e12 leave the rounded result correct but in its last place;
 *           not finite where the way to the result leaves the range of doubles
 * Source    Paterson & Stockmeyer, SIAM J. Comput. 2 (1973) 60-66 (grouping of the terms)
 */
export function wideExponential(a: Wide, n: number): Wide {
  const squarings = squaringsFor(flatOneNorm(a.hi, n));
  let result = wideSeries(timesPower(a, powerOfTwo(-squarings)), n);
  for (let k = 0; k < squarings; k++) result = wideTimesWide(result, result, n);
  return result;
}

/** Halvings that bring a norm to 1/8 or below. */
export function squaringsFor(norm: number): number {
  return norm === 0 ? 0 : Math.max(0, exponentOf(norm) + SMALL_EXPONENT);
}

/** exp(x) for a norm of at most 1/8. */
export function wideSeries(x: Wide, n: number): Wide {
  const powers: Wide[] = [x];
  while (powers.length < GROUP) powers.push(wideTimesWide(powers[powers.length - 1], x, n));
  let sum = groupOf(powers, TERMS - GROUP, n);
  for (let first = TERMS - 2 * GROUP; first >= 0; first -= GROUP) {
    sum = wideTimesWide(sum, powers[GROUP - 1], n);
    addScaled(sum, INVERSE_FACTORIALS[0], groupOf(powers, first, n));
  }
  return sum;
}

/** Terms of order `first` to `first` + 4 over x^first, smallest first. */
function groupOf(powers: readonly Wide[], first: number, n: number): Wide {
  const sum: Wide = { hi: workArray(n * n), lo: workArray(n * n) };
  for (let j = GROUP - 1; j >= 1; j--) addScaled(sum, INVERSE_FACTORIALS[first + j], powers[j - 1]);
  const head = workArray(n * n);
  const tail = workArray(n * n);
  for (let i = 0; i < n * n; i += n + 1) {
    head[i] = INVERSE_FACTORIALS[first].hi;
    tail[i] = INVERSE_FACTORIALS[first].lo;
  }
  addScaled(sum, INVERSE_FACTORIALS[0], { hi: head, lo: tail });
  return sum;
}

export function wideTimesWide(a: Wide, b: Wide, n: number): Wide {
  const product = wideProduct(split(a.hi), b, n, n, n);
  addNarrow(product, flatProduct(a.lo, b.hi, n, n, n), 1);
  return product;
}

/** a^k for k ≥ 1 by squaring. */
export function widePower(a: Wide, n: number, k: number): Wide {
  let square = a;
  let power: Wide | null = null;
  for (let rest = k; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) power = power ? wideTimesWide(power, square, n) : square;
    if (rest > 1) square = wideTimesWide(square, square, n);
  }
  return power ?? a;
}

function inverseFactorials(): WideNumber[] {
  const list: WideNumber[] = [{ hi: 1, lo: 0 }];
  for (let k = 1; k < TERMS; k++) list.push(wideOver(list[k - 1], k));
  return list;
}
