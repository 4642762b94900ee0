import { NumericalError } from "../errors";
import { flatProduct, flatTranspose } from "../linalg/flat";
import { factorLu, solveLu } from "../linalg/lu";
import { flatNorm } from "../linalg/norms";
import { flatSchur } from "../linalg/real-schur";
import { reorderFlat } from "../linalg/reorder-schur";
import { schurValues } from "../linalg/schur-values";
import { solveLyapunovBySchur } from "../linalg/solve-lyapunov";
import { workArray, workCopy } from "../linalg/work-array";
import type { FlatProblem } from "./problem";

/**
 * Stabilising gain for the unstable part of A alone, found mode by mode (a real one or a pair at a time), each moved to at
 * least `shift` of its size inside the boundary: modes that are hard to reach do not spoil the gain for the others.
 *
 * Shapes    → gain m×n (zero when A is stable)
 * Throws    singular or no-convergence when the unstable part cannot be reached
 * Source    Varga, A Schur method for pole assignment, IEEE Trans. Autom. Control 26 (1981) 517-519, with the gain of each
 *           block after Armstrong, ibid. 20 (1975) 153-154; Kleinman, ibid. 19 (1974) 252-254 (sampled)
 */
export function startByGain({ n, m, a, b, sampled }: FlatProblem, shift: number): Float64Array {
  const { t, qt } = flatSchur(a, n);
  // Unstable eigenvalues last: the last rows of qt then carry a system of their own.
  const stable = reorderFlat(t, qt, n, ({ re, im }) => (sampled ? re * re + im * im < 0.99 : re < 0));
  const k = n - stable;
  if (k === 0) return workArray(m * n);
  const rows = qt.subarray(stable * n);
  const au = workArray(k * k);
  for (let i = 0; i < k; i++) for (let j = 0; j < k; j++) au[i * k + j] = t[(stable + i) * n + stable + j];
  const gain = modeByMode(au, flatProduct(rows, b, k, n, m), k, m, sampled, shift);
  return flatProduct(gain, rows, m, k, n);
}

function modeByMode(a: Float64Array, b: Float64Array, k: number, m: number, sampled: boolean, shift: number): Float64Array {
  const gain = workArray(m * k);
  for (let round = 0; round <= k; round++) {
    const pulled = flatProduct(b, gain, k, m, k);
    const loop = a.map((entry, at) => entry - pulled[at]);
    if (!loop.every(Number.isFinite)) break;
    const { t, qt } = flatSchur(loop, k);
    if (reorderFlat(t, qt, k, ({ re, im }) => (sampled ? re * re + im * im < 0.99 : re < 0)) === k) return gain;
    const size = k > 1 && t[k * k - 2] !== 0 ? 2 : 1;
    const rows = qt.subarray((k - size) * k);
    const block = workArray(size * size);
    for (let i = 0; i < size; i++) for (let j = 0; j < size; j++) block[i * size + j] = t[(k - size + i) * k + k - size + j];
    const reached = flatProduct(rows, b, size, k, m);
    const part = sampled ? sampledGain(block, reached, size, m, shift) : continuousGain(block, reached, size, m, shift);
    const more = flatProduct(part, rows, m, size, k);
    for (let i = 0; i < gain.length; i++) gain[i] += more[i];
  }
  throw new NumericalError("no-convergence", { routine: "start-by-gain", limit: k });
}

/** (A + βI) Z + Z (A + βI)' = 2 B B', K = B' Z⁻¹: all poles of A - BK lie at real part -β or on the mirror of it. */
function continuousGain(a: Float64Array, b: Float64Array, k: number, m: number, shift: number): Float64Array {
  const beta = shift * flatNorm(a) + (flatNorm(a) === 0 ? shift : 0);
  const moved = workCopy(a);
  for (let i = 0; i < k; i++) moved[i * k + i] += beta;
  const right = flatProduct(b, flatTranspose(b, k, m), k, m, k).map((x) => -2 * x);
  const z = solveLyapunovBySchur(flatSchur(moved, k), k, right, false);
  return flatTranspose(solveSymmetric(z, b, k, m), k, m);
}

/** A Z A' - Z = B B' for A / α, K = (I + B' P B)⁻¹ B' P A with P = Z⁻¹: z goes to α² / z. */
function sampledGain(a: Float64Array, b: Float64Array, k: number, m: number, shift: number): Float64Array {
  const smallest = Math.min(...schurValues(a, k).map(({ re, im }) => Math.sqrt(re * re + im * im)));
  const alpha = Math.min(smallest, 1) / (1 + shift);
  const grown = a.map((x) => x / alpha);
  const inputs = b.map((x) => x / alpha);
  const right = flatProduct(inputs, flatTranspose(inputs, k, m), k, m, k).map((x) => -x);
  const z = solveLyapunovBySchur(flatSchur(grown, k), k, right, true);
  const pb = solveSymmetric(z, inputs, k, m);
  const whole = flatProduct(flatTranspose(inputs, k, m), pb, m, k, m);
  for (let i = 0; i < m; i++) whole[i * m + i] += 1;
  const factors = factorLu(whole, m);
  return solveLu(factors, flatProduct(flatTranspose(pb, k, m), grown, m, k, k), k);
}

function solveSymmetric(z: Float64Array, b: Float64Array, k: number, m: number): Float64Array {
  const factors = factorLu(z, k);
  if (factors.zeroPivot >= 0) throw new NumericalError("singular", { matrix: "start-by-gain", row: factors.zeroPivot });
  return solveLu(factors, b, m);
}
