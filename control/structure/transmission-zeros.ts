import { modulus } from "../linalg/complex";
import { eigenvalues } from "../linalg/eigenvalues";
import { toFlat } from "../linalg/flat";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import type { Complex } from "../plant/model";
import type { System } from "../plant/scale-plant";
import { balanceSystem } from "./balance-system";
import { compressRows } from "./compress-rows";
import { pencilEigenvalues } from "./pencil-eigenvalues";
import { type FlatSystem, reduceSystem } from "./reduce-system";
import { reflectColumns } from "./reflections";

/**
 * Zeros from inputs to outputs: the values of s at which [A - sI, B; C, D] loses rank, hidden modes among them.
 * Systems with more outputs than inputs, or the reverse, and systems that lose rank everywhere, are handled.
 *
 * Shapes    A n×n, B n×m, C p×n, D p×m → at most n values, conjugate pairs exactly conjugate, sorted by real part
 * Units     those of A
 * Throws    shape-mismatch; not-finite; no-convergence
 * Accuracy  exact for a system within c (n + m + p) ε of the balanced one; units spread over 1e6 and more are balanced away
 * Source    Emami-Naeini & Van Dooren, Automatica 18 (1982) 415-430
 */
export function transmissionZeros({ A, B, C, D }: System): Complex[] {
  const n = A.rows;
  requireSquare("A", A);
  requireShape("B", B, n, B.columns);
  requireShape("C", C, C.rows, n);
  requireShape("D", D, C.rows, B.columns);
  for (const [name, M] of Object.entries({ A, B, C, D })) requireFinite(name, M);
  if (B.columns === 0 || C.rows === 0) return [];
  const system = { n, m: B.columns, p: C.rows, a: toFlat(A), b: toFlat(B), c: toFlat(C), d: toFlat(D) };
  const fastest = eigenvalues(A).reduce((size, pole) => Math.max(size, modulus(pole)), 0);
  const { timeScale, ...balanced } = balanceSystem(system, fastest);
  return zerosOfReduced(reduceSystem(balanced))
    .map(({ re, im }) => ({ re: re / timeScale, im: im / timeScale }))
    .filter(({ re, im }) => Number.isFinite(re) && Number.isFinite(im))
    .sort((x, y) => x.re - y.re || Math.abs(x.im) - Math.abs(y.im) || y.im - x.im);
}

/** Outputs held at zero by the invertible feed-through: what is left is a pencil of the size of the states. */
function zerosOfReduced({ n, m, a, b, c, d }: FlatSystem): Complex[] {
  if (n === 0) return [];
  const width = n + m;
  const held = new Float64Array(width * m);
  for (let k = 0; k < m; k++) {
    for (let j = 0; j < n; j++) held[j * m + k] = c[k * n + j];
    for (let j = 0; j < m; j++) held[(n + j) * m + k] = d[k * m + j];
  }
  const system = new Float64Array(n * width);
  const unit = new Float64Array(n * width);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) system[i * width + j] = a[i * n + j];
    for (let j = 0; j < m; j++) system[i * width + n + j] = b[i * m + j];
    unit[i * width + i] = 1;
  }
  for (const reflection of compressRows(held, width, m, -1, 0).reflections) {
    reflectColumns(system, width, reflection);
    reflectColumns(unit, width, reflection);
  }
  const last = (x: Float64Array) => {
    const part = new Float64Array(n * n);
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) part[i * n + j] = x[i * width + m + j];
    return part;
  };
  return pencilEigenvalues(last(system), last(unit), n);
}
