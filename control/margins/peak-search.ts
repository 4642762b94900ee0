/** Where a function of the boundary's coordinate is largest, as far as it was looked at. */
export type Peak = { readonly at: number; readonly value: number };

const MOST_STEPS = 40;
/** An improvement below this, in relation to the value, is rounding. */
const SETTLED = 4 * Number.EPSILON;

/**
 * Climbs from `start` to a local maximum of a positive function between two neighbours, by parabolas through 1/value², which
 * is exactly a parabola for one resonance. Never returns less than it was given.
 *
 * Units     coordinates of the stability boundary, 0 ≤ below < start < above, above finite
 * Accuracy  value to a few roundings of the evaluations; at most 40 of them
 */
export function climb(valueAt: (v: number) => number, start: Peak, below: number, above: number, settled = SETTLED): Peak {
  let best = start;
  let low = below;
  let high = above;
  let stale = 0;
  const inverse = (value: number) => 1 / ((value / start.value) * (value / start.value));
  let lowCost = inverse(valueAt(low));
  let highCost = inverse(valueAt(high));
  for (let step = 0; step < MOST_STEPS && stale < 2; step++) {
    const v = nextPlace(low, best.at, high, lowCost, inverse(best.value), highCost, step % 3 === 2);
    if (!(v > low && v < high) || v === best.at) break;
    const value = valueAt(v);
    stale = value <= best.value * (1 + settled) && value >= best.value * (1 - settled) ? stale + 1 : 0;
    if (value > best.value) {
      if (v > best.at) [low, lowCost] = [best.at, inverse(best.value)];
      else [high, highCost] = [best.at, inverse(best.value)];
      best = { at: v, value };
    } else if (v > best.at) [high, highCost] = [v, inverse(value)];
    else [low, lowCost] = [v, inverse(value)];
  }
  return best;
}

/** Lowest point of the parabola through three points; the middle of the wider side where there is none or it is that one's turn. */
function nextPlace(low: number, mid: number, high: number, fLow: number, fMid: number, fHigh: number, halve: boolean): number {
  const left = mid - low;
  const right = high - mid;
  const wider = left > right ? mid - left / 2 : mid + right / 2;
  if (halve && Math.max(left, right) > 16 * Math.min(left, right)) return wider;
  const p = (fLow - fMid) * right;
  const q = (fHigh - fMid) * left;
  if (!(p >= 0 && q >= 0 && p + q > 0 && Number.isFinite(p + q))) return wider;
  const v = mid + (p * right - q * left) / (2 * (p + q));
  return v > low && v < high && v !== mid ? v : wider;
}
