import { NumericalError } from "../errors";
import type { Drive, LoopDynamics } from "./loop-dynamics";
import { flatExponential } from "./matrix-exponential";
import { timesVector } from "./walk-continuous";
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
 * Accuracy  as `matrixExponential`; about ε per block beyond that
 */
export function recordMaker(dynamics: LoopDynamics, { step, samples }: TimeGrid): (drive: Drive) => Float64Array {
  const { a, order, c, signals, period } = dynamics;
  const phi =
    period === null
      ? flatExponential(
          a.map((entry) => entry * step),
          order,
        )
      : transitionPower(a, order, Math.max(1, Math.round(step / period)));
  const block = signalBlock(phi, order, c, BLOCK);
  const phiBlock = transitionPower(phi, order, BLOCK);
  return ({ departure, final }) => {
    const values = new Float64Array(signals * samples);
    let state = departure;
    for (let first = 0; first < samples; first += BLOCK) {
      const here = Math.min(BLOCK, samples - first);
      for (let k = 0; k < here; k++) {
        for (let i = 0; i < signals; i++) {
          const row = (k * signals + i) * order;
          let sum = 0;
          for (let j = 0; j < order; j++) sum += block[row + j] * state[j];
          values[i * samples + first + k] = final[i] + sum + 0;
        }
      }
      state = timesVector(phiBlock, state, order);
    }
    for (const value of values) {
      if (!Number.isFinite(value)) throw new NumericalError("too-large", { what: "response", limit: Number.MAX_VALUE });
    }
    return values;
  };
}
