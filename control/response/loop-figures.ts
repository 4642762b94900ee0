import type { StepFigures } from "../design/evidence";
import { NumericalError } from "../errors";
import { POINTS } from "./cell-basis";
import { type DistinctRows, distinctRows } from "./distinct-rows";
import { finishFar, type Halt } from "./far-exit";
import { boundaryDistance, type Drive, type LoopDynamics } from "./loop-dynamics";
import type { Experiment } from "./loop-experiments";
import { type ModalBound, modalBound } from "./modal-bound";
import { largestDeparture, NO_BAND, type SignalTrack, settledAt, startTrack } from "./signal-track";
import { peakOf, SETTLING_BAND, signalFigures } from "./step-figures";
import { tailBound } from "./tail-bound";
import { continuousWalker, ROUGHLY_RESOLVED, walkContinuous } from "./walk-continuous";
import { BLOCK, sampledWalker, walkSampled } from "./walk-sampled";

/** Way up and down from the operating point to an input's limits; null: no limit. */
export type InputRoom = { readonly up: number | null; readonly down: number | null };

export type LoopFigures = {
  readonly steps: readonly Omit<StepFigures, "loop">[];
  /** Longest settling found in any experiment, seconds; 0 when there is none; that of steps alone when no more was sought. */
  readonly longest: number;
};

/** Multiplications allowed for the figures of one loop, and what a walk may take whatever it costs. */
const WORK = 1e9;
const CELLS = { least: 300, most: 60_000 };
const SAMPLES = { least: 2_000, most: 400_000 };

/** Cells after which a motion that fades slowly is finished by its envelope, where that can be done. */
const PATIENCE = 1500;

type Walk = (drive: Drive, tracks: readonly SignalTrack[]) => void;

/** Walks for the figures of steps, which watch everything, and for settling times, which watch the shown signals alone. */
type Walks = { readonly step: Walk; readonly settling: Walk };

/**
 * Figures of every step and, where it is sought, the longest settling time of one loop, over all t ≥ 0.
 *
 * Units     signals' units, seconds, percent
 * Throws    on-stability-boundary
 * Limits    about 10⁹ multiplications and at most 60 000 cells (400 000 samples) per experiment; what is not proved by then is
 *           null. A slow swing that is left alone after 1500 cells is finished by its envelope, whatever its damping
 * Accuracy  continuous: values 1e-11, times 1e-11 of the cell over the slope; sampled: the samples themselves. The settling of
 *           starts and disturbances, which only the time axis needs, is known to about 1e-6
 */
export function loopFigures(
  dynamics: LoopDynamics,
  experiments: readonly Experiment[],
  room: readonly InputRoom[],
  seeksLongest: boolean,
): LoopFigures {
  const { counts } = dynamics.loop;
  const shown = counts.commanded + counts.outputs;
  const watched = Array.from({ length: shown }, (_, i) => i);
  if (experiments.some(({ kind }) => kind === "step"))
    for (let row = dynamics.signals - counts.inputs; row < dynamics.signals; row++) watched.push(row);
  const distinct = distinctRows(dynamics, watched);
  const shownRows = Math.max(...distinct.of.slice(0, shown), -1) + 1; // the shown ones come first
  const walks = walksOf(dynamics, distinct.rows, experiments.length);
  const steps: Omit<StepFigures, "loop">[] = [];
  let longest = 0;
  for (const { kind, source, drive } of experiments) {
    if (kind !== "step") {
      if (seeksLongest) longest = Math.max(longest, longestSettling(walks.settling, drive, distinct, shownRows));
      continue;
    }
    const tracks = distinct.places.map((row, i) => {
      const final = drive.final[row];
      const start = startOf(distinct, drive, i);
      if (i >= shownRows) return startTrack(final, NO_BAND, start, "effort");
      return startTrack(final, { width: SETTLING_BAND * Math.abs(final) }, start, "figures");
    });
    walks.step(drive, tracks);
    const found = distinct.of.map((place) => tracks[place]);
    const commanded = found.slice(0, counts.commanded).map((track, i) => signalFigures(track, i === source));
    const outputs = found.slice(counts.commanded, shown).map((track) => signalFigures(track, true));
    const effort = found.slice(shown).map((track, i) => effortOf(track, room[i]));
    steps.push({ source, commanded, outputs, effort });
    for (const { settling } of [commanded[source], ...outputs]) longest = Math.max(longest, settling ?? 0);
  }
  return { steps, longest };
}

function longestSettling(walk: Walk, drive: Drive, distinct: DistinctRows, shownRows: number): number {
  const tracks = distinct.places
    .slice(0, shownRows)
    .map((row, i) => startTrack(drive.final[row], { share: SETTLING_BAND }, startOf(distinct, drive, i), "settling"));
  walk(drive, tracks);
  return tracks.reduce((longest, track) => Math.max(longest, settlingOf(track)), 0);
}

/** When a signal of a free or disturbed motion stays within 2 % of its largest departure; 0 for one that hardly moves. */
function settlingOf(track: SignalTrack): number {
  return track.finished && largestDeparture(track) > 8 * track.noise ? settledAt(track) : 0;
}

function effortOf(track: SignalTrack, { up, down }: InputRoom): StepFigures["effort"][number] {
  const { peak, peakAt } = peakOf(track);
  const top = Math.max(track.high.value, track.final, 0);
  const bottom = Math.max(-track.low.value, -track.final, 0);
  const shares: number[] = [];
  if (up !== null && up > 0) shares.push(top / up);
  if (down !== null && down > 0) shares.push(bottom / down);
  return { peak, at: peakAt, overLimit: shares.length > 0 ? Math.max(...shares) : null };
}

function walksOf(dynamics: LoopDynamics, rows: Float64Array, experiments: number): Walks {
  const { a, order, period } = dynamics;
  const signals = order === 0 ? 0 : rows.length / order;
  const tail = tailBound(a, order, rows, period !== null);
  if (tail === null) throw new NumericalError("on-stability-boundary", { distance: boundaryDistance(dynamics) });
  const allowed = (work: number, { least, most }: typeof CELLS) =>
    Math.min(most, Math.max(least, Math.floor(WORK / (Math.max(1, experiments) * work))));
  if (period !== null) {
    const limit = allowed(signals * order + (order * order) / BLOCK, SAMPLES);
    const walker = sampledWalker(a, order, rows, period, tail);
    const walk: Walk = (drive, tracks) => walkSampled(walker, drive.departure, tracks, limit);
    return { step: walk, settling: walk };
  }
  const limit = allowed(signals * POINTS * (order + POINTS) + order * order, CELLS);
  const walker = continuousWalker(dynamics, rows, tail);
  let bound: ModalBound | null | undefined; // made only for a loop that fades too slowly to be followed
  const walk =
    (resolved?: number): Walk =>
    ({ departure }, tracks) => {
      let halt: Halt | null = { time: 0, state: departure };
      for (const patience of [Math.min(limit, PATIENCE), limit]) {
        halt = walkContinuous(walker, halt, tracks, patience, resolved);
        if (halt === null) return;
        if (bound === undefined) bound = modalBound(a, order, rows);
        if (bound) finishFar({ dynamics, bound, cell: walker.ladder(walker.firstLevel) }, departure, halt, tracks);
        if (tracks.every(({ finished }) => finished)) return;
      }
    };
  return { step: walk(), settling: walk(ROUGHLY_RESOLVED) };
}

/** Value of a signal at t = 0. */
function startOf({ places, rows }: DistinctRows, { departure, final }: Drive, i: number): number {
  const order = departure.length;
  let sum = 0;
  for (let k = 0; k < order; k++) sum += rows[i * order + k] * departure[k];
  return final[places[i]] + sum;
}
