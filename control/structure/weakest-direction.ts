import { largestEntry } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import type { Staircase } from "./staircase";

/**
 * The real unit vector that stands for a complex one: the long axis of the ellipse that its phases draw.
 * The largest entry is positive.
 */
export function longAxis(re: Float64Array, im: Float64Array): Float64Array {
  let square = 0;
  let cross = 0;
  for (let k = 0; k < re.length; k++) {
    square += re[k] * re[k] - im[k] * im[k];
    cross += 2 * re[k] * im[k];
  }
  const size = Math.sqrt(square * square + cross * cross);
  const cosine = size === 0 ? 1 : Math.sqrt((1 + square / size) / 2);
  const rest = size === 0 ? 0 : Math.sqrt(Math.max(0, (1 - square / size) / 2));
  const sine = cross < 0 ? -rest : rest;
  return unitWithPositiveLargest(re.map((entry, k) => cosine * entry + sine * im[k]));
}

/**
 * The part of a direction that no input reaches, where there is such a part.
 * Directions weigh states, so they change by the inverse of the states' units.
 */
export function hiddenPart(direction: Float64Array, { rank, qt }: Staircase, stateScale: Float64Array): Float64Array {
  const n = direction.length;
  if (rank === n) return direction;
  const wanted = direction.map((entry, k) => entry * stateScale[k]);
  const part = new Float64Array(n);
  for (let row = rank; row < n; row++) {
    let along = 0;
    for (let k = 0; k < n; k++) along += qt[row * n + k] * wanted[k];
    for (let k = 0; k < n; k++) part[k] += along * qt[row * n + k];
  }
  const lost = flatNorm(part) <= Math.sqrt(Number.EPSILON) * flatNorm(wanted);
  const kept = lost ? qt.slice((n - 1) * n) : part;
  return unitWithPositiveLargest(kept.map((entry, k) => entry / stateScale[k]));
}

function unitWithPositiveLargest(x: Float64Array): Float64Array {
  const largest = largestEntry(x);
  const length = x.find((entry) => Math.abs(entry) === largest) === -largest ? -flatNorm(x) : flatNorm(x);
  return length === 0 ? x : x.map((entry) => entry / length + 0);
}
