import { eigenvalues } from "../linalg/eigenvalues";
import { fromFlat } from "../linalg/flat";
import { boundaryMargin } from "./check-modes";
import type { FlatProblem } from "./problem";

/**
 * States that by the pattern of zeros act on no weighted state, where they are stable by themselves: their rows of X and
 * columns of K are exactly zero.
 *
 * Shapes    → places of the states, none when they hold an unstable or marginal mode
 * Accuracy  the pattern is exact; stability is that of the computed eigenvalues
 * Source    the block form of the equation: with A = [A₁ 0; A₂₁ A₂]-like zeros X = [X₁ 0; 0 0] solves it and stabilises
 */
export function unseenStates({ n, m, a, q, s, sampled }: FlatProblem): number[] {
  const seen = new Uint8Array(n);
  const queue: number[] = [];
  const see = (i: number): void => {
    if (seen[i] === 1) return;
    seen[i] = 1;
    queue.push(i);
  };
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) if (q[i * n + j] !== 0) see(i);
    for (let j = 0; j < m; j++) if (s[i * m + j] !== 0) see(i);
  }
  for (let at = 0; at < queue.length; at++) for (let j = 0; j < n; j++) if (a[queue[at] * n + j] !== 0) see(j);
  if (queue.length === n) return [];
  const unseen = Array.from({ length: n }, (_, i) => i).filter((i) => seen[i] === 0);
  const block = unseen.flatMap((i) => unseen.map((j) => a[i * n + j]));
  const poles = eigenvalues(fromFlat(block, unseen.length, unseen.length));
  return poles.every((pole) => boundaryMargin(pole, sampled) > 0) ? unseen : [];
}
