import { NumericalError } from "../errors";
import { complexQuotient } from "../linalg/complex";
import { pythagoras } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import type { Complex } from "../plant/model";
import { type ComplexFlat, rotateColumns, rotateRows, rotationOf } from "./complex-rotation";
import { reflectionOf, reflectRows } from "./reflections";

const MOST_SWEEPS = 60;
/** After so many sweeps an entry counts as negligible beside the whole matrix, no longer only beside its neighbours. */
const PATIENT_SWEEPS = 20;

/**
 * Finite eigenvalues of the pencil A - λ B of two real matrices. Real values and conjugate pairs come out exactly so.
 *
 * Shapes    a, b n×n row-major, left as they are → at most n values
 * Throws    no-convergence after 60 sweeps for one value
 * Accuracy  exact for a pencil within c n ε of (A, B); values beyond 1/ε of the size of A over B count as infinite
 * Source    Moler & Stewart, SIAM J. Numer. Anal. 10 (1973) 241-256, with single complex shifts
 */
export function pencilEigenvalues(a: Float64Array, b: Float64Array, n: number): Complex[] {
  const A: ComplexFlat = { n, re: a.slice(), im: new Float64Array(n * n) };
  const B: ComplexFlat = { n, re: b.slice(), im: new Float64Array(n * n) };
  triangularise(A, B);
  const smallA = Number.EPSILON * flatNorm(a);
  const smallB = Number.EPSILON * flatNorm(b);
  const values: Complex[] = [];
  let sweeps = 0;
  for (let last = n - 1; last >= 0; ) {
    const first = windowStart(A, last, sweeps > PATIENT_SWEEPS ? smallA : smallA * Number.EPSILON);
    if (first === last) {
      const alpha = entry(A, last, last);
      const beta = entry(B, last, last);
      if (pythagoras(beta.re, beta.im) > smallB) values.push(complexQuotient(alpha, beta));
      last--;
      sweeps = 0;
      continue;
    }
    if (++sweeps > MOST_SWEEPS) throw new NumericalError("no-convergence", { routine: "pencilEigenvalues", limit: MOST_SWEEPS });
    sweep(A, B, first, last, shiftOf(A, B, last, sweeps, smallB));
  }
  return conjugatePairs(values);
}

/** B upper triangular and A upper Hessenberg, by orthogonal rows and columns. */
function triangularise(A: ComplexFlat, B: ComplexFlat): void {
  const n = A.n;
  for (let k = 0; k + 1 < n; k++) {
    const column = new Float64Array(n - k);
    for (let i = k; i < n; i++) column[i - k] = B.re[i * n + k];
    const reflection = reflectionOf(column, k);
    if (reflection) {
      reflectRows(B.re, n, reflection);
      reflectRows(A.re, n, reflection);
    }
    for (let i = k + 1; i < n; i++) B.re[i * n + k] = 0;
  }
  for (let k = 0; k + 2 < n; k++) {
    for (let i = n - 2; i > k; i--) {
      const rows = rotationOf(A.re[i * n + k], 0, A.re[(i + 1) * n + k], 0);
      rotateRows(A, i, rows, k, n);
      rotateRows(B, i, rows, i, n);
      A.re[(i + 1) * n + k] = 0;
      restoreTriangle(A, B, i, 0, n);
    }
  }
}

/** Zeroes B(i + 1, i) by a rotation of columns i and i + 1. */
function restoreTriangle(A: ComplexFlat, B: ComplexFlat, i: number, top: number, bottom: number): void {
  const n = A.n;
  const at = (i + 1) * n + i;
  const columns = rotationOf(B.re[at + 1], B.im[at + 1], B.re[at], B.im[at]);
  rotateColumns(B, i, columns, top, i + 2);
  rotateColumns(A, i, columns, top, bottom);
  B.re[at] = 0;
  B.im[at] = 0;
}

/** First row of the unreduced part that ends in row `last`; negligible entries below the diagonal become zero. */
function windowStart(A: ComplexFlat, last: number, small: number): number {
  const { n, re, im } = A;
  for (let k = last; k > 0; k--) {
    const at = k * n + k - 1;
    const around = pythagoras(re[at + 1], im[at + 1]) + pythagoras(re[at - n], im[at - n]);
    const size = pythagoras(re[at], im[at]);
    if (size <= Number.EPSILON * around || size <= small) {
      re[at] = 0;
      im[at] = 0;
      return k;
    }
  }
  return 0;
}

/** Eigenvalue of the last 2×2 block of A B⁻¹ nearer its last entry; every tenth time another value, to leave a cycle. */
function shiftOf(A: ComplexFlat, B: ComplexFlat, last: number, sweeps: number, smallB: number): Complex {
  const i = last - 1;
  const b11 = guarded(entry(B, i, i), smallB);
  const b22 = guarded(entry(B, last, last), smallB);
  const m11 = complexQuotient(entry(A, i, i), b11);
  const m21 = complexQuotient(entry(A, last, i), b11);
  const ratio = complexQuotient(entry(B, i, last), b22);
  const m12 = minus(complexQuotient(entry(A, i, last), b22), times(m11, ratio));
  const m22 = minus(complexQuotient(entry(A, last, last), b22), times(m21, ratio));
  if (sweeps % 10 === 0) return { re: m22.re + Math.abs(m21.re) + Math.abs(m21.im), im: m22.im };
  const half = { re: (m11.re - m22.re) / 2, im: (m11.im - m22.im) / 2 };
  const product = times(m12, m21);
  const square = times(half, half);
  const root = squareRoot({ re: square.re + product.re, im: square.im + product.im });
  const aligned = half.re * root.re + half.im * root.im >= 0;
  const denominator = aligned ? { re: half.re + root.re, im: half.im + root.im } : minus(half, root);
  if (denominator.re === 0 && denominator.im === 0) return m22;
  return minus(m22, complexQuotient(product, denominator));
}

function sweep(A: ComplexFlat, B: ComplexFlat, first: number, last: number, shift: Complex): void {
  const n = A.n;
  const start = minus(entry(A, first, first), times(shift, entry(B, first, first)));
  const below = entry(A, first + 1, first);
  let rows = rotationOf(start.re, start.im, below.re, below.im);
  for (let k = first; k < last; k++) {
    const from = k > first ? k - 1 : first;
    if (k > first) {
      const at = k * n + k - 1;
      rows = rotationOf(A.re[at], A.im[at], A.re[at + n], A.im[at + n]);
    }
    rotateRows(A, k, rows, from, last + 1);
    rotateRows(B, k, rows, k, last + 1);
    if (k > first) {
      A.re[(k + 1) * n + k - 1] = 0;
      A.im[(k + 1) * n + k - 1] = 0;
    }
    restoreTriangle(A, B, k, first, Math.min(k + 2, last) + 1);
  }
}

/** Joins values with their nearest conjugates; a value that is nearest its own conjugate is real. */
function conjugatePairs(values: readonly Complex[]): Complex[] {
  const open = [...values];
  const joined: Complex[] = [];
  while (open.length > 0) {
    const value = open.pop() as Complex;
    let best = -1;
    let nearest = 2 * Math.abs(value.im);
    open.forEach((other, index) => {
      const distance = pythagoras(other.re - value.re, other.im + value.im);
      if (distance < nearest) {
        nearest = distance;
        best = index;
      }
    });
    if (best < 0) {
      joined.push({ re: value.re + 0, im: 0 });
      continue;
    }
    const [other] = open.splice(best, 1);
    const re = (value.re + other.re) / 2;
    const im = Math.abs(value.im - other.im) / 2;
    joined.push({ re, im }, { re, im: -im });
  }
  return joined;
}

function entry(X: ComplexFlat, i: number, j: number): Complex {
  return { re: X.re[i * X.n + j], im: X.im[i * X.n + j] };
}

function guarded(value: Complex, small: number): Complex {
  return pythagoras(value.re, value.im) > small ? value : { re: small === 0 ? 1 : small, im: 0 };
}

function minus(x: Complex, y: Complex): Complex {
  return { re: x.re - y.re, im: x.im - y.im };
}

function times(x: Complex, y: Complex): Complex {
  return { re: x.re * y.re - x.im * y.im, im: x.re * y.im + x.im * y.re };
}

function squareRoot({ re, im }: Complex): Complex {
  const size = pythagoras(re, im);
  const real = Math.sqrt((size + Math.abs(re)) / 2);
  if (real === 0) return { re: 0, im: 0 };
  const other = Math.abs(im) / (2 * real);
  const [x, y] = re >= 0 ? [real, other] : [other, real];
  return { re: x, im: im < 0 ? -y : y };
}
