import { NumericalError } from "../errors";
import { balance } from "../linalg/balance";
import { modulus } from "../linalg/complex";
import { complexSingularValues, singularRoom } from "../linalg/complex-singular-values";
import { flatProduct, flatTranspose } from "../linalg/flat";
import { francisIteration } from "../linalg/francis";
import { reduceToHessenberg } from "../linalg/hessenberg";
import { factorLu, solveLu } from "../linalg/lu";
import { flatNorm } from "../linalg/norms";
import { timesPowerOfTwo } from "../linalg/power-of-two";
import { schurValues } from "../linalg/schur-values";
import type { BoundaryForm } from "./boundary-form";
import { invertedValues } from "./inverted-values";
import { rising } from "./partition";
import { searchShifts } from "./search-shifts";

/** Eigenvalues this near the axis, relative to their size, are looked at: too many cost an evaluation, too few a peak. */
const NEAR_AXIS = 1e-4;
/** A level this near, relatively, to a singular value of D costs the Hamiltonian half its digits. */
const NEAR_FEED_THROUGH = 2 ** -10;

/**
 * Coordinates of the boundary at which some singular value of G may equal `level` (in units of 2^size): imaginary parts of
 * the Hamiltonian's eigenvalues on or near the axis. The test errs on the side of naming too many; whoever asks evaluates.
 *
 * Shapes    rising, without repeats, all ≥ 0
 * Throws    no-convergence
 * Accuracy  an eigenvalue counts as near the axis within 1e-4 of its size or √ε of the Hamiltonian's norm
 * Source    Boyd, Balakrishnan & Kabamba, Math. Control Signals Systems 2 (1989) 207-219
 */
export function levelFrequencies(form: BoundaryForm, level: number): number[] {
  const { n, rate } = form;
  if (n === 0) return [];
  if (meetsFeedThrough(form, level)) return invertedPlaces(form, level);
  const H = hamiltonian(form, level);
  if (!H.every(Number.isFinite)) throw new NumericalError("too-large", { what: "gain", limit: Number.MAX_VALUE });
  const { matrix, shift } = balance(H, 2 * n);
  const near = Math.sqrt(Number.EPSILON) * (flatNorm(matrix) / Math.sqrt(2 * n));
  reduceToHessenberg(matrix, 2 * n, null);
  francisIteration(matrix, 2 * n, false, null);
  return rising(
    schurValues(matrix, 2 * n)
      .filter(({ re, im }) => im >= 0 && Math.abs(re) <= Math.max(near, NEAR_AXIS * im))
      .map(({ im }) => timesPowerOfTwo(im, -shift - rate))
      .filter(Number.isFinite),
  );
}

/** Whether I - D'D is too near singular, beside the level, for a Hamiltonian that contains its inverse. */
function meetsFeedThrough({ m, p, d }: BoundaryForm, level: number): boolean {
  const values = complexSingularValues(d, new Float64Array(d.length), singularRoom(p, m));
  return values.some((value) => Math.abs(value - level) < NEAR_FEED_THROUGH * level);
}

/**
 * The same places from the pencil that needs no inverse of I - D'D, inverted about three real numbers. Eigenvalues off the
 * axis are named too: they come with less accuracy, and it is the evaluation that decides.
 */
function invertedPlaces({ n, m, p, a, b, c, d, rate, poleSizes }: BoundaryForm, level: number): number[] {
  const root = Math.sqrt(level);
  const [B, C, D] = [b.map((x) => x / root), c.map((x) => x / root), d.map((x) => x / level)];
  const Ct = flatTranspose(C, p, n);
  const [CC, CD] = [flatProduct(Ct, C, n, p, n), flatProduct(Ct, D, n, p, m)];
  const DD = flatProduct(flatTranspose(D, p, m), D, m, p, m);
  const width = 2 * n + m;
  const pencil = new Float64Array(width * width);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      pencil[i * width + j] = a[i * n + j];
      pencil[(n + j) * width + n + i] = -a[i * n + j];
      pencil[(n + i) * width + j] = -CC[i * n + j];
    }
    for (let j = 0; j < m; j++) {
      pencil[i * width + 2 * n + j] = pencil[(2 * n + j) * width + n + i] = B[i * m + j];
      pencil[(n + i) * width + 2 * n + j] = -CD[i * m + j];
      pencil[(2 * n + j) * width + i] = CD[i * m + j];
    }
  }
  for (let i = 0; i < m; i++) {
    for (let j = 0; j < m; j++) pencil[(2 * n + i) * width + 2 * n + j] = DD[i * m + j] - (i === j ? 1 : 0);
  }
  const places = searchShifts(poleSizes).flatMap((sigma) => placesAbout(pencil, width, 2 * n, sigma));
  return rising(places.map((v) => timesPowerOfTwo(v, -rate)).filter((v) => v > 0 && Number.isFinite(v)));
}

/** Imaginary parts and sizes of the finite eigenvalues of the pencil whose last width - order rows have no derivative. */
function placesAbout(pencil: Float64Array, width: number, order: number, sigma: number): number[] {
  const shifted = pencil.slice();
  const right = new Float64Array(width * order);
  for (let i = 0; i < order; i++) {
    shifted[i * width + i] -= sigma;
    right[i * order + i] = 1;
  }
  const factors = factorLu(shifted, width);
  if (factors.zeroPivot >= 0) return [];
  const inverse = solveLu(factors, right, order).subarray(0, order * order);
  if (!inverse.every(Number.isFinite)) return [];
  return invertedValues(inverse, order).flatMap((value) => {
    const moved = { re: sigma + value.re, im: value.im };
    return [Math.abs(moved.im), modulus(moved)];
  });
}

/** [F, B S B'; -C' T C, -F'] for G over level, S = (I - D'D)⁻¹, T = (I - DD')⁻¹, F = A + B S D'C. */
function hamiltonian({ n, m, p, a, b, c, d }: BoundaryForm, level: number): Float64Array {
  const root = Math.sqrt(level);
  const B = b.map((entry) => entry / root);
  const C = c.map((entry) => entry / root);
  const D = d.map((entry) => entry / level);
  const Dt = flatTranspose(D, p, m);
  const Bt = flatTranspose(B, n, m);
  const SB = solveComplement(flatProduct(Dt, D, m, p, m), Bt, m, n);
  const TC = solveComplement(flatProduct(D, Dt, p, m, p), C, p, n);
  const BSB = flatProduct(B, SB, n, m, n);
  const CTC = flatProduct(flatTranspose(C, p, n), TC, n, p, n);
  const coupling = flatProduct(flatProduct(flatTranspose(SB, m, n), Dt, n, m, p), C, n, p, n);
  const width = 2 * n;
  const H = new Float64Array(width * width);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const f = a[i * n + j] + coupling[i * n + j];
      H[i * width + j] = f;
      H[(n + j) * width + n + i] = -f;
      H[i * width + n + j] = BSB[i * n + j];
      H[(n + i) * width + j] = -CTC[i * n + j];
    }
  }
  return H;
}

/** (I - M)⁻¹ X for M k×k, X k×columns. */
function solveComplement(M: Float64Array, X: Float64Array, k: number, columns: number): Float64Array {
  if (!M.some((entry) => entry !== 0)) return X;
  const complement = M.map((entry) => 0 - entry);
  for (let i = 0; i < k; i++) complement[i * k + i] += 1;
  return solveLu(factorLu(complement, k), X, columns);
}
