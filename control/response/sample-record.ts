import { NumericalError } from "../errors";
import { flatProduct, flatTranspose } from "../linalg/flat";
import { distinctRows } from "./distinct-rows";
import type { Drive, LoopDynamics } from "./loop-dynamics";
import { flatExponential } from "./matrix-exponential";
import { timesVector } from "./times-vector";
import { BLOCK, signalBlock, transitionPower } from "./walk-sampled";

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
 * Accuracy  as the quick exponential; about ε per block beyond that
 */
export function recordMaker(dynamics: LoopDynamics, { step, samples }: TimeGrid): (drive: Drive) => Float64Array {
  const { a, order, signals, period } = dynamics;
  const phi =
    period === null
      ? flatExponential(
          a.map((entry) => entry * step),
          order,
        )
      : transitionPower(a, order, Math.max(1, Math.round(step / period)));
  const everything = Array.from({ length: signals }, (_, i) => i);
  const { places, of, rows } = distinctRows(dynamics, everything);
  const width = places.length * BLOCK;
  const block = flatTranspose(signalBlock(phi, order, rows), width, order);
  const phiBlock = transitionPower(phi, order, BLOCK);
  const blocks = Math.ceil(samples / BLOCK);
  const starts = new Float64Array(blocks * order);
  return ({ departure, final }) => {
    starts.set(departure);
    for (let k = 1; k < blocks; k++) {
      const here = starts.subarray(k * order, (k + 1) * order);
      timesVector(phiBlock, starts.subarray((k - 1) * order, k * order), order, here);
    }
    const departed = flatProduct(starts, block, blocks, order, width);
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

function requireFiniteValues(values: Float64Array): void {
  let sum = 0;
  for (let k = 0; k < values.length; k++) sum += values[k] * 0; // NaN as soon as one is not finite
  if (sum !== 0) throw new NumericalError("too-large", { what: "response", limit: Number.MAX_VALUE });
}
