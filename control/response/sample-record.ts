import { NumericalError } from "../errors";
import { addNarrow, type Wide } from "../linalg/double-double";
import { flatProductInto, flatTranspose } from "../linalg/flat";
import { workArray, workCopy } from "../linalg/work-array";
import { distinctRows } from "./distinct-rows";
import type { Drive, LoopDynamics } from "./loop-dynamics";
import { flatExponential } from "./matrix-exponential";
import { timesVector } from "./times-vector";
import { BLOCK, signalBlock, transitionPower } from "./walk-sampled";
import { wideExponential, widePower } from "./wide-exponential";
import { exactlyScaled } from "./wide-scalar";

/** `samples` moments, `step` seconds apart, from 0 on. */
export type TimeGrid = { readonly step: number; readonly samples: number };

/**
 * Moments at which responses up to `horizon` are kept. A sampled loop keeps its own instants, every one or every second,
 * third, ..., so that none is made up.
 *
 * Units     seconds
 * Limits    at most `most` moments (at least two)
 */
export function timeGrid(horizon: number, period: number | null, most: number): TimeGrid {
  if (period === null) return { step: horizon / (most - 1), samples: most };
  const periods = Math.max(1, Math.ceil(horizon / period - 1e-9));
  const stride = Math.ceil(periods / (most - 1));
  return { step: stride * period, samples: Math.ceil(periods / stride) + 1 };
}

/**
 * Maker of the sampled values of all signals of a loop for one grid: row-major signals×samples, exact at every moment by the
 * transition over one step, 16 moments to a block.
 *
 * Throws    too-large when a value leaves the range of doubles
 * Accuracy  transitions are correctly rounded, of the loop with the digits that closing it lost; about ε per block beyond that
 */
export function recordMaker(dynamics: LoopDynamics, { step, samples }: TimeGrid): (drive: Drive) => Float64Array {
  const { order, signals } = dynamics;
  const { phi, phiBlock } = transitions(dynamics, step);
  const everything = Array.from({ length: signals }, (_, i) => i);
  const { places, of, rows } = distinctRows(dynamics, everything);
  const width = places.length * BLOCK;
  const block = flatTranspose(signalBlock(phi, order, rows), width, order);
  const blocks = Math.ceil(samples / BLOCK);
  const starts = workArray(blocks * order);
  const departed = workArray(blocks * width);
  return ({ departure, final }) => {
    let [state, after] = [workCopy(departure), workArray(order)];
    for (let to = 0; to < starts.length; to += order) {
      starts.set(state, to);
      timesVector(phiBlock, state, order, after);
      [state, after] = [after, state];
    }
    flatProductInto(departed, starts, block, blocks, order, width);
    const values = new Float64Array(signals * samples);
    for (let i = 0; i < places.length; i++) {
      const rest = final[places[i]];
      const to = places[i] * samples;
      for (let first = 0, from = i * BLOCK; first < samples; first += BLOCK, from += width) {
        const here = Math.min(BLOCK, samples - first);
        for (let k = 0; k < here; k++) values[to + first + k] = rest + departed[from + k] + 0;
      }
    }
    requireFiniteValues(values);
    of.forEach((known, i) => {
      const from = places[known] * samples;
      if (places[known] !== i) values.copyWithin(i * samples, from, from + samples);
    });
    return values;
  };
}

/** Transitions over one step and over sixteen, rounded once each. */
function transitions({ a, lost, order, period }: LoopDynamics, step: number): { phi: Float64Array; phiBlock: Float64Array } {
  const stride = period === null ? 1 : Math.max(1, Math.round(step / period));
  let one: Wide;
  if (period === null) {
    const scaled = exactlyScaled(a, step);
    addNarrow(
      scaled,
      lost.map((entry) => entry * step),
      1,
    );
    one = wideExponential(scaled, order);
  } else one = widePower({ hi: workCopy(a), lo: workCopy(lost) }, order, stride);
  const block = widePower(one, order, BLOCK);
  if (one.hi.every(Number.isFinite) && block.hi.every(Number.isFinite)) return { phi: one.hi, phiBlock: block.hi };
  // Entries that cannot be split are left to plain arithmetic.
  const phi = period === null ? flatExponential(exactlyScaled(a, step).hi, order) : transitionPower(a, order, stride);
  return { phi, phiBlock: transitionPower(phi, order, BLOCK) };
}

function requireFiniteValues(values: Float64Array): void {
  let [one, two, three, four] = [0, 0, 0, 0]; // NaN as soon as a value is not finite; four sums do not wait for each other
  let k = 0;
  for (; k + 3 < values.length; k += 4) {
    one += values[k] * 0;
    two += values[k + 1] * 0;
    three += values[k + 2] * 0;
    four += values[k + 3] * 0;
  }
  for (; k < values.length; k++) one += values[k] * 0;
  if (one + two + three + four !== 0) throw new NumericalError("too-large", { what: "response", limit: Number.MAX_VALUE });
}
