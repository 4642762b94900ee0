import { z } from "zod";
import { Finite, Rows } from "./common";

/** A refused part says in the reader's own signal names which assumption failed and what to change. */
export const Refusal = z.strictObject({
  state: z.literal("refused"),
  code: z.string(),
  data: z.record(z.string(), z.unknown()),
  title: z.string(),
  sentence: z.string(),
  nextStep: z.string(),
});
export type Refusal = z.infer<typeof Refusal>;

export const Absent = z.strictObject({ state: z.literal("absent") });

export function part<T extends z.ZodType>(value: T) {
  return z.discriminatedUnion("state", [z.strictObject({ state: z.literal("computed"), value }), Refusal]);
}
function optionalPart<T extends z.ZodType>(value: T) {
  return z.discriminatedUnion("state", [z.strictObject({ state: z.literal("computed"), value }), Refusal, Absent]);
}

export const Complex = z.strictObject({ re: Finite, im: Finite });
const MaybeNumber = Finite.nullable();

export const PoleReport = z.strictObject({
  pole: Complex,
  naturalFrequency: MaybeNumber,
  damping: MaybeNumber,
  timeConstant: MaybeNumber,
  mainState: z.int().nullable(),
});

export const GainEvidence = z.strictObject({
  K: Rows,
  method: z.string(),
  residual: Finite,
  bound: Finite,
  errorBound: MaybeNumber,
  P: Rows.nullable(),
  eigenvectorCondition: MaybeNumber,
  poleError: MaybeNumber,
});

export const ReferenceEvidence = z.strictObject({
  F: Rows,
  steadyState: Rows,
  reached: z.array(z.boolean()),
  obstacle: z.enum(["too-few-inputs", "zero-at-rest", "rank"]).nullable(),
});

const verified = { residual: Finite, bound: Finite, poles: z.array(PoleReport), method: z.string() };
export const ObserverEvidence = z.discriminatedUnion("kind", [
  z.strictObject({ kind: z.literal("full"), L: Rows, ...verified }),
  z.strictObject({ kind: z.literal("reduced"), order: z.int(), Fw: Rows, Fy: Rows, Fu: Rows, Gw: Rows, Gy: Rows, ...verified }),
]);

const SignalFigures = z.strictObject({
  final: Finite,
  peak: Finite,
  peakAt: MaybeNumber,
  overshoot: MaybeNumber,
  undershoot: MaybeNumber,
  rise: MaybeNumber,
  settling: MaybeNumber,
});
export const Loop = z.enum(["full-state", "observer"]);
export const StepFigures = z.strictObject({
  loop: Loop,
  source: z.int(),
  commanded: z.array(SignalFigures),
  outputs: z.array(SignalFigures),
  effort: z.array(z.strictObject({ peak: Finite, at: MaybeNumber, overLimit: MaybeNumber })),
});
export const Summary = z.strictObject({
  worstSettling: MaybeNumber,
  worstRise: MaybeNumber,
  worstOvershoot: MaybeNumber,
  worstCrossPeak: z.strictObject({ source: z.int(), signal: z.int(), peak: Finite }).nullable(),
  peakEffort: z.array(z.strictObject({ peak: Finite, overLimit: MaybeNumber })),
});
export type Summary = z.infer<typeof Summary>;

/** Everything of the responses but the curves, which are fetched apart. */
export const ResponseFigures = z.strictObject({
  horizon: Finite,
  figures: z.array(StepFigures),
  summary: z.strictObject({ fullState: Summary, observer: Summary.nullable() }),
});

export type ResponseFigures = z.infer<typeof ResponseFigures>;

export const EvidenceReply = z.strictObject({
  methodVersion: z.string(),
  gains: part(GainEvidence),
  poles: part(z.array(PoleReport)),
  reference: optionalPart(ReferenceEvidence),
  observer: optionalPart(ObserverEvidence),
  responses: part(ResponseFigures),
});
export type EvidenceReply = z.infer<typeof EvidenceReply>;

export const SignalRole = z.enum(["commanded", "output", "state", "estimate", "input"]);
export const ResponseKind = z.enum(["step", "initial", "disturbance"]);

/** One response with its signals named; `values[i][k]` belongs to `signals[i]` at t = k · step seconds. */
export const ResponseCurves = z.strictObject({
  kind: ResponseKind,
  loop: Loop,
  source: z.int(),
  sourceName: z.string(),
  amplitude: Finite,
  unit: z.string(),
  step: Finite,
  samples: z.int(),
  signals: z.array(
    z.strictObject({ role: SignalRole, index: z.int(), name: z.string(), unit: z.string(), axis: z.int().nullable() }),
  ),
  values: z.array(z.array(Finite)),
});
export type ResponseCurves = z.infer<typeof ResponseCurves>;
export const ResponseList = z.strictObject({ items: z.array(ResponseCurves) });

/** `signals` is a comma-separated list of roles; without it: commanded, output and input. */
export const ResponseQuery = z.strictObject({
  kind: ResponseKind.default("step"),
  loop: z.enum(["full-state", "observer", "both"]).default("both"),
  /** Place of the commanded quantity (step) or input (disturbance), from zero; without it: all. */
  source: z.coerce.number().int().min(0).max(11).optional(),
  signals: z
    .string()
    .max(60)
    .default("commanded,output,input")
    .transform((text) => text.split(","))
    .pipe(z.array(SignalRole).min(1)),
});
export type ResponseQuery = z.infer<typeof ResponseQuery>;

const ModeReport = z.strictObject({
  pole: Complex,
  naturalFrequency: MaybeNumber,
  damping: MaybeNumber,
  timeConstant: MaybeNumber,
  stable: z.boolean(),
  marginal: z.boolean(),
  participation: z.array(Finite),
  controlDistance: Finite,
  observeDistance: Finite,
  controllable: z.boolean(),
  observable: z.boolean(),
  inputShare: z.array(Finite),
  outputShare: z.array(Finite),
});
const RankReport = z.strictObject({
  rank: z.int(),
  full: z.int(),
  singularValues: z.array(Finite),
  tolerance: Finite,
  weakestDirection: z.array(Finite),
  weakestValue: Finite,
});

export const ChecksReply = z.strictObject({
  modes: part(z.array(ModeReport)),
  controllability: part(RankReport),
  observability: part(RankReport),
  stabilizable: part(z.boolean()),
  detectable: part(z.boolean()),
  zeros: part(z.array(z.strictObject({ value: Complex, minimumPhase: z.boolean() }))),
  coupling: part(z.strictObject({ blocks: Rows, relativeGain: Rows.nullable() })),
  scaling: z.strictObject({
    spreadAsGiven: Finite,
    spreadScaled: Finite,
    caution: z.boolean(),
    assumedStates: z.array(z.int()),
    assumedInputs: z.array(z.int()),
    assumedOutputs: z.array(z.int()),
  }),
  timeBaseSuspicion: z.strictObject({ looks: z.enum(["continuous", "sampled"]) }).nullable(),
  /** The same in plain words, the most urgent first. */
  findings: z.array(
    z.strictObject({ key: z.string(), tone: z.enum(["met", "caution", "not-met"]), headline: z.string(), sentence: z.string() }),
  ),
  /** A short label of each mode, in the order of `modes`. */
  modeLabels: z.array(z.string()),
});
export type ChecksReply = z.infer<typeof ChecksReply>;
