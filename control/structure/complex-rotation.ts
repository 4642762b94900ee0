import { pythagoras } from "../linalg/flat";

/** Complex n×n, row-major, real and imaginary parts apart. */
export type ComplexFlat = { readonly n: number; readonly re: Float64Array; readonly im: Float64Array };

/** [c s; -conj(s) c] with real c, of determinant one. */
export type Rotation = { readonly c: number; readonly sRe: number; readonly sIm: number };

/** The rotation that takes [f; g] to [r; 0]. */
export function rotationOf(fRe: number, fIm: number, gRe: number, gIm: number): Rotation {
  const f = pythagoras(fRe, fIm);
  const g = pythagoras(gRe, gIm);
  if (g === 0) return { c: 1, sRe: 0, sIm: 0 };
  if (f === 0) return { c: 0, sRe: gRe / g, sIm: -gIm / g };
  const d = pythagoras(f, g);
  const uRe = fRe / f;
  const uIm = fIm / f;
  return { c: f / d, sRe: (uRe * gRe + uIm * gIm) / d, sIm: (uIm * gRe - uRe * gIm) / d };
}

/** Rows i and i + 1 become [c s; -conj(s) c] times themselves, in columns from … to - 1. */
export function rotateRows(x: ComplexFlat, i: number, { c, sRe, sIm }: Rotation, from: number, to: number): void {
  const { n, re, im } = x;
  for (let upper = i * n + from, lower = upper + n; upper < i * n + to; upper++, lower++) {
    const aRe = re[upper];
    const aIm = im[upper];
    const bRe = re[lower];
    const bIm = im[lower];
    re[upper] = c * aRe + sRe * bRe - sIm * bIm;
    im[upper] = c * aIm + sRe * bIm + sIm * bRe;
    re[lower] = c * bRe - sRe * aRe - sIm * aIm;
    im[lower] = c * bIm - sRe * aIm + sIm * aRe;
  }
}

/** Columns j and j + 1 times the rotation that takes the pair [x(row, j + 1), x(row, j)] to [r, 0], in rows from … to - 1. */
export function rotateColumns(x: ComplexFlat, j: number, { c, sRe, sIm }: Rotation, from: number, to: number): void {
  const { n, re, im } = x;
  for (let i = from; i < to; i++) {
    const right = i * n + j + 1;
    const left = right - 1;
    const aRe = re[right];
    const aIm = im[right];
    const bRe = re[left];
    const bIm = im[left];
    re[right] = c * aRe + sRe * bRe - sIm * bIm;
    im[right] = c * aIm + sRe * bIm + sIm * bRe;
    re[left] = c * bRe - sRe * aRe - sIm * aIm;
    im[left] = c * bIm - sRe * aIm + sIm * aRe;
  }
}
