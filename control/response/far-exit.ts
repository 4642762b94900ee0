import { addNarrow } from "../linalg/double-double";
import { powerOfTwo } from "../linalg/power-of-two";
import { workArray } from "../linalg/work-array";
import { bernsteinCoefficients, POINTS } from "./cell-basis";
import type { Cell } from "./cell-ladder";
import type { LoopDynamics } from "./loop-dynamics";
import type { ModalBound } from "./modal-bound";
import { bandOf, followPiece, harmlessDeparture, type SignalTrack, seeksRise, settledAt, startTrack } from "./signal-track";
import { timesVector } from "./times-vector";
import { wideExponential } from "./wide-exponential";
import { exactlyScaled } from "./wide-scalar";

/** Where a walk stopped. */
export type Halt = { readonly time: number; readonly state: Float64Array };

export type FarSearch = {
  readonly dynamics: Pick<LoopDynamics, "a" | "lost" | "order">;
  readonly bound: ModalBound;
  /** A cell short enough for every mode. */
  readonly cell: Cell;
};

const MOST_DOUBLINGS = 60;
const FIRST_WINDOW = 8;
const MOST_CELLS = 40_000;

/**
 * Finishes the tracks of a motion that fades too slowly to be followed swing by swing. The modes' envelope says from when on a
 * signal must be in its band; the motion is carried exactly to shortly before, and followed from there. Tracks whose extremes
 * are not certain yet, or whose last exit is not found in 40 000 cells, stay unfinished.
 *
 * Accuracy  as the walk; times are those of the loop with the digits that closing it lost
 */
export function finishFar(search: FarSearch, departure: Float64Array, halt: Halt, tracks: readonly SignalTrack[]): void {
  const { bound, dynamics } = search;
  const sizes = bound.sizesOf(halt.state);
  for (let i = 0; i < tracks.length; i++) {
    const track = tracks[i];
    if (track.finished || seeksRise(track)) continue;
    const own = sizes.slice(i * dynamics.order, (i + 1) * dynamics.order);
    const envelope = own.reduce((sum, size) => sum + size, 0);
    if (!(envelope <= harmlessDeparture(track, Number.POSITIVE_INFINITY))) continue;
    const band = bandOf(track);
    if (envelope <= band) {
      track.finished = true;
      continue;
    }
    const after = cellsUntilInside(own, bound.rates, search.cell.h, band);
    if (after !== null) searchBack(search, departure, halt, track, i, after);
  }
}

/** Cells after which the envelope is within the band, found by halving; null beyond 2^60 of them. */
function cellsUntilInside(sizes: Float64Array, rates: Float64Array, h: number, band: number): number | null {
  // What a mode loses in 2^level cells, 1 - e^-x, by its series and by doubling: the same bits everywhere.
  const losses = [rates.map((rate) => lossOver(rate * h))];
  while (losses.length <= MOST_DOUBLINGS) losses.push(losses[losses.length - 1].map((loss) => loss * (2 - loss)));
  let here = sizes;
  let cells = 0;
  for (let level = MOST_DOUBLINGS; level >= 0; level--) {
    const there = here.map((size, k) => size * (1 - losses[level][k]));
    if (there.reduce((sum, size) => sum + size, 0) <= band) continue;
    if (level === MOST_DOUBLINGS) return null;
    here = there;
    cells += powerOfTwo(level);
  }
  return cells + 1;
}

/** 1 - e^-x for x ≥ 0 */
function lossOver(x: number): number {
  let part = x;
  let halvings = 0;
  while (part > 0.125 && halvings < MOST_DOUBLINGS) {
    part /= 2;
    halvings++;
  }
  let loss = 0;
  for (let k = 12; k >= 1; k--) loss = (part / k) * (1 - loss);
  for (let k = 0; k < halvings; k++) loss *= 2 - loss;
  return Math.min(loss, 1);
}

/** Follows one signal up to `after` cells behind the halt, from ever earlier on until it is met outside its band. */
function searchBack(
  { dynamics, cell }: FarSearch,
  departure: Float64Array,
  halt: Halt,
  track: SignalTrack,
  signal: number,
  after: number,
): void {
  const { order } = dynamics;
  const nodes = cell.nodes.subarray(signal * POINTS * order, (signal + 1) * POINTS * order);
  const values = workArray(POINTS);
  const b = workArray(POINTS);
  for (let window = FIRST_WINDOW; window <= MOST_CELLS; window *= 4) {
    const first = Math.max(0, after - window);
    const begin = halt.time + first * cell.h;
    let state = stateAt(dynamics, departure, begin);
    let next: Float64Array = workArray(order);
    const found = startTrack(track.final, { width: bandOf(track) }, track.final, "settling");
    for (let k = 0; first + k < after; k++) {
      timesVector(nodes, state, order, values);
      bernsteinCoefficients(values, 0, track.final, b);
      followPiece(found, b, begin + k * cell.h, cell.h);
      timesVector(cell.phi, state, order, next);
      [state, next] = [next, state];
    }
    if (settledAt(found) === 0 && first > 0) continue; // at most near its band
    track.excursions.push(...found.excursions);
    track.finished = true;
    return;
  }
}

/** The motion at a time, with twice the digits on the way. */
function stateAt({ a, lost, order }: FarSearch["dynamics"], departure: Float64Array, time: number): Float64Array {
  const scaled = exactlyScaled(a, time);
  addNarrow(
    scaled,
    lost.map((entry) => entry * time),
    1,
  );
  const state = workArray(order);
  timesVector(wideExponential(scaled, order).hi, departure, order, state);
  return state;
}
