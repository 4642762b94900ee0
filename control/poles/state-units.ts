import { Matrix } from "ml-matrix";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { solveLinear } from "../linalg/solve-linear";

const MOST_EXPONENT = 200;
/** Keeps the equations solvable where states or inputs hang together by nothing. */
const ANCHOR = 1 / 1024;

/**
 * Powers of two d for which the entries of D⁻¹ A D and D⁻¹ B differ least in size, inputs and time taken at their best scale:
 * least squares in the exponents of all entries that are not zero, so that a change of units by powers of two comes out in d.
 *
 * Shapes    a n×n, b n×m, row-major → n
 * Units     old state = d · new state
 * Throws    nothing for finite entries
 * Accuracy  exponents rounded to whole numbers, at most 200 either way
 * Source    Curtis & Reid, J. Inst. Maths Applics 10 (1972) 118-124
 */
export function evenStateUnits(a: Float64Array, b: Float64Array, n: number, m: number): Float64Array {
  const clock = n + m;
  const normal = Matrix.eye(clock + 1).mul(ANCHOR);
  const right = Matrix.zeros(clock + 1, 1);
  const add = (places: readonly (readonly [number, number])[], exponent: number) => {
    for (const [i, x] of places) {
      right.set(i, 0, right.get(i, 0) - x * exponent);
      for (const [j, y] of places) normal.set(i, j, normal.get(i, j) + x * y);
    }
  };
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const entry = a[i * n + j];
      if (i !== j && entry !== 0)
        add(
          [
            [j, 1],
            [i, -1],
            [clock, 1],
          ],
          exponentOf(entry),
        );
    }
    for (let j = 0; j < m; j++) {
      const entry = b[i * m + j];
      if (entry !== 0)
        add(
          [
            [n + j, 1],
            [i, -1],
          ],
          exponentOf(entry),
        );
    }
  }
  const { X } = solveLinear(normal, right);
  const exponents = Float64Array.from({ length: n }, (_, i) => Math.round(X.get(i, 0)));
  const middle = Math.round((Math.max(...exponents) + Math.min(...exponents)) / 2);
  return exponents.map((e) => powerOfTwo(Math.max(-MOST_EXPONENT, Math.min(MOST_EXPONENT, e - middle))));
}
