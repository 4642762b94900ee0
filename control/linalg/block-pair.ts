import { NumericalError } from "../errors";

/** Room for the system of one pair of diagonal blocks; `right` holds its right side, then its solution, row by row. */
export type BlockPair = { readonly system: Float64Array; readonly right: Float64Array; readonly floor: number };

/**
 * Solves T_ii Y + Y T_jj' = R, or T_ii Y T_jj' - Y = R when sampled, for diagonal blocks of one or two rows, by elimination
 * with partial pivoting. R in `right` is overwritten by Y, p×q row-major.
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
  { system, right, floor }: BlockPair,
): void {
  const a = i * n + i;
  const b = j * n + j;
  if (p === 1 && q === 1) {
    const pivot = sampled ? t[a] * t[b] - 1 : t[a] + t[b];
    if (!(Math.abs(pivot) > floor)) throw new NumericalError("singular", { matrix: "lyapunov", row: i });
    right[0] /= pivot;
    return;
  }
  if (p === 2 && q === 2) fillFour(t, n, a, b, sampled, system);
  else fillTwo(t, n, p === 2 ? a : b, p === 2 ? t[b] : t[a], sampled, system);
  eliminate(system, right, p * q, floor, i);
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
