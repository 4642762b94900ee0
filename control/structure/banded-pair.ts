import { type Reflection, reflectColumns, reflectionOf, reflectRows } from "./reflections";

/** [B A] in trapezoid form: b(i, j) = 0 below its diagonal, a(i, j) = 0 for i > j + m. Row-major. */
export type BandedPair = { readonly n: number; readonly m: number; readonly a: Float64Array; readonly b: Float64Array };

/**
 * The pair (A, B) turned by orthogonal similarity until [B, A - s I] is a trapezoid for every s: singular values stay.
 *
 * Shapes    a n×n, b n×m, left as they are → the same
 * Accuracy  exact for a pair within c n ε of the given one
 * Source    Van Dooren & Verhaegen, Contemp. Math. 47 (1985) 447-456: condensed forms (from memory)
 */
export function bandPair(givenA: Float64Array, givenB: Float64Array, n: number, m: number): BandedPair {
  const a = givenA.slice();
  const b = givenB.slice();
  const turn = (reflection: Reflection | null) => {
    if (!reflection) return;
    reflectRows(b, m, reflection);
    reflectRows(a, n, reflection);
    reflectColumns(a, n, reflection);
  };
  for (let j = 0; j < Math.min(m, n - 1); j++) {
    turn(reflectionOf(below(b, m, n, j, j), j));
    for (let i = j + 1; i < n; i++) b[i * m + j] = 0;
  }
  for (let j = 0; j + m + 1 < n; j++) {
    turn(reflectionOf(below(a, n, n, j + m, j), j + m));
    for (let i = j + m + 1; i < n; i++) a[i * n + j] = 0;
  }
  return { n, m, a, b };
}

function below(x: Float64Array, columns: number, rows: number, from: number, column: number): Float64Array {
  return Float64Array.from({ length: rows - from }, (_, i) => x[(from + i) * columns + column]);
}
