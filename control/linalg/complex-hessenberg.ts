import { NumericalError } from "../errors";
import type { Complex } from "../plant/model";
import { workArray } from "./work-array";

/**
 * P (sI - H) = L U: `re` and `im` hold U above the diagonal and on it, `factorRe` and `factorIm` the one multiplier of each
 * step, `swapped` whether its two rows were exchanged first. `zeroPivot` is the first row without a pivot, or -1.
 */
export type ShiftedHessenberg = {
  readonly n: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly factorRe: Float64Array;
  readonly factorIm: Float64Array;
  readonly swapped: Uint8Array;
  zeroPivot: number;
};

/** Room for the factors of one point; reuse it from point to point of a sweep. */
export function shiftedHessenbergRoom(n: number): ShiftedHessenberg {
  const square = () => workArray(n * n);
  const line = () => workArray(n);
  return { n, re: square(), im: square(), factorRe: line(), factorIm: line(), swapped: new Uint8Array(n), zeroPivot: -1 };
}

/**
 * Factors sI - H for an upper Hessenberg H and a complex s, by elimination with partial pivoting between neighbouring rows.
 *
 * Shapes    h n×n row-major (entries below the first subdiagonal are never read), left untouched
 * Accuracy  P (sI - H + E) = L U, |E| ≤ c n ε |L||U|; entries of U grow at most n times; 2 n² complex flops
 * Source    Laub, Efficient multivariable frequency response computations, IEEE Trans. Autom. Control 26 (1981) 407-408;
 *           growth: Wilkinson, The Algebraic Eigenvalue Problem, 1965, chapter 3, section 29 (from memory)
 */
export function factorShiftedHessenberg(
  h: Float64Array,
  n: number,
  s: Complex,
  room = shiftedHessenbergRoom(n),
): ShiftedHessenberg {
  room.zeroPivot = -1;
  if (n > 0) loadRow(h, n, 0, s, room);
  for (let k = 0; k < n - 1; k++) {
    loadRow(h, n, k + 1, s, room);
    eliminateBelow(room, k, -h[(k + 1) * n + k]);
  }
  const last = n * n - 1;
  if (n > 0 && room.zeroPivot < 0 && room.re[last] === 0 && room.im[last] === 0) room.zeroPivot = n - 1;
  return room;
}

/** Row i of sI - H from the diagonal on. */
function loadRow(h: Float64Array, n: number, i: number, s: Complex, { re, im }: ShiftedHessenberg): void {
  for (let at = i * n + i; at < (i + 1) * n; at++) {
    re[at] = -h[at];
    im[at] = 0;
  }
  re[i * n + i] = s.re - h[i * n + i];
  im[i * n + i] = s.im;
}

/** Clears the entry `below` of row k + 1 in column k; sizes are compared by |re| + |im|. */
function eliminateBelow(room: ShiftedHessenberg, k: number, below: number): void {
  const { n, re, im, factorRe, factorIm, swapped } = room;
  const at = k * n + k;
  const pr = re[at];
  const pi = im[at];
  factorRe[k] = factorIm[k] = 0;
  swapped[k] = 0;
  if (below === 0) {
    if (pr === 0 && pi === 0 && room.zeroPivot < 0) room.zeroPivot = k;
    return;
  }
  const upper = k * n;
  const lower = upper + n;
  if (Math.abs(below) > Math.abs(pr) + Math.abs(pi)) {
    const fr = pr / below;
    const fi = pi / below;
    swapped[k] = 1;
    factorRe[k] = fr;
    factorIm[k] = fi;
    re[at] = below;
    im[at] = 0;
    for (let j = k + 1; j < n; j++) {
      const xr = re[upper + j];
      const xi = im[upper + j];
      const yr = re[lower + j];
      const yi = im[lower + j];
      re[upper + j] = yr;
      im[upper + j] = yi;
      re[lower + j] = xr - (fr * yr - fi * yi);
      im[lower + j] = xi - (fr * yi + fi * yr);
    }
    return;
  }
  // below / (pr + i pi) by Smith's division
  const byReal = Math.abs(pr) >= Math.abs(pi);
  const ratio = byReal ? pi / pr : pr / pi;
  const quotient = below / (byReal ? pr + pi * ratio : pr * ratio + pi);
  const fr = byReal ? quotient : quotient * ratio;
  const fi = byReal ? -quotient * ratio : -quotient;
  factorRe[k] = fr;
  factorIm[k] = fi;
  for (let j = k + 1; j < n; j++) {
    const xr = re[upper + j];
    const xi = im[upper + j];
    re[lower + j] -= fr * xr - fi * xi;
    im[lower + j] -= fr * xi + fi * xr;
  }
}

/**
 * Overwrites B = re + i im by (sI - H)⁻¹ B.
 *
 * Shapes    re, im n×columns row-major
 * Throws    singular with the row of the zero pivot: s is an eigenvalue of H to the last bit
 * Accuracy  backward stable, one perturbation of size c n² ε (|s| + |H|) per column; 2 n² complex flops per column
 * Source    as `factorShiftedHessenberg`
 */
export function solveShiftedHessenberg(factors: ShiftedHessenberg, re: Float64Array, im: Float64Array, columns: number): void {
  const { n, zeroPivot, factorRe, factorIm, swapped } = factors;
  if (zeroPivot >= 0) throw new NumericalError("singular", { matrix: "sI - H", row: zeroPivot });
  for (let k = 0; k < n - 1; k++) {
    const upper = k * columns;
    const lower = upper + columns;
    if (swapped[k] === 1) {
      for (let j = 0; j < columns; j++) {
        const xr = re[upper + j];
        const xi = im[upper + j];
        re[upper + j] = re[lower + j];
        im[upper + j] = im[lower + j];
        re[lower + j] = xr;
        im[lower + j] = xi;
      }
    }
    subtractMultiple(re, im, columns, lower, upper, factorRe[k], factorIm[k]);
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let k = i + 1; k < n; k++) {
      subtractMultiple(re, im, columns, i * columns, k * columns, factors.re[i * n + k], factors.im[i * n + k]);
    }
    divideRow(re, im, columns, i * columns, factors.re[i * n + i], factors.im[i * n + i]);
  }
}

/** Row at `to` minus (fr + i fi) times the row at `from`. */
function subtractMultiple(
  re: Float64Array,
  im: Float64Array,
  columns: number,
  to: number,
  from: number,
  fr: number,
  fi: number,
): void {
  if (fr === 0 && fi === 0) return;
  for (let j = 0; j < columns; j++) {
    const xr = re[from + j];
    const xi = im[from + j];
    re[to + j] -= fr * xr - fi * xi;
    im[to + j] -= fr * xi + fi * xr;
  }
}

/** Smith's division of a row by pr + i pi ≠ 0. */
function divideRow(re: Float64Array, im: Float64Array, columns: number, at: number, pr: number, pi: number): void {
  const byReal = Math.abs(pr) >= Math.abs(pi);
  const ratio = byReal ? pi / pr : pr / pi;
  const denominator = byReal ? pr + pi * ratio : pr * ratio + pi;
  for (let j = at; j < at + columns; j++) {
    const xr = re[j];
    const xi = im[j];
    re[j] = (byReal ? xr + xi * ratio : xr * ratio + xi) / denominator;
    im[j] = (byReal ? xi - xr * ratio : xi * ratio - xr) / denominator;
  }
}
