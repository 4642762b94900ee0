import { angleOf } from "./angle";
import { type Crossing, crossings } from "./crossings";
import type { FrequencySystem } from "./prepare-frequency";
import { frequencyOf } from "./response-at";
import { type SensitivityPoint, sensitivityAt } from "./sensitivity-point";

/** Why there is no margin to report: nothing of the kind makes the loop unstable. */
export type NoMargin = "no-phase-crossover" | "no-gain-crossover";

/**
 * A margin with the frequency (rad/s; null: approached as frequency grows without bound) at which the loop would stand on
 * the stability boundary, and an interval for rounding; or no margin, and why.
 */
export type Margin =
  | {
      readonly value: number;
      readonly lower: number;
      readonly upper: number;
      readonly frequency: number | null;
      readonly reason: null;
    }
  | { readonly value: null; readonly lower: null; readonly upper: null; readonly frequency: null; readonly reason: NoMargin };

export type ClassicalMargins = {
  /** Smallest factor above 1 on the loop's gain that brings it to the boundary. */
  readonly gainUp: Margin;
  /** Largest factor between 0 and 1 that does. */
  readonly gainDown: Margin;
  /** Smallest turn of the loop, either way, in rad. */
  readonly phase: Margin;
  /** Shortest additional delay, in seconds. */
  readonly delay: Margin;
  /** Every crossing of the unit circle and of the negative real axis, with the margin that it makes (rad, or factor). */
  readonly gainCrossovers: readonly Crossover[];
  readonly phaseCrossovers: readonly Crossover[];
};

export type Crossover = { readonly frequency: number | null; readonly margin: number };

type Found = { readonly value: number; readonly lower: number; readonly upper: number; readonly frequency: number | null };

/**
 * Gain, phase and delay margins of one loop with all others closed, from its sensitivity S; L = 1/S - 1.
 *
 * Shapes    one input, one output, stable
 * Units     factors, rad, seconds
 * Throws    no-convergence; too-large; singular for a sampled loop that cannot be mapped (a pole at z = -1)
 * Accuracy  at every crossing found the margin is that of the exact response within lower..upper: rounding of the response at
 *           the two neighbouring numbers that enclose the crossing
 * Source    Åström & Murray, Feedback Systems, 2nd ed. 2021, section 10.3 (from memory)
 */
export function classicalMargins(system: FrequencySystem): ClassicalMargins {
  const factors = [...ends(system), ...crossings(system, "phase")]
    .map((crossing) => gainFactor(crossing, system.period))
    .filter((found) => found !== null);
  const turns = crossings(system, "gain").map((crossing) => phaseTurn(crossing, system.period));
  const angles = turns.map((turn) => (turn.value < 0 ? negated(turn) : turn));
  return {
    gainUp: least(
      factors.filter(({ value }) => value > 1),
      "no-phase-crossover",
    ),
    gainDown: inverted(least(factors.filter(({ value }) => value < 1).map(reciprocal), "no-phase-crossover")),
    phase: least(angles, "no-gain-crossover"),
    delay: shortestDelay(system, turns),
    gainCrossovers: turns.map(({ frequency, value }) => ({ frequency, margin: value })),
    phaseCrossovers: factors
      .map(({ frequency, value }) => ({ frequency, margin: value }))
      .sort((x, y) => order(x.frequency) - order(y.frequency)),
  };
}

function order(frequency: number | null): number {
  return frequency ?? Number.POSITIVE_INFINITY;
}

/** Rest and infinite frequency, where every loop is real. */
function ends(system: FrequencySystem): Crossing[] {
  return [0, Number.POSITIVE_INFINITY].map((v) => {
    const point = sensitivityAt(system, v);
    return [point, point];
  });
}

/** -1/L = -S/T for a real L below zero; null where L is above zero, or cannot be told from zero or infinity. */
function gainFactor(crossing: Crossing, period: number | null): Found | null {
  const certain = crossing.every(
    ({ S, T, errorOfS, errorOfT }) => Math.abs(S.re) > 4 * errorOfS && Math.abs(T.re) > 4 * errorOfT && S.re > 0 !== T.re > 0,
  );
  if (!certain) return null;
  const [left, right] = crossing;
  const factorOf = ({ S, T }: SensitivityPoint) => -S.re / T.re;
  const shareOf = ({ S, T, errorOfS, errorOfT }: SensitivityPoint) => errorOfS / Math.abs(S.re) + errorOfT / Math.abs(T.re);
  const value = factorOf(right);
  if (!Number.isFinite(value) || !Number.isFinite(2 / value)) return null;
  return enclosed(value, factorOf(left), value * Math.max(shareOf(left), shareOf(right)), frequencyOf(right.v, period));
}

/** Angle of -L where |L| = 1: how far the loop may lag (positive) or lead (negative) more. */
function phaseTurn([left, right]: Crossing, period: number | null): Found {
  const turnOf = ({ S, T }: SensitivityPoint) => {
    const size = Math.abs(S.re) + Math.abs(S.im);
    const [x, y, p, q] = [S.re / size, S.im / size, T.re / size, T.im / size];
    return angleOf({ re: 0 - (p * x + q * y), im: p * y - q * x });
  };
  const shareOf = ({ S, T, errorOfS, errorOfT }: SensitivityPoint) =>
    errorOfS / (Math.abs(S.re) + Math.abs(S.im)) + errorOfT / (Math.abs(T.re) + Math.abs(T.im));
  return enclosed(turnOf(right), turnOf(left), 2 * Math.max(shareOf(left), shareOf(right)), frequencyOf(right.v, period));
}

function enclosed(value: number, other: number, error: number, frequency: number | null): Found {
  return { value, lower: Math.min(value, other) - error, upper: Math.max(value, other) + error, frequency };
}

function negated({ value, lower, upper, frequency }: Found): Found {
  return { value: -value, lower: -upper, upper: -lower, frequency };
}

function reciprocal({ value, lower, upper, frequency }: Found): Found {
  return { value: 1 / value, lower: 1 / upper, upper: 1 / Math.max(lower, value / 2), frequency };
}

function inverted(margin: Margin): Margin {
  return margin.reason === null ? { ...reciprocal(margin), reason: null } : margin;
}

function least(found: readonly Found[], reason: NoMargin): Margin {
  const first = [...found].sort((x, y) => x.value - y.value || order(x.frequency) - order(y.frequency))[0];
  return first ? { ...first, reason: null } : noMargin(reason);
}

function noMargin(reason: NoMargin): Margin {
  return { value: null, lower: null, upper: null, frequency: null, reason };
}

/** A loop whose gain does not fall below 1 at the highest frequencies bears no delay at all. */
function shortestDelay(system: FrequencySystem, turns: readonly Found[]): Margin {
  const { S, T } = sensitivityAt(system, Number.POSITIVE_INFINITY);
  if (system.period === null && Math.abs(T.re) >= Math.abs(S.re)) {
    return { value: 0, lower: 0, upper: 0, frequency: null, reason: null };
  }
  const delays = turns.flatMap(({ value, lower, upper, frequency }) => {
    // A crossing so slow that the delay has no number is as good as none.
    if (frequency === null || !Number.isFinite((4 * Math.PI) / frequency)) return [];
    const round = value > 0 ? 0 : 2 * Math.PI;
    return [
      {
        value: (value + round) / frequency,
        lower: (lower + round) / frequency,
        upper: (upper + round) / frequency,
        frequency,
      },
    ];
  });
  return least(delays, "no-gain-crossover");
}
