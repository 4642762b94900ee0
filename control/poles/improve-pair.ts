import type { Admissible } from "./admissible-vectors";
import { dotRow, type Frame, replacePair } from "./eigenvector-frame";
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
  projectComplex(duals, pole.column * n, admissible, n, p, 0);
  projectComplex(duals, (pole.column + 1) * n, admissible, n, q, 0);
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
function fillForms({ n, duals, norms }: Frame, admissible: Admissible, { forms, u: e1, v: e2, rows }: Scratch): boolean {
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
  projectComplex(e1, 0, admissible, n, a, 0);
  projectComplex(e2, 0, admissible, n, b, 0);
  let end = 0;
  for (let i = 0; i < n; i++) {
    if (i === pole.column || i === pole.column + 1) continue;
    let alongFirst = 0;
    let alongSecond = 0;
    for (let k = 0, at = i * n; k < n; k++, at++) {
      alongFirst += duals[at] * e1[k];
      alongSecond += duals[at] * e2[k];
    }
    projectComplex(duals, i * n, admissible, n, rows, end);
    for (let k = 0; k < 2 * size; k++) rows[end + k] -= alongFirst * a[k] + alongSecond * b[k];
    end += 2 * size;
  }
  sumProducts(forms, rows, end);
  mirrorForms(forms);
  return true;
}

/** P = I + Σ v̄ v' and R = Σ v v' over rows v, lower triangles only. */
function sumProducts({ size, pRe, pIm, rRe, rIm }: PairForms, rows: Float64Array, end: number): void {
  for (let k = 0; k < size; k++) {
    for (let l = 0, at = k * size; l <= k; l++, at++) {
      let [sumPRe, sumPIm, sumRRe, sumRIm] = [k === l ? 1 : 0, 0, 0, 0];
      for (let row = 0; row < end; row += 2 * size) {
        const re = rows[row + k];
        const im = rows[row + size + k];
        const rr = re * rows[row + l];
        const ii = im * rows[row + size + l];
        const ri = re * rows[row + size + l];
        const ir = im * rows[row + l];
        sumPRe += rr + ii;
        sumPIm += ri - ir;
        sumRRe += rr - ii;
        sumRIm += ri + ir;
      }
      pRe[at] = sumPRe;
      pIm[at] = sumPIm;
      rRe[at] = sumRRe;
      rIm[at] = sumRIm;
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

/** y'S for a real row y, into `out` from `to` on: real parts, then imaginary parts. */
function projectComplex(
  rows: Float64Array,
  at: number,
  { size, re, im }: Admissible,
  n: number,
  out: Float64Array,
  to: number,
): void {
  let k = 0;
  for (; k + 1 < size; k += 2) {
    let [firstRe, secondRe, firstIm, secondIm] = [0, 0, 0, 0];
    for (let i = 0, from = k; i < n; i++, from += size) {
      const y = rows[at + i];
      firstRe += y * re[from];
      secondRe += y * re[from + 1];
      firstIm += y * im[from];
      secondIm += y * im[from + 1];
    }
    out[to + k] = firstRe;
    out[to + k + 1] = secondRe;
    out[to + size + k] = firstIm;
    out[to + size + k + 1] = secondIm;
  }
  if (k === size) return;
  let [lastRe, lastIm] = [0, 0];
  for (let i = 0, from = k; i < n; i++, from += size) {
    lastRe += rows[at + i] * re[from];
    lastIm += rows[at + i] * im[from];
  }
  out[to + k] = lastRe;
  out[to + size + k] = lastIm;
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
