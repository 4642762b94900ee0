import type { Complex } from "../plant/model";
import { complexProduct, complexQuotient, modulus } from "./complex";
import { largestEntry } from "./flat";
import { powerOfTwo } from "./power-of-two";
import { blockSize, schurValues } from "./schur-values";
import { workArray, workCopy } from "./work-array";

/** Right eigenvectors of a quasi-triangular matrix; entry i of vector k is re[k][i] + i im[k][i]. */
export type TriangularVectors = { readonly re: Float64Array[]; readonly im: Float64Array[] };

const LARGE = 1e140;

/**
 * Eigenvectors of a real Schur form by back substitution. Equal eigenvalues meet a zero pivot, which is raised to rounding
 * size: the vectors then come out nearly parallel instead of infinite.
 *
 * Shapes    t n×n in standard form → n vectors of n, largest entry about one; a pair has conjugate vectors
 * Accuracy  residual c n ε |t| per vector
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 7.6.4
 */
export function triangularVectors(t: Float64Array, n: number): TriangularVectors {
  const values = schurValues(t, n);
  const re: Float64Array[] = [];
  const im: Float64Array[] = [];
  const floor = Math.max(Number.EPSILON * largestEntry(t), 1e-280);
  for (let k = 0; k < n; ) {
    const size = blockSize(t, n, k);
    const x = { re: workArray(n), im: workArray(n) };
    startVector(t, n, k, size, values[k], x);
    substituteBack(t, n, k, values[k], floor, x);
    re.push(x.re);
    im.push(x.im);
    if (size === 2) {
      re.push(workCopy(x.re));
      im.push(x.im.map((entry) => 0 - entry));
    }
    k += size;
  }
  return { re, im };
}

type Vector = { readonly re: Float64Array; readonly im: Float64Array };

function startVector(t: Float64Array, n: number, k: number, size: number, value: Complex, x: Vector): void {
  if (size === 1) {
    x.re[k] = 1;
    return;
  }
  const b = t[k * n + k + 1];
  const c = t[(k + 1) * n + k];
  if (Math.abs(b) >= Math.abs(c)) {
    x.re[k] = 1;
    x.im[k + 1] = value.im / b;
  } else {
    x.im[k] = value.im / c;
    x.re[k + 1] = 1;
  }
}

function substituteBack(t: Float64Array, n: number, k: number, value: Complex, floor: number, x: Vector): void {
  const last = k + blockSize(t, n, k) - 1;
  for (let j = k - 1; j >= 0; j--) {
    const first = j > 0 && t[j * n + j - 1] !== 0 ? j - 1 : j;
    const rhs = (row: number): Complex => {
      let re = 0;
      let im = 0;
      for (let l = j + 1; l <= last; l++) {
        re -= t[row * n + l] * x.re[l];
        im -= t[row * n + l] * x.im[l];
      }
      return { re, im };
    };
    if (first === j) {
      place(x, j, complexQuotient(rhs(j), raised({ re: t[j * n + j] - value.re, im: -value.im }, floor)));
    } else {
      const [one, two] = solveBlock(t, n, first, value, rhs(first), rhs(j), floor);
      place(x, first, one);
      place(x, j, two);
    }
    keepSmall(x);
    j = first;
  }
}

function place(x: Vector, i: number, value: Complex): void {
  x.re[i] = value.re;
  x.im[i] = value.im;
}

function raised(pivot: Complex, floor: number): Complex {
  return modulus(pivot) < floor ? { re: floor, im: 0 } : pivot;
}

/** (T_kk - value I) x = (p, q) for a 2×2 diagonal block, by elimination with row exchange. */
function solveBlock(
  t: Float64Array,
  n: number,
  k: number,
  value: Complex,
  p: Complex,
  q: Complex,
  floor: number,
): [Complex, Complex] {
  const a = { re: t[k * n + k] - value.re, im: -value.im };
  const b = { re: t[k * n + k + 1], im: 0 };
  const c = { re: t[(k + 1) * n + k], im: 0 };
  const d = { re: t[(k + 1) * n + k + 1] - value.re, im: -value.im };
  const straight = modulus(a) >= modulus(c);
  const [m11, m12, m21, m22, r1, r2] = straight ? [a, b, c, d, p, q] : [c, d, a, b, q, p];
  const factor = complexQuotient(m21, raised(m11, floor));
  const two = complexQuotient(minus(r2, complexProduct(factor, r1)), raised(minus(m22, complexProduct(factor, m12)), floor));
  const one = complexQuotient(minus(r1, complexProduct(m12, two)), raised(m11, floor));
  return [one, two];
}

function minus(a: Complex, b: Complex): Complex {
  return { re: a.re - b.re, im: a.im - b.im };
}

/** A power of two keeps growing vectors in range; entries that vanish by it are negligible. */
function keepSmall(x: Vector): void {
  if (Math.max(largestEntry(x.re), largestEntry(x.im)) < LARGE) return;
  const down = powerOfTwo(-480);
  for (let i = 0; i < x.re.length; i++) {
    x.re[i] *= down;
    x.im[i] *= down;
  }
}
