import { NumericalError } from "../errors";

/** Room for the system of one pair of diagonal blocks; `right` holds its right side, then its solution, row by row. */
export type BlockPair = { readonly system: Float64Array; readonly right: Float64Array; readonly floor: number };

/** A determinant beyond these has lost digits to the ends of the number range, or tells of eigenvalues that cancel. */
const SMALL = 1e-250;
const LARGE = 1e250;

/**
 * Solves T_ii Y + Y T_jj' = R, or T_ii Y T_jj' - Y = R when sampled, for diagonal blocks of one row or two in standard form.
 * R in `right` is overwritten by Y, p×q row-major.
 *
 * The blocks are a I + N and d I + P with N² = bc I and P² = ef I, so that the system is [U bV; cV U] with U and V in I and P:
 * it is solved by U² - bc V² = g I + h P, whose determinant g² - h² ef has no cancellation.
 *
 * Throws    singular with the row of block i when a pivot is not above the floor: two eigenvalues cancel
 */
export function solveBlockPair(
  t: Float64Array,
  n: number,
  i: number,
  p: number,
  j: number,
  q: number,
  sampled: boolean,
  pair: BlockPair,
): void {
  const { right, floor } = pair;
  const ti = i * n + i;
  const tj = j * n + j;
  const a = t[ti];
  const d = t[tj];
  const u = sampled ? a * d - 1 : a + d;
  if (p === 1 && q === 1) {
    if (!(Math.abs(u) > floor)) throw new NumericalError("singular", { matrix: "lyapunov", row: i });
    right[0] /= u;
    return;
  }
  const b = p === 2 ? t[ti + 1] : 0;
  const c = p === 2 ? t[ti + n] : 0;
  const e = q === 2 ? t[tj + 1] : 0;
  const f = q === 2 ? t[tj + n] : 0;
  const uP = sampled ? a : 1;
  const v = sampled ? d : 1;
  const vP = sampled ? 1 : 0;
  const ef = e * f;
  const bc = b * c;
  const g = u * u + uP * uP * ef - bc * (v * v + vP * vP * ef);
  const h = 2 * (u * uP - bc * v * vP);
  const determinant = g * g - h * h * ef;
  if (!(determinant > SMALL && determinant < LARGE)) {
    if (p === 2 && q === 2) fillFour(t, n, ti, tj, sampled, pair.system);
    else fillTwo(t, n, p === 2 ? ti : tj, p === 2 ? d : a, sampled, pair.system);
    eliminate(pair.system, right, p * q, floor, i);
    return;
  }
  const [x1, y1, x2, y2] = [right[0], q === 2 ? right[1] : 0, p === 2 ? right[q] : 0, p * q === 4 ? right[3] : 0];
  // First U r - (b or c) V r of the other row, then times g I - h P over the determinant.
  const r1 = u * x1 + uP * e * y1 - b * (v * x2 + vP * e * y2);
  const s1 = u * y1 + uP * f * x1 - b * (v * y2 + vP * f * x2);
  const r2 = u * x2 + uP * e * y2 - c * (v * x1 + vP * e * y1);
  const s2 = u * y2 + uP * f * x2 - c * (v * y1 + vP * f * x1);
  right[0] = (g * r1 - h * e * s1) / determinant;
  if (q === 2) right[1] = (g * s1 - h * f * r1) / determinant;
  if (p === 2) right[q] = (g * r2 - h * e * s2) / determinant;
  if (p * q === 4) right[3] = (g * s2 - h * f * r2) / determinant;
}

/** One block of two rows at k beside a single eigenvalue. */
function fillTwo(t: Float64Array, n: number, k: number, single: number, sampled: boolean, m: Float64Array): void {
  const factor = sampled ? single : 1;
  const shift = sampled ? -1 : single;
  m[0] = t[k] * factor + shift;
  m[1] = t[k + 1] * factor;
  m[2] = t[k + n] * factor;
  m[3] = t[k + n + 1] * factor + shift;
}

/** Two blocks of two rows: unknowns Y11, Y12, Y21, Y22. */
function fillFour(t: Float64Array, n: number, a: number, b: number, sampled: boolean, m: Float64Array): void {
  for (let row = 0; row < 2; row++) {
    for (let k = 0; k < 2; k++) {
      const left = t[a + row * n + k];
      const at = 8 * row + 2 * k;
      const same = row === k ? 1 : 0;
      if (sampled) {
        m[at] = left * t[b] - same;
        m[at + 1] = left * t[b + 1];
        m[at + 4] = left * t[b + n];
        m[at + 5] = left * t[b + n + 1] - same;
      } else {
        m[at] = left + same * t[b];
        m[at + 1] = same * t[b + 1];
        m[at + 4] = same * t[b + n];
        m[at + 5] = left + same * t[b + n + 1];
      }
    }
  }
}

/** Partial pivoting. */
function eliminate(a: Float64Array, b: Float64Array, n: number, floor: number, row: number): void {
  for (let k = 0; k < n; k++) {
    let best = k;
    let size = Math.abs(a[k * n + k]);
    for (let i = k + 1; i < n; i++) {
      const other = Math.abs(a[i * n + k]);
      if (other > size) {
        best = i;
        size = other;
      }
    }
    if (!(size > floor)) throw new NumericalError("singular", { matrix: "lyapunov", row });
    if (best !== k) exchange(a, b, n, k, best);
    const pivot = a[k * n + k];
    for (let i = k + 1; i < n; i++) {
      const entry = a[i * n + k];
      if (entry === 0) continue;
      const factor = entry / pivot;
      for (let j = k + 1; j < n; j++) a[i * n + j] -= factor * a[k * n + j];
      b[i] -= factor * b[k];
    }
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = b[i];
    for (let j = i + 1; j < n; j++) sum -= a[i * n + j] * b[j];
    b[i] = sum / a[i * n + i];
  }
}

function exchange(a: Float64Array, b: Float64Array, n: number, i: number, j: number): void {
  for (let c = i; c < n; c++) {
    const x = a[i * n + c];
    a[i * n + c] = a[j * n + c];
    a[j * n + c] = x;
  }
  const y = b[i];
  b[i] = b[j];
  b[j] = y;
}
