import { z } from "zod";
import { Finite, inUnit, OwnUnit, Plain, Rows, Seconds } from "./common";

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

const PoleUnit = inUnit(Finite, "in rad/s; of a sampled plant, in the z-plane, without a unit");
export const Complex = z.strictObject({ re: PoleUnit, im: PoleUnit });
const MaybeSeconds = inUnit(Finite.nullable(), "in seconds");
const MaybePlain = inUnit(Finite.nullable(), "without a unit");
const MaybePercent = inUnit(Finite.nullable(), "in percent of the final value");
const MaybeLimits = inUnit(Finite.nullable(), "over the nearest limit of the input, without a unit");
const SignalUnit = inUnit(Finite, "in the unit of the signal");
const InputUnit = inUnit(Finite, "in the unit of the input");
const PlainRows = inUnit(Rows, "without a unit");
const Shares = inUnit(z.array(Finite), "without a unit");
/** Per second where the plant is continuous, per step where it is sampled. */
const rate = (of: string) => inUnit(Rows, `${of}, per second; of a sampled plant per step`);

export const PoleReport = z.strictObject({
  pole: Complex,
  naturalFrequency: inUnit(Finite.nullable(), "in rad/s"),
  damping: MaybePlain,
  timeConstant: MaybeSeconds,
  mainState: z.int().nullable(),
});

export const GainEvidence = z.strictObject({
  K: inUnit(Rows, "unit of the row's input over unit of the column's state"),
  method: z.string(),
  residual: Plain,
  bound: Plain,
  errorBound: MaybePlain,
  P: inUnit(Rows.nullable(), "unit of the cost over the units of both states"),
  eigenvectorCondition: MaybePlain,
  poleError: MaybePlain,
  poleShiftPerGainDigit: MaybePlain.optional(),
  gainNorm: Plain.optional(),
});

export const ReferenceEvidence = z.strictObject({
  F: inUnit(Rows, "unit of the row's input over unit of the column's commanded quantity"),
  steadyState: inUnit(Rows, "unit of the row's commanded quantity over that of the column"),
  reached: z.array(z.boolean()),
  obstacle: z.enum(["too-few-inputs", "zero-at-rest", "rank"]).nullable(),
});

const verified = { residual: Plain, bound: Plain, poles: z.array(PoleReport), method: z.string() };
export const ObserverEvidence = z.discriminatedUnion("kind", [
  z.strictObject({
    kind: z.literal("full"),
    L: rate("unit of the row's state over unit of the column's output"),
    ...verified,
  }),
  z.strictObject({
    kind: z.literal("reduced"),
    order: z.int(),
    Fw: rate("between the observer's own coordinates"),
    Fy: rate("own coordinate over unit of the column's output"),
    Fu: rate("own coordinate over unit of the column's input"),
    Gw: inUnit(Rows, "unit of the row's state over own coordinate"),
    Gy: inUnit(Rows, "unit of the row's state over unit of the column's output"),
    ...verified,
  }),
]);

const SignalFigures = z.strictObject({
  final: SignalUnit,
  peak: SignalUnit,
  peakAt: MaybeSeconds,
  overshoot: MaybePercent,
  undershoot: MaybePercent,
  rise: MaybeSeconds,
  settling: MaybeSeconds,
});
export const Loop = z.enum(["full-state", "observer"]);
export const StepFigures = z.strictObject({
  loop: Loop,
  source: z.int(),
  commanded: z.array(SignalFigures),
  outputs: z.array(SignalFigures),
  effort: z.array(z.strictObject({ peak: InputUnit, at: MaybeSeconds, overLimit: MaybeLimits })),
});
const CrossPeak = inUnit(Finite, "over the signal's own test amplitude, without a unit");
export const Summary = z.strictObject({
  worstSettling: MaybeSeconds,
  worstRise: MaybeSeconds,
  worstOvershoot: MaybePercent,
  worstCrossPeak: z.strictObject({ source: z.int(), signal: z.int(), peak: CrossPeak }).nullable(),
  /** In the order of the plant's inputs. */
  peakEffort: z.array(z.strictObject({ peak: InputUnit, overLimit: MaybeLimits })),
});
export type Summary = z.infer<typeof Summary>;

/** Everything of the responses but the curves, which are fetched apart. */
export const ResponseFigures = z.strictObject({
  horizon: Seconds,
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
  amplitude: inUnit(Finite, OwnUnit),
  unit: z.string(),
  step: Seconds,
  samples: z.int(),
  signals: z.array(
    z.strictObject({ role: SignalRole, index: z.int(), name: z.string(), unit: z.string(), axis: z.int().nullable() }),
  ),
  values: inUnit(z.array(z.array(Finite)), "each row in the unit of its signal"),
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
  naturalFrequency: inUnit(Finite.nullable(), "in rad/s"),
  damping: MaybePlain,
  timeConstant: MaybeSeconds,
  stable: z.boolean(),
  marginal: z.boolean(),
  participation: Shares,
  controlDistance: Plain,
  observeDistance: Plain,
  controllable: z.boolean(),
  observable: z.boolean(),
  inputShare: Shares,
  outputShare: Shares,
});
const RankReport = z.strictObject({
  rank: z.int(),
  full: z.int(),
  singularValues: Shares,
  tolerance: Plain,
  weakestDirection: Shares,
  weakestValue: Plain,
});
const Direction = z.array(z.strictObject({ re: Plain, im: Plain }));
const ZeroReport = z.strictObject({
  value: Complex,
  minimumPhase: z.boolean(),
  inputDirection: Direction.optional(),
  stateDirection: Direction.optional(),
  outputDirection: Direction.optional(),
});

export const ChecksReply = z.strictObject({
  modes: part(z.array(ModeReport)),
  controllability: part(RankReport),
  observability: part(RankReport),
  stabilizable: part(z.boolean()),
  detectable: part(z.boolean()),
  zeros: part(z.array(ZeroReport)),
  coupling: part(
    z.strictObject({
      blocks: PlainRows,
      relativeGain: PlainRows.nullable(),
      relativeGainBasis: z.enum(["at-rest", "limit", "not-square", "no-limit"]).optional(),
    }),
  ),
  scaling: z.strictObject({
    spreadAsGiven: Plain,
    spreadScaled: Plain,
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
