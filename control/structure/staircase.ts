import { flatIdentity, pythagoras } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { workArray, workCopy } from "../linalg/work-array";
import { compressRows } from "./compress-rows";
import { reflectColumns, reflectRows } from "./reflections";

export type Staircase = {
  readonly n: number;
  readonly rank: number;
  readonly tolerance: number;
  /** Singular values of the stage with the smallest one kept, or of the stage that found nothing more. */
  readonly singularValues: readonly number[];
  /** Orthogonal q', row-major: its last n - rank rows span what no input reaches. */
  readonly qt: Float64Array;
  /** q' A q, row-major. */
  readonly a: Float64Array;
};

/**
 * Reachable part of (A, B) by orthogonal similarity: q'B and q'Aq in block staircase form.
 *
 * Shapes    a n×n, b n×m, row-major, left as they are
 * Accuracy  exact for a pair within the tolerance 4 (n + m) ε ‖[A B]‖ of the given one; at most n stages
 * Source    Paige, IEEE Trans. Automatic Control 26 (1981) 130-138
 */
export function staircase(givenA: Float64Array, b: Float64Array, n: number, m: number): Staircase {
  const a = workCopy(givenA);
  const qt = flatIdentity(n);
  const tolerance = rankTolerance(givenA, b, n + m);
  let rank = 0;
  let block = b;
  let width = m;
  let kept = Number.POSITIVE_INFINITY;
  let behind: readonly number[] = [];
  while (rank < n) {
    const stage = compressRows(block, n - rank, width, tolerance, rank);
    if (stage.rank === 0) return { n, rank, tolerance, singularValues: stage.singularValues, qt, a };
    for (const reflection of stage.reflections) {
      reflectRows(a, n, reflection);
      reflectColumns(a, n, reflection);
      reflectRows(qt, n, reflection);
    }
    if (stage.singularValues[stage.rank - 1] < kept) {
      kept = stage.singularValues[stage.rank - 1];
      behind = stage.singularValues;
    }
    block = submatrix(a, n, rank + stage.rank, rank, stage.rank);
    width = stage.rank;
    rank += stage.rank;
  }
  return { n, rank, tolerance, singularValues: behind, qt, a };
}

/** What counts as zero beside [A B] when ranks are decided: `size` is the number of its columns. */
export function rankTolerance(a: Float64Array, b: Float64Array, size: number): number {
  return 4 * size * Number.EPSILON * pythagoras(flatNorm(a), flatNorm(b));
}

/** Rows from `row` to the end, `width` columns from `column`. */
function submatrix(a: Float64Array, n: number, row: number, column: number, width: number): Float64Array {
  const block = workArray((n - row) * width);
  for (let i = row; i < n; i++) for (let j = 0; j < width; j++) block[(i - row) * width + j] = a[i * n + column + j];
  return block;
}
