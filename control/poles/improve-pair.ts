import type { Admissible } from "./admissible-vectors";
import { dotRow, type Frame, replacePair } from "./eigenvector-frame";
import { projectRow } from "./improve-real";
import { minimiseSmooth } from "./minimise-smooth";
import { pairCost } from "./pair-cost";
import { pairMetric } from "./pair-metric";
import type { PairForms, Scratch } from "./search-scratch";

/** At most this many quasi-Newton steps each time a pair is visited. */
const STEPS_PER_VISIT = 3;

/**
 * Turns the columns of a pair to where the determinant of the eigenvectors is largest; returns by how much it grew.
 * With α = y₁'S z and β = y₂'S z it is 2 Im(ᾱ β), whose largest value over unit z is an eigenvalue of a 2×2 pencil.
 */
export function raiseDeterminantPair(frame: Frame, admissible: Admissible, scratch: Scratch): number {
  const { n, duals } = frame;
  const { size, pole } = admissible;
  const { a: p, b: q } = scratch;
  projectComplex(duals, pole.column * n, admissible, n, p);
  projectComplex(duals, (pole.column + 1) * n, admissible, n, q);
  const g11 = dotRow(p, 0, p, 0, 2 * size);
  const g22 = dotRow(q, 0, q, 0, 2 * size);
  const re = dotRow(p, 0, q, 0, 2 * size);
  let im = 0;
  for (let k = 0; k < size; k++) im += p[size + k] * q[k] - p[k] * q[size + k];
  const root = Math.sqrt(Math.max(0, g11 * g22 - re * re));
  const mu = im > 0 ? -im - root : -im + root;
  if (!(Math.abs(mu) > 0)) return 1;
  const z = scratch.row;
  for (let k = 0; k < size; k++) {
    z[k] = re * p[k] + (im + mu) * p[size + k] - g11 * q[k];
    z[size + k] = (im + mu) * p[k] - re * p[size + k] + g11 * q[size + k];
  }
  return putPair(frame, admissible, z, scratch) ? Math.abs(mu) : 1;
}

/**
 * Turns the columns of a pair towards the admissible unit eigenvector with the least |X⁻¹|, all other columns held.
 *
 * Shapes    S n×k complex, X n×n
 * Units     none
 * Throws    nothing; a step that rounding spoils is not taken
 * Accuracy  a few descent steps, never uphill
 * Source    in the spirit of Byers & Nash, Int. J. Control 49 (1989) 97-117
 */
export function lowerConditionPair(frame: Frame, admissible: Admissible, scratch: Scratch): void {
  const { forms, descent, products } = scratch;
  const { size } = admissible;
  if (!fillForms(frame, admissible, scratch)) return;
  setCoordinates(frame, admissible, descent.x);
  if (!pairMetric(forms, descent.x, descent.inverse)) return;
  const cost = (x: Float64Array, gradient: Float64Array) => pairCost(forms, x, gradient, products);
  if (minimiseSmooth(cost, descent, 2 * size, STEPS_PER_VISIT)) putPair(frame, admissible, descent.x, scratch);
}

/** The forms that |X⁻¹|² is made of while one pair turns; false when its dual plane has collapsed. */
function fillForms({ n, duals, norms }: Frame, admissible: Admissible, { forms, u: e1, v: e2, row }: Scratch): boolean {
  const { size, pole } = admissible;
  const first = pole.column * n;
  const scale = 1 / Math.sqrt(norms[pole.column]);
  for (let k = 0; k < n; k++) e1[k] = duals[first + k] * scale;
  const overlap = dotRow(duals, first + n, e1, 0, n);
  for (let k = 0; k < n; k++) e2[k] = duals[first + n + k] - overlap * e1[k];
  const length = Math.sqrt(dotRow(e2, 0, e2, 0, n));
  if (!(length > 0) || !Number.isFinite(1 / length)) return false;
  for (let k = 0; k < n; k++) e2[k] /= length;
  const { a, b } = forms;
  projectComplex(e1, 0, admissible, n, a);
  projectComplex(e2, 0, admissible, n, b);
  startForms(forms);
  for (let i = 0; i < n; i++) {
    if (i === pole.column || i === pole.column + 1) continue;
    const alongFirst = dotRow(duals, i * n, e1, 0, n);
    const alongSecond = dotRow(duals, i * n, e2, 0, n);
    projectComplex(duals, i * n, admissible, n, row);
    for (let k = 0; k < 2 * size; k++) row[k] -= alongFirst * a[k] + alongSecond * b[k];
    addProducts(forms, row);
  }
  mirrorForms(forms);
  return true;
}

function startForms({ size, pRe, pIm, rRe, rIm }: PairForms): void {
  for (let at = 0; at < size * size; at++) {
    pRe[at] = at % (size + 1) === 0 ? 1 : 0;
    pIm[at] = 0;
    rRe[at] = 0;
    rIm[at] = 0;
  }
}

/** Lower triangles only. */
function addProducts({ size, pRe, pIm, rRe, rIm }: PairForms, v: Float64Array): void {
  for (let k = 0; k < size; k++) {
    const re = v[k];
    const im = v[size + k];
    for (let l = 0, at = k * size; l <= k; l++, at++) {
      const rr = re * v[l];
      const ii = im * v[size + l];
      const ri = re * v[size + l];
      const ir = im * v[l];
      pRe[at] += rr + ii;
      pIm[at] += ri - ir;
      rRe[at] += rr - ii;
      rIm[at] += ri + ir;
    }
  }
}

function mirrorForms({ size, pRe, pIm, rRe, rIm }: PairForms): void {
  for (let k = 0; k < size; k++) {
    for (let l = 0; l < k; l++) {
      const at = k * size + l;
      const mirror = l * size + k;
      pRe[mirror] = pRe[at];
      pIm[mirror] = -pIm[at];
      rRe[mirror] = rRe[at];
      rIm[mirror] = rIm[at];
    }
  }
}

/** y'S for a real row y: real parts, then imaginary parts. */
function projectComplex(rows: Float64Array, at: number, { size, re, im }: Admissible, n: number, out: Float64Array): void {
  projectRow(rows, at, re, n, size, out, 0);
  projectRow(rows, at, im, n, size, out, size);
}

/** Sᴴx of the eigenvector that stands in the frame now. */
function setCoordinates({ n, columns }: Frame, { size, re, im, pole }: Admissible, z: Float64Array): void {
  for (let k = 0; k < 2 * size; k++) z[k] = 0;
  const u = pole.column * n;
  for (let i = 0; i < n; i++) {
    const x = columns[u + i] * Math.SQRT1_2;
    const y = columns[u + n + i] * Math.SQRT1_2;
    for (let k = 0; k < size; k++) {
      z[k] += re[i * size + k] * x + im[i * size + k] * y;
      z[size + k] += re[i * size + k] * y - im[i * size + k] * x;
    }
  }
}

function putPair(frame: Frame, { size, re, im, pole }: Admissible, z: Float64Array, { u, v }: Scratch): boolean {
  const { n } = frame;
  const factor = Math.SQRT2 / Math.sqrt(dotRow(z, 0, z, 0, 2 * size));
  for (let i = 0; i < n; i++) {
    let x = 0;
    let y = 0;
    for (let k = 0, at = i * size; k < size; k++, at++) {
      x += re[at] * z[k] - im[at] * z[size + k];
      y += re[at] * z[size + k] + im[at] * z[k];
    }
    u[i] = x * factor;
    v[i] = y * factor;
  }
  return replacePair(frame, pole.column, u, v);
}
