import { Matrix } from "ml-matrix";
import { flatTranspose, fromFlat, toFlat } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { solveLinear } from "../linalg/solve-linear";
import { compressRows } from "./compress-rows";
import { reflectColumns, reflectRows } from "./reflections";

type Parts = { readonly rest: Matrix; readonly chain: Matrix };

/** A system in two parts that do not act on each other: `rest` has an inverse, `chain` holds the integrators. */
export type SplitAtRest = Parts & { readonly inputs: Parts; readonly outputs: Parts };

/**
 * The integrators of a plant, whose matrix becomes zero by powers, apart from what has an inverse.
 *
 * Shapes    A n×n, B n×m, C p×n → rest (n - k)×(n - k), chain k×k, with their rows of B and columns of C
 * Throws    singular; not-finite; no-convergence
 * Accuracy  A null direction is one within 16 n ε of the norm of A, stage by stage; at most n stages
 * Source    Kublanovskaya, USSR Comput. Math. Math. Phys. 6 (1966) 1-14, by staircase reduction (from memory)
 */
export function splitAtRest(A: Matrix, B: Matrix, C: Matrix): SplitAtRest {
  const n = A.rows;
  const [a, b, c] = [toFlat(A), toFlat(B), toFlat(C)];
  const tolerance = 16 * n * Number.EPSILON * flatNorm(a);
  let size = n;
  for (let stage = 0; stage < n && size > 0; stage++) {
    const leading = new Float64Array(size * size);
    for (let i = 0; i < size; i++) for (let j = 0; j < size; j++) leading[i * size + j] = a[j * n + i];
    const { rank, reflections } = compressRows(leading, size, size, tolerance, 0);
    if (rank === size) break;
    for (const reflection of reflections) {
      reflectRows(a, n, reflection);
      reflectColumns(a, n, reflection);
      reflectRows(b, B.columns, reflection);
      reflectColumns(c, n, reflection);
    }
    for (let i = 0; i < size; i++) for (let j = rank; j < size; j++) a[i * n + j] = 0;
    size = rank;
  }
  return decoupled(fromFlat(a, n, n), fromFlat(b, n, B.columns), fromFlat(c, C.rows, n), size);
}

/** With A = [R 0; X N] the states of N are counted from Y times those of R, Y R = X + N Y, so that nothing acts across. */
function decoupled(A: Matrix, B: Matrix, C: Matrix, size: number): SplitAtRest {
  const n = A.rows;
  const part = (M: Matrix, top: number, bottom: number, left: number, right: number) => {
    const block = Matrix.zeros(bottom - top, right - left);
    for (let i = top; i < bottom; i++) for (let j = left; j < right; j++) block.set(i - top, j - left, M.get(i, j));
    return block;
  };
  const rest = part(A, 0, size, 0, size);
  const chain = part(A, size, n, size, n);
  const across = part(A, size, n, 0, size);
  let Y = Matrix.zeros(n - size, size);
  // N is zero by powers: after as many rounds as it has rows Y stands still.
  for (let round = 0; round < n - size && size > 0; round++) {
    const right = Matrix.add(across, chain.mmul(Y));
    Y = solveLinear(transposed(rest), transposed(right)).X.transpose();
  }
  const inputs = { rest: part(B, 0, size, 0, B.columns), chain: part(B, size, n, 0, B.columns) };
  const outputs = { rest: part(C, 0, C.rows, 0, size), chain: part(C, 0, C.rows, size, n) };
  return {
    rest,
    chain,
    inputs: { rest: inputs.rest, chain: Matrix.sub(inputs.chain, Y.mmul(inputs.rest)) },
    outputs: { rest: Matrix.add(outputs.rest, outputs.chain.mmul(Y)), chain: outputs.chain },
  };
}

function transposed(M: Matrix): Matrix {
  return fromFlat(flatTranspose(toFlat(M), M.rows, M.columns), M.columns, M.rows);
}
