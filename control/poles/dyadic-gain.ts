import { Matrix } from "ml-matrix";
import { eigenvalues } from "../linalg/eigenvalues";
import { fromFlat, toFlat } from "../linalg/flat";
import { frobeniusNorm } from "../linalg/norms";
import { analyseReach } from "../structure/reach-analysis";
import { scalePlant } from "./scale-plant";
import { singleInputGain } from "./single-input-gain";
import type { WantedPole } from "./wanted-poles";

/** Directions in general position, so that one of them reaches what all inputs together reach. */
const STRIDES = [0, 0.6180339887498949, 0.41421356237309515, 0.7320508075688772];

/**
 * Gain that moves all inputs along one direction, which can repeat a pole more often than there are inputs.
 * Where A has equal blocks that no single direction reaches, a small feedback tells them apart first.
 *
 * Shapes    A n×n, B n×m, blocks covering n poles → K m×n, or null when no direction tried reaches every state
 * Units     those of the plant as given
 * Throws    no-convergence
 * Accuracy  that of the single-input gain; of all directions tried the least gain is returned
 * Source    Gopinath 1971; Wonham 1967: a reachable pair has a feedback after which one direction suffices
 */
export function dyadicGain(A: Matrix, B: Matrix, blocks: readonly WantedPole[]): Matrix | null {
  const n = A.rows;
  const m = B.columns;
  let best: Matrix | null = null;
  for (const strength of [0, 1 / 8, 1]) {
    const first = smallFeedback(A, B, strength);
    const moved = Matrix.sub(A, B.mmul(first));
    for (const stride of STRIDES) {
      const direction = Matrix.columnVector(Array.from({ length: m }, (_, j) => inputSize(B, j) * entryOf(j, stride)));
      const row = alongDirection(moved, B.mmul(direction), blocks);
      if (!row) continue;
      const K = Matrix.add(first, direction.mmul(fromFlat(row, 1, n)));
      if (!best || frobeniusNorm(K) < frobeniusNorm(best)) best = K;
    }
    if (best) break;
  }
  return best;
}

function alongDirection(A: Matrix, b: Matrix, blocks: readonly WantedPole[]): Float64Array | null {
  const n = A.rows;
  const { reached } = analyseReach(toFlat(A), toFlat(b), n, 1, eigenvalues(A));
  if (reached.includes(false)) return null;
  return scaledSingleInputGain(A, b, blocks);
}

/** The single-input gain, computed in balanced units. */
export function scaledSingleInputGain(A: Matrix, b: Matrix, blocks: readonly WantedPole[]): Float64Array | null {
  const n = A.rows;
  const fastest = Math.max(...blocks.map(({ re, im }) => Math.max(Math.abs(re), im)));
  const plant = scalePlant(toFlat(A), toFlat(b), n, 1, fastest, true);
  const scaled = blocks.map((block) => ({ ...block, re: block.re * plant.time, im: block.im * plant.time }));
  const gain = singleInputGain(plant.a, plant.b, n, scaled);
  return gain?.map((entry, i) => (entry * plant.input[0]) / plant.state[i] / plant.time) ?? null;
}

/** Power-of-two-free weight of an input: the reciprocal of its largest effect, zero for one that has none. */
function inputSize(B: Matrix, j: number): number {
  const largest = Math.max(...B.getColumn(j).map(Math.abs));
  return largest === 0 ? 0 : 1 / largest;
}

function entryOf(j: number, stride: number): number {
  const turned = (j + 1) * stride;
  return 1 - (turned - Math.floor(turned)) * (j % 2 === 0 ? 0.75 : 1.5);
}

/** Entries in general position, of a size that moves poles by `strength` times the size of A. */
function smallFeedback(A: Matrix, B: Matrix, strength: number): Matrix {
  const size = strength * (frobeniusNorm(A) || 1);
  const K = Matrix.zeros(B.columns, A.rows);
  for (let j = 0; j < K.rows; j++) {
    for (let i = 0; i < K.columns; i++) {
      const turned = (j * K.columns + i + 1) * 0.6180339887498949;
      K.set(j, i, size * inputSize(B, j) * (turned - Math.floor(turned) - 0.5));
    }
  }
  return K;
}
