import { Matrix } from "ml-matrix";
import { largestEntry, toFlat } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { solveLinear } from "../linalg/solve-linear";
import { splitAtRest } from "./split-at-rest";

/** One power of s in the gain: s^power times `value`, whose entries up to `noise` are rounding. */
export type GainTerm = { readonly power: number; readonly value: Matrix; readonly noise: Matrix };

/**
 * The gain J + H (s I - A)⁻¹ B as a series about s = 0 from its lowest power on: negative powers belong to integrators.
 *
 * Shapes    A n×n, B n×m, H q×n, J q×m → terms q×m, powers from minus the longest chain of integrators to n
 * Units     those of z over u, times s for each power
 * Throws    not-finite; no-convergence; singular when what is left beside the integrators has no inverse after all
 * Accuracy  as its noise says, about n ε over the reciprocal condition of what is left
 * Source    Kailath, Linear Systems, 1980, section 2.4 and 6.5, for the expansions (from memory)
 */
export function gainSeries(A: Matrix, B: Matrix, H: Matrix, J: Matrix): GainTerm[] {
  const n = A.rows;
  const { rest, chain, inputs, outputs } = splitAtRest(A, B, H);
  const terms: GainTerm[] = [];
  let moved = inputs.chain;
  let growth = 1;
  for (let k = 0; k < chain.rows && largestEntry(toFlat(moved)) > 0; k++) {
    const noise = noiseOf(outputs.chain, inputs.chain, growth, chain.rows);
    terms.unshift({ power: -1 - k, value: outputs.chain.mmul(moved), noise });
    moved = chain.mmul(moved);
    growth *= flatNorm(chain.to1DArray());
  }
  let response = inputs.rest;
  for (let k = 0; k <= n && rest.rows > 0; k++) {
    const { X, reciprocalCondition } = solveLinear(rest, response);
    response = X;
    const value = outputs.rest.mmul(Matrix.mul(response, -1));
    const noise = noiseOf(outputs.rest, response, 1 / reciprocalCondition, rest.rows);
    terms.push(k === 0 ? { power: 0, value: Matrix.add(J, value), noise: withDirect(noise, J) } : { power: k, value, noise });
  }
  if (rest.rows === 0) terms.push({ power: 0, value: J, noise: Matrix.zeros(J.rows, J.columns) });
  return terms.filter(({ value, noise }) => [...value.to1DArray(), ...noise.to1DArray()].every(Number.isFinite));
}

/** What rounding can leave of each entry of a product of an output row and what inputs move, itself grown by `growth`. */
function noiseOf(C: Matrix, moved: Matrix, growth: number, n: number): Matrix {
  const relative = 64 * (1 + n) * Number.EPSILON * growth;
  const noise = Matrix.zeros(C.rows, moved.columns);
  for (let i = 0; i < C.rows; i++) {
    const row = flatNorm(C.getRow(i));
    for (let j = 0; j < moved.columns; j++) noise.set(i, j, relative * row * flatNorm(moved.getColumn(j)));
  }
  return noise;
}

function withDirect(noise: Matrix, J: Matrix): Matrix {
  const whole = noise.clone();
  for (let i = 0; i < J.rows; i++) {
    for (let j = 0; j < J.columns; j++) whole.set(i, j, noise.get(i, j) + 4 * Number.EPSILON * Math.abs(J.get(i, j)));
  }
  return whole;
}
