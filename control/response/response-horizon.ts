import type { Complex } from "../plant/model";
import { boundaryDistance } from "./loop-dynamics";

/** Beyond the longest settling time, so that the rest is seen to stand still. */
const MARGIN = 1.3;
const TIME_CONSTANTS = 4;

/** Smallest of 1, 2 or 5 times a power of ten that is not below the value. */
export function roundUpToDecade(value: number): number {
  const [mantissa, exponent] = value.toExponential().split("e");
  const step = [1, 2, 5].find((candidate) => candidate >= Number(mantissa));
  return step === undefined ? Number(`1e${Number(exponent) + 1}`) : Number(`${step}e${exponent}`);
}

/**
 * How long the responses are shown: what was asked for, else 1.3 times the longest settling time, else (nothing settles
 * measurably) 1.3 times four time constants of the slowest pole; rounded up to 1, 2 or 5 times a power of ten.
 *
 * Units     seconds; never below one period of a sampled loop
 * Throws    nothing: the poles are those of a stable loop
 */
export function responseHorizon(
  asked: number | null,
  settling: number,
  poles: readonly Complex[],
  period: number | null,
): number {
  if (asked !== null) return period === null ? asked : Math.max(asked, period);
  const longest = settling > 0 ? settling : TIME_CONSTANTS * slowest(poles, period);
  const horizon = roundUpToDecade(MARGIN * longest);
  if (!Number.isFinite(horizon) || horizon === 0) return period ?? 1;
  return period === null ? horizon : Math.max(horizon, period);
}

/** Time constant of the slowest pole, for a sampled loop from its distance to the unit circle. */
function slowest(poles: readonly Complex[], period: number | null): number {
  const rate = boundaryDistance({ poles, period }) / (period ?? 1);
  return rate > 0 && Number.isFinite(rate) ? 1 / rate : (period ?? 1);
}
