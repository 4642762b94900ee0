import { largestEntry } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { strongComponents } from "../linalg/strong-components";
import { workArray, workCopy } from "../linalg/work-array";
import { balanceStates, MOST_EXPONENT } from "./balance-states";

/** a and b were multiplied by `timeScale`, so that eigenvalues were too; old state = stateScale · new state. */
export type BalancedPair = {
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly stateScale: Float64Array;
  readonly timeScale: number;
};

const MOST_ROUNDS = 40;
/** Entries beyond this after balancing come from a pair at the ends of the number range, which is left in its own units. */
const MOST_SIZE = powerOfTwo(MOST_EXPONENT);

/**
 * The pair in units of states, inputs and time that do not depend on those it came in: blocks of states that act on each
 * other are balanced in themselves, then each block takes the unit in which it is driven as fast as it moves.
 * Drive that is lost in rounding is not blown up.
 *
 * Shapes    a n×n, b n×m row-major → the same
 * Units     spectralRadius, the largest modulus of an eigenvalue of a, as a
 * Accuracy  exact but for underflow of negligible entries, powers of two only; at most 40 rounds
 * Source    Parlett & Reinsch, Numer. Math. 13 (1969) 293-304; strong components after Tarjan 1972
 */
export function balancePair(a: Float64Array, b: Float64Array, n: number, m: number, spectralRadius: number): BalancedPair {
  const start = powerOfTwo(-exponentOf(largestEntry(a) || 1));
  const all = Array.from({ length: n }, (_, i) => i);
  const ones = (length: number) => workArray(length).fill(1);
  const pair: Pair = { a: a.map((entry) => entry * start), b: workCopy(b), n, m, stateScale: ones(n) };
  for (let j = 0; j < m; j++) sizeInput(pair, all, j);
  const plain = { a: workCopy(pair.a), b: workCopy(pair.b), stateScale: ones(n) };
  const fastest = spectralRadius * start;
  const lost = 64 * n * Number.EPSILON * Math.max(fastest * fastest, strongestLoop(pair.a, n));
  for (let round = 0; round < MOST_ROUNDS && balanceStates(pair.a, n, pair.stateScale, lost, all); round++);
  for (let i = 0; i < n; i++) for (let j = 0; j < m; j++) pair.b[i * m + j] /= pair.stateScale[i];
  const { order, starts } = strongComponents(pair.a, n);
  const blocks = starts.slice(1).map((end, k) => Array.from(order.subarray(starts[k], end)));
  const rate = powerOfTwo(-exponentOf(fastestBlock(pair, blocks) || largestEntry(pair.a) || 1));
  for (let i = 0; i < pair.a.length; i++) pair.a[i] *= rate;
  driveBlocks(pair, blocks);
  const size = Math.max(largestEntry(pair.a), largestEntry(pair.b));
  if (!(size < MOST_SIZE)) return { ...plain, timeScale: start };
  return { ...pair, timeScale: start * rate };
}

/** Largest product of an entry with its mirror image: the square of a rate that no choice of units changes. */
function strongestLoop(a: Float64Array, n: number): number {
  let largest = 0;
  for (let i = 0; i < n; i++) for (let j = 0; j <= i; j++) largest = Math.max(largest, Math.abs(a[i * n + j] * a[j * n + i]));
  return largest;
}

function fastestBlock({ a, n }: Pair, blocks: readonly (readonly number[])[]): number {
  let largest = 0;
  for (const block of blocks) for (const i of block) for (const j of block) largest = Math.max(largest, Math.abs(a[i * n + j]));
  return largest;
}

type Pair = {
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly n: number;
  readonly m: number;
  readonly stateScale: Float64Array;
};

/**
 * From the blocks that only inputs drive (the last in order) down to those that drive nothing; then those that nothing
 * drives, by what they do to the others.
 */
function driveBlocks(pair: Pair, blocks: readonly (readonly number[])[]): void {
  const rounding = 64 * pair.n * Number.EPSILON;
  const all = blocks.flat();
  const ready = new Set<number>();
  const above: number[] = [];
  const settled: number[] = [];
  const idle: (readonly number[])[] = [];
  for (const members of blocks.toReversed()) {
    const drive = driveOf(pair, members, above, ready);
    if (drive > rounding) scaleStates(pair, members, powerOfTwo(exponentOf(drive)));
    let driven = drive > 0;
    for (let j = 0; j < pair.m; j++) {
      if (ready.has(j) || sizeOfInput(pair, members, j) <= rounding * sizeOfInput(pair, all, j)) continue;
      sizeInput(pair, members, j);
      ready.add(j);
      driven = true;
    }
    above.push(...members);
    if (driven) settled.push(...members);
    else idle.unshift(members);
  }
  for (const members of idle) {
    const effect = flatNorm(settled.flatMap((i) => members.map((k) => pair.a[i * pair.n + k])));
    if (effect > 0) scaleStates(pair, members, powerOfTwo(-exponentOf(effect)));
    settled.push(...members);
  }
}

/** Size of what enters a block from the blocks before it and from inputs whose unit is settled. */
function driveOf({ a, b, n, m }: Pair, members: readonly number[], above: readonly number[], ready: ReadonlySet<number>): number {
  return flatNorm(members.flatMap((i) => [...above.map((k) => a[i * n + k]), ...[...ready].map((j) => b[i * m + j])]));
}

function scaleStates({ a, b, n, m, stateScale }: Pair, members: readonly number[], f: number): void {
  if (members.some((i) => Math.abs(exponentOf(stateScale[i]) + exponentOf(f)) > MOST_EXPONENT)) return;
  for (const i of members) {
    stateScale[i] *= f;
    for (let j = 0; j < n; j++) a[i * n + j] /= f;
    for (let j = 0; j < m; j++) b[i * m + j] /= f;
  }
  for (const i of members) for (let k = 0; k < n; k++) a[k * n + i] *= f;
}

function sizeOfInput({ b, m }: Pair, members: readonly number[], j: number): number {
  return flatNorm(members.map((i) => b[i * m + j]));
}

/** Brings what an input does to the given states to the size of 1. */
function sizeInput(pair: Pair, members: readonly number[], j: number): void {
  const size = sizeOfInput(pair, members, j);
  if (size === 0) return;
  const factor = powerOfTwo(-exponentOf(size));
  for (let i = 0; i < pair.n; i++) pair.b[i * pair.m + j] *= factor;
}
