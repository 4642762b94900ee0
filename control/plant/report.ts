import type { Complex, Rows } from "./model";

/** A computed part, or the reason why it could not be computed; one failed part never hides the others. */
export type Part<T> =
  | { readonly state: "computed"; readonly value: T }
  | { readonly state: "refused"; readonly code: string; readonly data: Readonly<Record<string, unknown>> };

export type ModeReport = {
  /** In the plant's plane; a pair is listed once, with im > 0. */
  readonly pole: Complex;
  /** rad/s, of the equivalent continuous pole for a sampled plant; null where undefined (z = 0) */
  readonly naturalFrequency: number | null;
  /** null where the frequency is zero */
  readonly damping: number | null;
  /** seconds; null when the mode does not decay or grow; negative while it grows */
  readonly timeConstant: number | null;
  readonly stable: boolean;
  /** On the stability boundary within the accuracy of the eigenvalue. */
  readonly marginal: boolean;
  /** Share of each state in the mode after scaling, length n, sums to one. */
  readonly participation: readonly number[];
  /** Smallest singular value of [A - pole I, B] and [A - pole I; C] after scaling, over the norm of that matrix. */
  readonly controlDistance: number;
  readonly observeDistance: number;
  /** Below the rank tolerance: the mode cannot be moved, or cannot be seen. */
  readonly controllable: boolean;
  readonly observable: boolean;
  /** How strongly each input reaches and each output sees the mode: modal measures (Hamdan & Nayfeh 1989), 0 to 1; length m, p. */
  readonly inputShare: readonly number[];
  readonly outputShare: readonly number[];
};

export type RankReport = {
  readonly rank: number;
  readonly full: number;
  /** Singular values, largest first, behind the smallest rank decision, and the tolerance they were held against. */
  readonly singularValues: readonly number[];
  readonly tolerance: number;
  /** Unit vector in state space (scaled states) that is hardest to reach or see. */
  readonly weakestDirection: readonly number[];
  readonly weakestValue: number;
};

export type ZeroReport = {
  readonly value: Complex;
  readonly minimumPhase: boolean;
  /** Inputs that move as this times e^(zero t), from this state on, leave every output at rest; absent where it is not unique. */
  readonly inputDirection?: readonly Complex[];
  readonly stateDirection?: readonly Complex[];
  /** Weights of the outputs in the combination that answers to no input at the zero; absent where it is not unique. */
  readonly outputDirection?: readonly Complex[];
};

export type CouplingReport = {
  /** axes × axes: share of the Frobenius norm of scaled A that stands in each block, row axis acted on by column axis. Last row and column: signals of no axis. */
  readonly blocks: Rows;
  /** Relative gain array at zero frequency from inputs to commanded quantities, or its limit there; null where neither exists. */
  readonly relativeGain: Rows | null;
  /** What the array is: of the gains at rest, the limit of a plant that integrates or blocks at rest, or why there is none. */
  readonly relativeGainBasis?: "at-rest" | "limit" | "not-square" | "no-limit";
};

export type ScalingReport = {
  /** Largest over smallest nonzero entry of A, B, C as given and after scaling by the declared deviations. */
  readonly spreadAsGiven: number;
  readonly spreadScaled: number;
  readonly caution: boolean;
  /** States, inputs and outputs without a declared deviation or limit, so that one was assumed. */
  readonly assumedStates: readonly number[];
  readonly assumedInputs: readonly number[];
  readonly assumedOutputs: readonly number[];
};

/** Declared continuous but looking sampled, or the reverse. */
export type TimeBaseSuspicion = { readonly looks: "continuous" | "sampled" } | null;

export type PlantChecks = {
  readonly modes: Part<readonly ModeReport[]>;
  readonly controllability: Part<RankReport>;
  readonly observability: Part<RankReport>;
  readonly stabilizable: Part<boolean>;
  readonly detectable: Part<boolean>;
  readonly zeros: Part<readonly ZeroReport[]>;
  readonly coupling: Part<CouplingReport>;
  readonly scaling: ScalingReport;
  readonly timeBaseSuspicion: TimeBaseSuspicion;
};
