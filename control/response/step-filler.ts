import { flatProductInto } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { flatOneNorm } from "../linalg/solve-linear";

/** Moments that one stacked product gives at once, a power of two. */
const BLOCK = 16;
/** The series of (e^X - I)/X ends below 1e-17 of itself for |X| ≤ 1/8. */
const SMALL_EXPONENT = -3;
const TERMS = 12;
const GROUP = 3;
/** Norms beyond 2^200 have long left the range of doubles. */
const MOST_DOUBLINGS = 203;

/** Sizes: states, inputs that are stepped, signals that are watched, moments. */
export type StepSizes = { readonly n: number; readonly inputs: number; readonly signals: number; readonly samples: number };

/** Fills `values`, row-major inputs×signals×samples, with the answers to a unit step of each input from rest. */
export type StepFiller = (a: Float64Array, b: Float64Array, c: Float64Array, d: Float64Array, values: Float64Array) => void;

/** Φ - I and the answer of the state at the end of a step, Γ, with room to double both. */
type Held = {
  psi: Float64Array;
  gamma: Float64Array;
  nextPsi: Float64Array;
  readonly more: Float64Array;
  readonly turned: Float64Array;
};

/**
 * Step responses of x' = A x + B u, y = C x + D u at the moments 0, h, 2h, ...: all inputs and outputs together, 16 moments at
 * a time, in memory that is taken once for any number of systems of one size. Systems need not be stable.
 *
 * Shapes    a n×n, b n×inputs, c signals×n, d signals×inputs, row-major; h in seconds, or null for x(k+1) = A x(k) + B u
 * Throws    nothing; values beyond the range of doubles come out as infinity or NaN
 * Accuracy  as scaling and squaring from a norm of 1/8; best with balanced states
 * Source    Van Loan, IEEE Trans. Automatic Control 23 (1978) 395-404 (the held step); doubling of all known moments at once
 */
export function stepFiller(sizes: StepSizes, h: number | null): StepFiller {
  const { n, inputs, signals, samples } = sizes;
  const held = newHeld(n, inputs);
  const series = h === null ? null : seriesStep(n, inputs, h);
  const blocks = Math.ceil(samples / BLOCK);
  const rows = new Float64Array(signals * BLOCK * n); // C Φ^k
  const early = new Float64Array(BLOCK * inputs * n); // states at the first sixteen moments
  const starts = new Float64Array(blocks * inputs * n); // states at the beginning of every block
  const channels = channelProducts(sizes, blocks);
  return (a, b, c, d, values) => {
    if (series) series(a, b, held);
    else sampledStep(a, b, n, held);
    rows.set(c);
    early.fill(0, 0, inputs * n);
    for (let known = 1; known < BLOCK; known *= 2) {
      moveRows(rows, known * signals, n, held);
      moveStates(early, known, known, sizes, held);
      doubleHeld(held, n, inputs);
    }
    starts.fill(0, 0, inputs * n);
    for (let known = 1; known < blocks; known *= 2) {
      moveStates(starts, known, Math.min(known, blocks - known), sizes, held);
      if (2 * known < blocks) doubleHeld(held, n, inputs);
    }
    channels({ rows, early, starts, c, d }, values);
  };
}

function newHeld(n: number, inputs: number): Held {
  const square = () => new Float64Array(n * n);
  const answer = () => new Float64Array(n * inputs);
  return { psi: square(), gamma: answer(), nextPsi: square(), more: answer(), turned: square() };
}

function sampledStep(a: Float64Array, b: Float64Array, n: number, held: Held): void {
  held.psi.set(a);
  for (let i = 0; i < n * n; i += n + 1) held.psi[i] -= 1;
  held.gamma.set(b);
}

/** Ψ and Γ over h: Σ X^k/(k+1)! over a small part of it, then doubled. */
function seriesStep(n: number, inputs: number, h: number): (a: Float64Array, b: Float64Array, held: Held) => void {
  const [x, square, cube, even] = Array.from({ length: 4 }, () => new Float64Array(n * n));
  let [sum, spare] = [new Float64Array(n * n), new Float64Array(n * n)];
  const factorials = [1];
  for (let k = 1; k <= TERMS; k++) factorials.push(factorials[k - 1] * k);
  return (a, b, held) => {
    const norm = h * flatOneNorm(a, n);
    const doublings = Math.min(MOST_DOUBLINGS, Math.max(0, exponentOf(norm) + 1 - SMALL_EXPONENT));
    const part = h * powerOfTwo(-doublings);
    for (let i = 0; i < x.length; i++) x[i] = a[i] * part;
    flatProductInto(square, x, x, n, n, n);
    flatProductInto(cube, square, x, n, n, n);
    sum.fill(0);
    for (let k = TERMS - GROUP; k >= 0; k -= GROUP) {
      if (k < TERMS - GROUP) {
        flatProductInto(spare, sum, cube, n, n, n);
        [sum, spare] = [spare, sum];
      }
      for (let i = 0; i < sum.length; i++) sum[i] += square[i] / factorials[k + 3] + x[i] / factorials[k + 2];
      for (let i = 0; i < sum.length; i += n + 1) sum[i] += 1 / factorials[k + 1];
    }
    flatProductInto(held.psi, sum, x, n, n, n);
    for (let i = 0; i < even.length; i++) even[i] = sum[i] * part;
    flatProductInto(held.gamma, even, b, n, n, inputs);
    for (let k = 0; k < doublings; k++) doubleHeld(held, n, inputs);
  };
}

/** Twice the time: Γ + ΦΓ and 2Ψ + Ψ². */
function doubleHeld(held: Held, n: number, inputs: number): void {
  const { psi, gamma, nextPsi, more } = held;
  flatProductInto(more, psi, gamma, n, n, inputs);
  for (let i = 0; i < gamma.length; i++) gamma[i] = 2 * gamma[i] + more[i];
  flatProductInto(nextPsi, psi, psi, n, n, n);
  for (let i = 0; i < psi.length; i++) nextPsi[i] += 2 * psi[i];
  held.psi = nextPsi;
  held.nextPsi = psi;
}

/** The first `known` rows r give as many more: r Φ. */
function moveRows(rows: Float64Array, known: number, n: number, { psi }: Held): void {
  const more = rows.subarray(known * n, 2 * known * n);
  flatProductInto(more, rows.subarray(0, known * n), psi, known, n, n);
  for (let i = 0; i < more.length; i++) more[i] += rows[i];
}

/** The states at the first `known` moments give those at `count` more, as far on as Φ and Γ reach: Φ x + Γ. */
function moveStates(
  states: Float64Array,
  known: number,
  count: number,
  { n, inputs }: StepSizes,
  { psi, gamma, turned }: Held,
): void {
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) turned[j * n + i] = psi[i * n + j];
  const size = inputs * n;
  const more = states.subarray(known * size, (known + count) * size);
  flatProductInto(more, states.subarray(0, count * size), turned, count * inputs, n, n);
  for (let moment = 0, at = 0; moment < count; moment++) {
    for (let r = 0; r < inputs; r++) {
      for (let i = 0; i < n; i++, at++) more[at] = states[at] + (more[at] + gamma[i * inputs + r]);
    }
  }
}

type Channels = {
  readonly rows: Float64Array;
  readonly early: Float64Array;
  readonly starts: Float64Array;
  readonly c: Float64Array;
  readonly d: Float64Array;
};

/**
 * One product for each channel, which lays its moments down in order: a row for each block, [state at its start, 1], times
 * sixteen columns, [C Φ^k; value at moment k of the first block].
 */
function channelProducts({ n, inputs, signals, samples }: StepSizes, blocks: number) {
  const left = Array.from({ length: inputs }, () => new Float64Array(blocks * (n + 1)).fill(1));
  const right = Array.from({ length: signals }, () => new Float64Array((n + 1) * BLOCK));
  const whole = new Float64Array(blocks * BLOCK);
  const wanted = whole.subarray(0, samples);
  return ({ rows, early, starts, c, d }: Channels, values: Float64Array): void => {
    for (let block = 0, from = 0; block < blocks; block++)
      for (const operand of left) for (let j = 0; j < n; j++) operand[block * (n + 1) + j] = starts[from++];
    for (let k = 0, from = 0; k < BLOCK; k++)
      for (const operand of right) for (let j = 0; j < n; j++) operand[j * BLOCK + k] = rows[from++];
    for (let r = 0, to = 0; r < inputs; r++) {
      for (let i = 0; i < signals; i++, to += samples) {
        for (let k = 0; k < BLOCK; k++) {
          let sum = d[i * inputs + r];
          for (let j = 0, at = i * n, state = (k * inputs + r) * n; j < n; j++) sum += c[at++] * early[state++];
          right[i][n * BLOCK + k] = sum;
        }
        flatProductInto(whole, left[r], right[i], blocks, n + 1, BLOCK);
        values.set(wanted, to);
      }
    }
  };
}
