import type { Matrix } from "ml-matrix";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import { singularValues } from "@/control/linalg/singular-values";
import type { Complex } from "@/control/plant/model";
import { matchPoles } from "@/control/poles/match-poles";
import { exactly, times, transposed } from "../exact-matrix";
import { eigenvalueErrors } from "../exact-polynomial";
import { FACTOR, type Kind, random } from "../kind";

const SIZES = [1, 2, 4, 8, 12];

/** `conditions` of the eigenvalues, from left and right vectors; only the other library tells them. */
type Spectrum = { readonly values: readonly Complex[]; readonly conditions: readonly number[] | null };

const worst = (values: readonly number[]) => Math.max(0, ...values);
const apart = (a: Complex, b: Complex) => Math.hypot(a.re - b.re, a.im - b.im);

export const spectrum: Kind<{ readonly A: Matrix }, Spectrum> = {
  name: "eigenvalues",
  measure: "true error",
  problems: (uniform) => [...SIZES, ...SIZES].map((n) => ({ A: random(uniform, n, n) })),
  question: ({ A }) => ({ ask: "eigenvalues", A }),
  ours: ({ A }) => ({ values: eigenvalues(A), conditions: null }),
  theirs: ({ values, conditions }: { values: [number, number][]; conditions: number[] }) => ({
    values: values.map(([re, im]) => ({ re, im })),
    conditions,
  }),
  difference: ({ A }, one, other) => {
    const [known, free] = other.conditions ? [other, one] : [one, other];
    const nearest = matchPoles(known.values, free.values);
    // Each in units of its own condition, so that one bound serves all.
    return worst(known.values.map((value, k) => apart(value, nearest[k]) / (known.conditions?.[k] ?? 1))) / (A.norm() || 1);
  },
  allowed: ({ A }) => FACTOR * A.rows * Number.EPSILON,
  error: ({ A }, { values }) => worst(eigenvalueErrors(exactly(A), values)) / (A.norm() || 1),
};

export const singular: Kind<{ readonly A: Matrix }, readonly number[]> = {
  name: "singular values",
  measure: "true error",
  problems: (uniform) => SIZES.flatMap((n) => [n, n + 2].map((m) => ({ A: random(uniform, m, n) }))),
  question: ({ A }) => ({ ask: "singular_values", A }),
  ours: ({ A }) => singularValues(A),
  theirs: (values: number[]) => values,
  difference: (_, one, other) => worst(one.map((value, k) => Math.abs(value - other[k]))) / (one[0] || 1),
  allowed: ({ A }) => FACTOR * A.rows * Number.EPSILON,
  // σ² is an eigenvalue of A'A; half its error over σ is that of σ.
  error: ({ A }, values) => {
    const square = times(transposed(exactly(A)), exactly(A));
    const errors = values.map((value) => singularError(square, value));
    return worst(errors) / (values[0] || 1);
  },
};

/** Error of σ as an eigenvalue of [0 I; M'M 0], which are ±σ; `square` is M'M. */
function singularError(square: ReturnType<typeof exactly>, value: number): number {
  const n = square.rows.length;
  const even = 2 * Math.floor(square.exponent / 2);
  const lifted = square.rows.map((row) => row.map((x) => x << BigInt(square.exponent - even)));
  const rows = Array.from({ length: 2 * n }, (_, i) =>
    Array.from({ length: 2 * n }, (__, j) => (i < n ? (j === n + i ? 1n : 0n) : j < n ? lifted[i - n][j] : 0n)),
  );
  return eigenvalueErrors({ rows, exponent: even / 2 }, [{ re: value, im: 0 }])[0];
}
