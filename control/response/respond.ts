import type { Matrix } from "ml-matrix";
import type { ResponseEvidence, ResponseRecord } from "../design/evidence";
import { NumericalError } from "../errors";
import { closeLoop, type LoopPlant, type ObserverInLoop } from "./close-loop";
import { type LoopDynamics, prepareLoop } from "./loop-dynamics";
import { type Experiment, type Experiments, loopExperiments } from "./loop-experiments";
import { type InputRoom, type LoopFigures, loopFigures } from "./loop-figures";
import { responseHorizon } from "./response-horizon";
import { recordMaker, timeGrid } from "./sample-record";
import { summarise } from "./summarise";

export type ResponseRequest = {
  readonly plant: LoopPlant;
  /** Seconds; null for a continuous plant */
  readonly period: number | null;
  readonly K: Matrix;
  /** Reference gain; null: no steps */
  readonly F: Matrix | null;
  readonly observer: ObserverInLoop | null;
  readonly experiments: Experiments;
  readonly room: readonly InputRoom[];
  /** Seconds; null: from the longest settling time */
  readonly horizon: number | null;
};

type Analysed = {
  readonly loop: "full-state" | "observer";
  readonly dynamics: LoopDynamics;
  readonly experiments: readonly Experiment[];
  readonly figures: LoopFigures;
};

const MOST_SAMPLES = 401;
const LEAST_SAMPLES = 101;
/** Numbers kept per design; responses of large plants are thinned to stay below. */
const MOST_VALUES = 2 ** 21;

/**
 * Responses of a design to steps of what is commanded, to a start away from rest and to steps at its inputs, with the full
 * state and, where there is an observer, with its estimate instead; all over one horizon.
 *
 * Shapes    as `closeLoop`; experiments q, n and m numbers; room m
 * Units     the signals' units, seconds, percent
 * Throws    shape-mismatch; not-stabilising { pole }; on-stability-boundary; not-finite; too-large
 * Limits    401 moments per record (fewer, down to 101, beyond two million numbers); figures as in `loopFigures`
 * Accuracy  samples about 1e-14 of the largest value, times the norm of A over its slowest rate where that is large
 * Source    the matrix exponential at the samples (see `matrixExponential`); figures: IEC 60050-351
 */
export function respond(request: ResponseRequest): ResponseEvidence {
  requireLengths(request);
  const loops: Analysed[] = [analyse(request, null)];
  if (request.observer) loops.push(analyse(request, request.observer));
  const longest = loops.reduce((most, { figures }) => Math.max(most, figures.longest), 0);
  const poles = loops.flatMap(({ dynamics }) => dynamics.poles);
  const horizon = responseHorizon(request.horizon, longest, poles, request.period);
  const wanted = loops.reduce((sum, { experiments, dynamics }) => sum + experiments.length * dynamics.signals, 0);
  const most = Math.max(LEAST_SAMPLES, Math.min(MOST_SAMPLES, Math.floor(MOST_VALUES / Math.max(1, wanted))));
  const { amplitudes } = request.experiments;
  const inputs = request.K.rows;
  return {
    horizon,
    records: loops.flatMap((analysed) => recordsOf(analysed, horizon, most)),
    figures: loops.flatMap(({ loop, figures }) => figures.steps.map((step) => ({ loop, ...step }))),
    summary: {
      fullState: summarise(loops[0].figures.steps, amplitudes, inputs),
      observer: loops.length > 1 ? summarise(loops[1].figures.steps, amplitudes, inputs) : null,
    },
  };
}

function analyse({ plant, period, K, F, experiments, room }: ResponseRequest, observer: ObserverInLoop | null): Analysed {
  const dynamics = prepareLoop(closeLoop(plant, K, F, observer), period);
  const list = loopExperiments(dynamics, experiments);
  return { loop: observer ? "observer" : "full-state", dynamics, experiments: list, figures: loopFigures(dynamics, list, room) };
}

function recordsOf({ loop, dynamics, experiments }: Analysed, horizon: number, most: number): ResponseRecord[] {
  const grid = timeGrid(horizon, dynamics.period, most);
  if (experiments.length === 0) return [];
  const valuesOf = recordMaker(dynamics, grid);
  return experiments.map(({ kind, source, amplitude, drive }) => ({
    kind,
    loop,
    source,
    amplitude,
    ...grid,
    values: valuesOf(drive),
  }));
}

function requireLengths({ plant, experiments, room }: ResponseRequest): void {
  const expected = [plant.H.rows, plant.A.rows, plant.B.columns, plant.B.columns];
  const given = [
    experiments.amplitudes.length,
    experiments.initialState.length,
    experiments.inputDisturbance.length,
    room.length,
  ];
  if (expected.some((length, i) => length !== given[i]))
    throw new NumericalError("shape-mismatch", { what: "test", expected, given });
}
