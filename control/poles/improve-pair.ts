import type { Admissible } from "./admissible-vectors";
import { dotRow, type Frame, replacePair } from "./eigenvector-frame";
import { minimiseSmooth } from "./minimise-smooth";
import { type PairForms, pairCost } from "./pair-cost";

/** At most this many quasi-Newton steps each time a pair is visited. */
const STEPS_PER_VISIT = 6;

/**
 * Turns the columns of a pair to where the determinant of the eigenvectors is largest; returns by how much it grew.
 * With α = y₁'S z and β = y₂'S z it is 2 Im(ᾱ β), whose largest value over unit z is an eigenvalue of a 2×2 pencil.
 */
export function raiseDeterminantPair(frame: Frame, admissible: Admissible): number {
  const { n, duals } = frame;
  const { size, pole } = admissible;
  const p = projectedRow(duals, pole.column * n, admissible, n);
  const q = projectedRow(duals, (pole.column + 1) * n, admissible, n);
  const g11 = dotRow(p, 0, p, 0, 2 * size);
  const g22 = dotRow(q, 0, q, 0, 2 * size);
  const re = dotRow(p, 0, q, 0, 2 * size);
  let im = 0;
  for (let k = 0; k < size; k++) im += p[size + k] * q[k] - p[k] * q[size + k];
  const root = Math.sqrt(Math.max(0, g11 * g22 - re * re));
  const mu = im > 0 ? -im - root : -im + root;
  if (!(Math.abs(mu) > 0)) return 1;
  const z = new Float64Array(2 * size);
  for (let k = 0; k < size; k++) {
    z[k] = re * p[k] + (im + mu) * p[size + k] - g11 * q[k];
    z[size + k] = (im + mu) * p[k] - re * p[size + k] + g11 * q[size + k];
  }
  return putPair(frame, admissible, z) ? Math.abs(mu) : 1;
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
export function lowerConditionPair(frame: Frame, admissible: Admissible): void {
  const forms = pairForms(frame, admissible);
  if (!forms) return;
  const start = coordinates(frame, admissible);
  const z = minimiseSmooth((x, gradient) => pairCost(forms, x, gradient), start, STEPS_PER_VISIT);
  if (z) putPair(frame, admissible, z);
}

/** The forms that |X⁻¹|² is made of while one pair turns; null when its dual plane has collapsed. */
function pairForms({ n, duals, norms }: Frame, admissible: Admissible): PairForms | null {
  const { size, pole } = admissible;
  const first = pole.column * n;
  const e1 = scaledRow(duals, first, 1 / Math.sqrt(norms[pole.column]), n);
  const overlap = dotRow(duals, first + n, e1, 0, n);
  const rest = Float64Array.from({ length: n }, (_, k) => duals[first + n + k] - overlap * e1[k]);
  const restLength = Math.sqrt(dotRow(rest, 0, rest, 0, n));
  if (!(restLength > 0) || !Number.isFinite(1 / restLength)) return null;
  const e2 = scaledRow(rest, 0, 1 / restLength, n);
  const a = projectedRow(e1, 0, admissible, n);
  const b = projectedRow(e2, 0, admissible, n);
  const forms = {
    size,
    a,
    b,
    pRe: new Float64Array(size * size),
    pIm: new Float64Array(size * size),
    rRe: new Float64Array(size * size),
    rIm: new Float64Array(size * size),
  };
  for (let k = 0; k < size; k++) forms.pRe[k * size + k] = 1;
  for (let i = 0; i < n; i++) {
    if (i === pole.column || i === pole.column + 1) continue;
    const alongFirst = dotRow(duals, i * n, e1, 0, n);
    const alongSecond = dotRow(duals, i * n, e2, 0, n);
    const v = projectedRow(duals, i * n, admissible, n);
    for (let k = 0; k < 2 * size; k++) v[k] -= alongFirst * a[k] + alongSecond * b[k];
    addProducts(forms, v);
  }
  return forms;
}

function addProducts({ size, pRe, pIm, rRe, rIm }: PairForms, v: Float64Array): void {
  for (let k = 0; k < size; k++) {
    const re = v[k];
    const im = v[size + k];
    for (let l = 0; l < size; l++) {
      const at = k * size + l;
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

/** y'S for a real row y: real parts, then imaginary parts. */
function projectedRow(rows: Float64Array, at: number, { size, re, im }: Admissible, n: number): Float64Array {
  const out = new Float64Array(2 * size);
  for (let i = 0; i < n; i++) {
    const y = rows[at + i];
    for (let k = 0; k < size; k++) {
      out[k] += y * re[i * size + k];
      out[size + k] += y * im[i * size + k];
    }
  }
  return out;
}

function scaledRow(rows: Float64Array, at: number, factor: number, n: number): Float64Array {
  return rows.slice(at, at + n).map((entry) => entry * factor);
}

/** Sᴴx of the eigenvector that stands in the frame now. */
function coordinates({ n, columns }: Frame, { size, re, im, pole }: Admissible): Float64Array {
  const z = new Float64Array(2 * size);
  const u = pole.column * n;
  for (let i = 0; i < n; i++) {
    const x = columns[u + i] * Math.SQRT1_2;
    const y = columns[u + n + i] * Math.SQRT1_2;
    for (let k = 0; k < size; k++) {
      z[k] += re[i * size + k] * x + im[i * size + k] * y;
      z[size + k] += re[i * size + k] * y - im[i * size + k] * x;
    }
  }
  return z;
}

function putPair(frame: Frame, { size, re, im, pole }: Admissible, z: Float64Array): boolean {
  const { n } = frame;
  const factor = Math.SQRT2 / Math.sqrt(dotRow(z, 0, z, 0, 2 * size));
  const u = new Float64Array(n);
  const v = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < size; k++) {
      u[i] += re[i * size + k] * z[k] - im[i * size + k] * z[size + k];
      v[i] += re[i * size + k] * z[size + k] + im[i * size + k] * z[k];
    }
    u[i] *= factor;
    v[i] *= factor;
  }
  return replacePair(frame, pole.column, u, v);
}
