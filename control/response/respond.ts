import type { Matrix } from "ml-matrix";
import type { ResponseEvidence, ResponseRecord } from "../design/evidence";
import { NumericalError } from "../errors";
import { workScope } from "../linalg/work-array";
import type { Complex } from "../plant/model";
import { flatLoop, type LoopPlant, type ObserverInLoop, type SignalCounts } from "./close-loop";
import { type LoopDynamics, prepareLoop } from "./loop-dynamics";
import { type Experiment, type Experiments, loopExperiments } from "./loop-experiments";
import { type InputRoom, type LoopFigures, loopFigures } from "./loop-figures";
import { responseHorizon } from "./response-horizon";
import { recordMaker, type TimeGrid, timeGrid } from "./sample-record";
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
  /** Eigenvalues of A - B K and of the observer's error, where they are at hand; found here otherwise. */
  readonly poles?: { readonly regulator: readonly Complex[]; readonly observer: readonly Complex[] };
};

type Analysed = {
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
 * Accuracy  samples about 1e-14 of the largest value, from transitions that are correctly rounded of the loop as given
 * Source    the matrix exponential at the samples (see `matrixExponential`); figures: IEC 60050-351
 */
export function respond(request: ResponseRequest): ResponseEvidence {
  return workScope(() => responsesOf(request));
}

function responsesOf(request: ResponseRequest): ResponseEvidence {
  requireLengths(request);
  const { amplitudes } = request.experiments;
  const fullState = analyse(request, null);
  const observer = request.observer ? analyse(request, request.observer) : null;
  const loops = observer ? [fullState, observer] : [fullState];
  const longest = loops.reduce((most, { figures }) => Math.max(most, figures.longest), 0);
  const poles = loops.flatMap(({ dynamics }) => dynamics.poles);
  const horizon = responseHorizon(request.horizon, longest, poles, request.period);
  const steps = fullState.figures.steps;
  const stepCount = request.observer ? steps.length : 0;
  const wanted = loops.reduce((sum, { experiments, dynamics }) => sum + experiments.length * dynamics.signals, 0);
  const all = wanted + (observer ? stepCount * observer.dynamics.signals : 0);
  const most = Math.max(LEAST_SAMPLES, Math.min(MOST_SAMPLES, Math.floor(MOST_VALUES / Math.max(1, all))));
  const grid = timeGrid(horizon, request.period, most);
  const records = recordsOf("full-state", fullState, grid);
  const summary = summarise(steps, amplitudes, request.K.rows);
  if (!observer)
    return {
      horizon,
      records,
      figures: steps.map((step) => ({ loop: "full-state", ...step })),
      summary: { fullState: summary, observer: null },
    };
  const { counts } = fullState.dynamics.loop;
  const followed = records.filter(({ kind }) => kind === "step").map((record) => withEstimates(record, counts));
  return {
    horizon,
    records: [...records, ...followed, ...recordsOf("observer", observer, grid)],
    figures: (["full-state", "observer"] as const).flatMap((loop) => steps.map((step) => ({ loop, ...step }))),
    summary: { fullState: summary, observer: summary },
  };
}

/** A loop with its experiments; a set point does not disturb the estimate, so steps are those of the full state. */
function analyse(request: ResponseRequest, observer: ObserverInLoop | null): Analysed {
  const { plant, period, K, F, experiments, room, horizon } = request;
  const known = request.poles ? [...request.poles.regulator, ...(observer ? request.poles.observer : [])] : null;
  const dynamics = prepareLoop(flatLoop(plant, K, F, observer), period, known);
  const amplitudes = experiments.amplitudes.map((amplitude) => (observer ? 0 : amplitude));
  const list = loopExperiments(dynamics, { ...experiments, amplitudes });
  return { dynamics, experiments: list, figures: workScope(() => loopFigures(dynamics, list, room, horizon === null)) };
}

function recordsOf(loop: ResponseRecord["loop"], { dynamics, experiments }: Analysed, grid: TimeGrid): ResponseRecord[] {
  if (experiments.length === 0) return [];
  return workScope(() => {
    const valuesOf = recordMaker(dynamics, grid);
    return experiments.map(({ kind, source, amplitude, drive }) => ({
      kind,
      loop,
      source,
      amplitude,
      ...grid,
      values: valuesOf(drive),
    }));
  });
}

/** The step of the loop with observer: that of the full state, with the states once more as their own estimates. */
function withEstimates(record: ResponseRecord, { commanded, outputs, states, inputs }: SignalCounts): ResponseRecord {
  const { samples, values } = record;
  const shown = commanded + outputs;
  const whole = new Float64Array((shown + 2 * states + inputs) * samples);
  whole.set(values.subarray(0, (shown + states) * samples));
  whole.set(values.subarray(shown * samples), (shown + states) * samples);
  return { ...record, loop: "observer", values: whole };
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
