import { factorLu, solveLu } from "../linalg/lu";
import { flatNorm } from "../linalg/norms";
import type { SquarePencil } from "./square-pencil";
import type { ZeroCluster } from "./zero-clusters";

const ROUNDS = 5;
/** The shift stands off the cluster by this share of the way to the nearest other zero, so that every solve keeps digits. */
const OFFSET = 0.02;

/**
 * An orthonormal basis, in doubles, near the null directions that belong to a cluster of zeros: a few rounds of inverse
 * iteration at a shift beside it. A cluster off the real axis gets real and imaginary parts of its complex directions.
 *
 * Shapes    pencil size×size → size×k, k the number of members, twice that off the real axis; null where a solve fails
 * Accuracy  a few digits, for Newton's method to go on from; 5 rounds
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, sections 7.6.1 and 7.7.8
 */
export function startVectors({ n, size, matrix }: SquarePencil, { members, real, mean, gap }: ZeroCluster): Float64Array | null {
  const count = members.length;
  const shift = { re: mean.re + OFFSET * gap, im: mean.im };
  const width = real ? size : 2 * size;
  const shifted = new Float64Array(width * width);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) {
      const entry = matrix.hi[i * size + j];
      shifted[i * width + j] = entry;
      if (!real) shifted[(size + i) * width + size + j] = entry;
    }
    if (i >= n) continue;
    shifted[i * width + i] -= shift.re;
    if (real) continue;
    shifted[(size + i) * width + size + i] -= shift.re;
    shifted[i * width + size + i] = shift.im;
    shifted[(size + i) * width + i] = -shift.im;
  }
  const factors = factorLu(shifted, width);
  if (factors.zeroPivot >= 0) return null;
  const columns = Array.from({ length: count }, (_, j) =>
    Float64Array.from({ length: width }, (_, i) => 1 + ((i * 7 + j * 3) % 11) / 8 - ((i * j) % 5) / 2),
  );
  for (let round = 0; round < ROUNDS; round++) {
    for (const column of columns) {
      const right = column.map((entry, i) => (i % size < n ? entry : 0));
      column.set(solveLu(factors, right, 1));
    }
    if (!orthonormalise(columns, size, real)) return null;
  }
  const basis = real ? columns : columns.flatMap((x) => [x.slice(0, size), x.slice(size)]);
  if (!orthonormalise(basis, size, true)) return null;
  const v = new Float64Array(size * basis.length);
  for (const [j, column] of basis.entries()) for (let i = 0; i < size; i++) v[i * basis.length + j] = column[i];
  return v;
}

/** Gram and Schmidt, twice; complex columns hold real parts above imaginary ones. False when a column is lost. */
function orthonormalise(columns: Float64Array[], size: number, real: boolean): boolean {
  for (const [j, x] of columns.entries()) {
    for (let round = 0; round < 2; round++) {
      if (!unit(x)) return false;
      for (const y of columns.slice(0, j)) removePart(x, y, size, real);
    }
    if (!unit(x)) return false;
  }
  return true;
}

function unit(x: Float64Array): boolean {
  const length = flatNorm(x);
  if (!(length > 0) || !Number.isFinite(length)) return false;
  for (let i = 0; i < x.length; i++) x[i] /= length;
  return true;
}

function removePart(x: Float64Array, y: Float64Array, size: number, real: boolean): void {
  let re = 0;
  let im = 0;
  for (let i = 0; i < x.length; i++) re += x[i] * y[i];
  if (!real) for (let i = 0; i < size; i++) im += y[i] * x[size + i] - y[size + i] * x[i];
  for (let i = 0; i < size; i++) {
    x[i] -= re * y[i] - (real ? 0 : im * y[size + i]);
    if (!real) x[size + i] -= re * y[size + i] + im * y[i];
  }
}
