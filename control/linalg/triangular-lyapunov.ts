import { NumericalError } from "../errors";
import { largestEntry } from "./flat";
import { blockSize } from "./schur-values";

/**
 * Solves T Y + Y T' = C, or T Y T' - Y = C when sampled, for quasi-triangular T and symmetric C; C is overwritten by Y.
 *
 * Shapes    t n×n, c n×n
 * Throws    singular with the row of the block where two eigenvalues cancel (sum zero, or product one when sampled)
 * Accuracy  residual c n ε |T||Y|; 2 n³ flops
 * Source    Bartels & Stewart, Commun. ACM 15 (1972) 820-826; Barraud, IEEE Trans. Autom. Control 22 (1977) 883-885
 */
export function solveTriangularLyapunov(t: Float64Array, n: number, c: Float64Array, sampled: boolean): void {
  const starts: number[] = [];
  for (let k = 0; k < n; k += blockSize(t, n, k)) starts.push(k);
  const system = new Float64Array(16);
  const right = new Float64Array(4);
  const size = largestEntry(t);
  const floor = Number.MIN_VALUE + Number.EPSILON * Number.EPSILON * (sampled ? 1 + size * size : size);
  const gathered = sampled ? new Float64Array(2 * n) : null;
  for (let bj = starts.length - 1; bj >= 0; bj--) {
    const j = starts[bj];
    const q = (starts[bj + 1] ?? n) - j;
    if (gathered) gatherColumns(t, n, c, j, q, gathered);
    for (let bi = bj; bi >= 0; bi--) {
      const i = starts[bi];
      const p = (starts[bi + 1] ?? n) - i;
      if (gathered) sampledRight(t, n, c, i, p, j, q, gathered, right);
      else continuousRight(t, n, c, i, p, j, q, right);
      if (p === 1 && q === 1) {
        const pivot = sampled ? t[i * n + i] * t[j * n + j] - 1 : t[i * n + i] + t[j * n + j];
        if (!(Math.abs(pivot) > floor)) throw new NumericalError("singular", { matrix: "lyapunov", row: i });
        right[0] /= pivot;
      } else {
        fillSystem(t, n, i, p, j, q, sampled, system);
        solveTiny(system, right, p * q, floor, i);
      }
      for (let a = 0; a < p; a++) for (let b = 0; b < q; b++) c[(i + a) * n + j + b] = c[(j + b) * n + i + a] = right[a * q + b];
      if (gathered) extendGathered(t, n, i, p, j, q, right, gathered);
    }
  }
}

/** C_ij - Σ_{k after i} T_ik Y_kj - Σ_{k after j} Y_ik T_jk, both sums along rows thanks to symmetry. */
function continuousRight(
  t: Float64Array,
  n: number,
  c: Float64Array,
  i: number,
  p: number,
  j: number,
  q: number,
  right: Float64Array,
): void {
  for (let a = 0; a < p; a++) {
    for (let b = 0; b < q; b++) {
      let sum = c[(i + a) * n + j + b];
      for (let k = i + p; k < n; k++) sum -= t[(i + a) * n + k] * c[(j + b) * n + k];
      for (let k = j + q; k < n; k++) sum -= t[(j + b) * n + k] * c[(i + a) * n + k];
      right[a * q + b] = sum;
    }
  }
}

/** For every row k: Σ_{l after j} Y_kl T_jl, plus Y_kj T_jj' for the rows below block j. */
function gatherColumns(t: Float64Array, n: number, y: Float64Array, j: number, q: number, gathered: Float64Array): void {
  for (let k = 0; k < n; k++) {
    for (let b = 0; b < q; b++) {
      let sum = 0;
      for (let l = k >= j + q ? j : j + q; l < n; l++) sum += y[k * n + l] * t[(j + b) * n + l];
      gathered[k * q + b] = sum;
    }
  }
}

/** Adds Y_ij T_jj' once block (i, j) is known. */
function extendGathered(
  t: Float64Array,
  n: number,
  i: number,
  p: number,
  j: number,
  q: number,
  known: Float64Array,
  gathered: Float64Array,
): void {
  for (let a = 0; a < p; a++) {
    for (let b = 0; b < q; b++) {
      for (let l = 0; l < q; l++) gathered[(i + a) * q + b] += known[a * q + l] * t[(j + b) * n + j + l];
    }
  }
}

function sampledRight(
  t: Float64Array,
  n: number,
  c: Float64Array,
  i: number,
  p: number,
  j: number,
  q: number,
  gathered: Float64Array,
  right: Float64Array,
): void {
  for (let a = 0; a < p; a++) {
    for (let b = 0; b < q; b++) {
      let sum = c[(i + a) * n + j + b];
      for (let k = i; k < n; k++) sum -= t[(i + a) * n + k] * gathered[k * q + b];
      right[a * q + b] = sum;
    }
  }
}

/** T_ii Y + Y T_jj' or T_ii Y T_jj' - Y as a system for the p·q entries of Y, row by row. */
function fillSystem(
  t: Float64Array,
  n: number,
  i: number,
  p: number,
  j: number,
  q: number,
  sampled: boolean,
  system: Float64Array,
): void {
  const unknowns = p * q;
  system.fill(0);
  for (let a = 0; a < p; a++) {
    for (let b = 0; b < q; b++) {
      const row = (a * q + b) * unknowns;
      for (let k = 0; k < p; k++) {
        for (let l = 0; l < q; l++) {
          const left = t[(i + a) * n + i + k];
          const other = t[(j + b) * n + j + l];
          if (sampled) system[row + k * q + l] += left * other - (k === a && l === b ? 1 : 0);
          else system[row + k * q + l] += (l === b ? left : 0) + (k === a ? other : 0);
        }
      }
    }
  }
}

/** Gaussian elimination with partial pivoting for at most four unknowns. */
function solveTiny(a: Float64Array, b: Float64Array, n: number, floor: number, row: number): void {
  for (let k = 0; k < n; k++) {
    let best = k;
    for (let i = k + 1; i < n; i++) if (Math.abs(a[i * n + k]) > Math.abs(a[best * n + k])) best = i;
    if (!(Math.abs(a[best * n + k]) > floor)) throw new NumericalError("singular", { matrix: "lyapunov", row });
    if (best !== k) {
      for (let j = k; j < n; j++) [a[k * n + j], a[best * n + j]] = [a[best * n + j], a[k * n + j]];
      [b[k], b[best]] = [b[best], b[k]];
    }
    for (let i = k + 1; i < n; i++) {
      const factor = a[i * n + k] / a[k * n + k];
      for (let j = k + 1; j < n; j++) a[i * n + j] -= factor * a[k * n + j];
      b[i] -= factor * b[k];
    }
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let j = i + 1; j < n; j++) b[i] -= a[i * n + j] * b[j];
    b[i] /= a[i * n + i];
  }
}
