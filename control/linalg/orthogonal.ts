import { Matrix } from "ml-matrix";
import { largestEntry } from "./flat";
import { orthogonaliseRows } from "./orthogonalise-rows";
import { requireFinite } from "./require";
import { requireRepresentable } from "./require-representable";
import { workArray, workCopy } from "./work-array";

/** Orthonormal columns: `range` spans the columns of M as far as they stand above the tolerance, `complement` what is left. */
export type OrthonormalBasis = {
  readonly range: Matrix;
  readonly complement: Matrix;
  readonly rank: number;
  readonly singularValues: number[];
};

/**
 * Orthonormal bases of the column space of M and of its orthogonal complement, by singular values.
 *
 * Shapes    M r×c → range r×rank, complement r×(r - rank), singularValues min(r, c), largest first
 * Units     tolerance and singularValues as M (default tolerance max(r, c) ε times the largest singular value)
 * Throws    not-finite; no-convergence; too-large when a singular value is beyond the largest double
 * Accuracy  bases orthonormal to c r ε; the rank is that of a matrix within the tolerance of M
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 5.4.1; completed by Householder reflections, 5.2
 */
export function orthonormalBasis(M: Matrix, tolerance?: number): OrthonormalBasis {
  requireFinite("M", M);
  const r = M.rows;
  const wide = M.rows <= M.columns;
  const source = wide ? M : M.transpose();
  const { values, rows, turn } = orthogonaliseRows({
    re: Array.from({ length: source.rows }, (_, i) => Float64Array.from(source.getRow(i))),
    im: null,
  });
  requireRepresentable("singular value", values);
  const limit = tolerance ?? Math.max(M.rows, M.columns) * Number.EPSILON * (values[0] ?? 0);
  const rank = values.filter((value) => value > limit).length;
  const vectors = wide ? turn.re.slice(0, rank) : rows.re.slice(0, rank).map(unit);
  const whole = completeBasis(vectors, r);
  return {
    range: columnsMatrix(vectors, r),
    complement: columnsMatrix(whole.slice(rank), r),
    rank,
    singularValues: values,
  };
}

function unit(x: Float64Array): Float64Array {
  const largest = largestEntry(x);
  let sum = 0;
  for (const entry of x) sum += (entry / largest) * (entry / largest);
  const length = Math.sqrt(sum);
  return x.map((entry) => entry / largest / length);
}

function columnsMatrix(vectors: readonly Float64Array[], rows: number): Matrix {
  const M = Matrix.zeros(rows, vectors.length);
  vectors.forEach((vector, j) => {
    for (let i = 0; i < rows; i++) M.set(i, j, vector[i]);
  });
  return M;
}

/** r orthonormal vectors whose last r - k are orthogonal to the k given ones: the columns of their Householder matrix. */
function completeBasis(vectors: readonly Float64Array[], r: number): Float64Array[] {
  const work = vectors.map((vector) => workCopy(vector));
  const reflectors: { v: Float64Array; beta: number }[] = [];
  work.forEach((x, k) => {
    const v = workArray(r);
    let sum = 0;
    for (let i = k; i < r; i++) {
      v[i] = x[i];
      sum += x[i] * x[i];
    }
    const length = Math.sqrt(sum);
    v[k] += v[k] >= 0 ? length : -length;
    const beta = 1 / (length * Math.abs(v[k]));
    reflectors.push({ v, beta });
    for (let j = k + 1; j < work.length; j++) reflect(work[j], v, beta);
  });
  return Array.from({ length: r }, (_, j) => {
    const e = workArray(r);
    e[j] = 1;
    for (let k = reflectors.length - 1; k >= 0; k--) reflect(e, reflectors[k].v, reflectors[k].beta);
    return e;
  });
}

function reflect(x: Float64Array, v: Float64Array, beta: number): void {
  let sum = 0;
  for (let i = 0; i < x.length; i++) sum += v[i] * x[i];
  sum *= beta;
  for (let i = 0; i < x.length; i++) x[i] -= sum * v[i];
}
