import type { Complex, Rows } from "../plant/model";
import type { Part } from "../plant/report";

/** One closed-loop pole or pair (im > 0), with what the trade reads off it. */
export type PoleReport = {
  readonly pole: Complex;
  readonly naturalFrequency: number | null;
  readonly damping: number | null;
  readonly timeConstant: number | null;
  /** State with the largest share of the mode after scaling; null for observer poles of a reduced-order observer. */
  readonly mainState: number | null;
};

export type GainEvidence = {
  /** m×n, u = -K x + F r */
  readonly K: Rows;
  /** How K was found and how far it can be trusted. */
  readonly method: string;
  /** Relative residual of the equation K was found from, and the bound it was held against. */
  readonly residual: number;
  readonly bound: number;
  /** Bound on the relative error of K (2-norm), or null where none is known. */
  readonly errorBound: number | null;
  /** Solution of the Riccati equation, n×n, for `weights`; null for `poles`. */
  readonly P: Rows | null;
  /** Condition of the unit-column eigenvector matrix of A - B K, 2-norm; null when defective. */
  readonly eigenvectorCondition: number | null;
  /** Largest relative error of the placed poles; null for `weights`. */
  readonly poleError: number | null;
  /**
   * For `poles`: times 10⁻ᵈ, the largest relative first-order shift of a pole when every entry of K is kept to d digits; null
   * when the eigenvectors are dependent.
   */
  readonly poleShiftPerGainDigit?: number | null;
  /** For `poles`: largest singular value of K, in its units. */
  readonly gainNorm?: number;
};

export type ReferenceEvidence = {
  /** m×q, makes z reach r at rest in the least-squares sense */
  readonly F: Rows;
  /** Final value of z per unit of each r: q×q */
  readonly steadyState: Rows;
  /** Per commanded quantity: reaches its set point at rest or not. */
  readonly reached: readonly boolean[];
  /** Why not: more commanded quantities than inputs, a zero at rest, or null when all are reached. */
  readonly obstacle: "too-few-inputs" | "zero-at-rest" | "rank" | null;
};

export type ObserverEvidence =
  | {
      readonly kind: "full";
      readonly L: Rows;
      readonly residual: number;
      readonly bound: number;
      readonly poles: readonly PoleReport[];
      readonly method: string;
    }
  | {
      /**
       * Reduced order: w' = Fw w + Fy y + Fu u (sampled: w(k+1)), xhat = Gw w + Gy (y - D u).
       * `order` = n - rank C.
       */
      readonly kind: "reduced";
      readonly order: number;
      readonly Fw: Rows;
      readonly Fy: Rows;
      readonly Fu: Rows;
      readonly Gw: Rows;
      readonly Gy: Rows;
      readonly residual: number;
      readonly bound: number;
      readonly poles: readonly PoleReport[];
      readonly method: string;
    };

/**
 * Sampled values of one response. Row-major Float64Array columns: `values[signal * samples + k]` at t = k * step.
 * Signals in this order: commanded (q), outputs (p), states (n), estimated states (n, only with an observer), inputs (m).
 */
export type ResponseRecord = {
  readonly kind: "step" | "initial" | "disturbance";
  /** With the observer in the loop, or with the full state. */
  readonly loop: "full-state" | "observer";
  /** Commanded quantity (step), input (disturbance); 0 for initial. */
  readonly source: number;
  readonly amplitude: number;
  readonly samples: number;
  readonly step: number;
  readonly values: Float64Array;
};

/** Figures over all t ≥ 0 (continuous: found by root-finding, not read off the grid). Null where the figure does not exist. */
export type StepFigures = {
  readonly loop: "full-state" | "observer";
  /** Commanded quantity that was stepped. */
  readonly source: number;
  /** Per commanded quantity; off-source entries carry only final and peak (the cross-axis peak, absolute). */
  readonly commanded: readonly SignalFigures[];
  readonly outputs: readonly SignalFigures[];
  /** Per input: largest |u| in its unit, and that over its nearest limit (null without limits). */
  readonly effort: readonly { readonly peak: number; readonly at: number | null; readonly overLimit: number | null }[];
};

export type SignalFigures = {
  readonly final: number;
  /** Largest absolute deviation over all t ≥ 0 and when (null: only approached as t grows). */
  readonly peak: number;
  readonly peakAt: number | null;
  /** Percent beyond final; null when final is negligible. */
  readonly overshoot: number | null;
  readonly undershoot: number | null;
  /** Seconds, 10 to 90 % */
  readonly rise: number | null;
  /** Seconds, last exit from the 2 % band */
  readonly settling: number | null;
};

/** What side-by-side lines up, the worst over everything commanded. In seconds, percent, the signals' units. */
export type Summary = {
  readonly worstSettling: number | null;
  readonly worstRise: number | null;
  readonly worstOvershoot: number | null;
  /** Largest |z_i| over the amplitude scale, i ≠ source, with where it happens. */
  readonly worstCrossPeak: { readonly source: number; readonly signal: number; readonly peak: number } | null;
  /** Per input, over all steps. */
  readonly peakEffort: readonly { readonly peak: number; readonly overLimit: number | null }[];
};

export type ResponseEvidence = {
  readonly horizon: number;
  readonly records: readonly ResponseRecord[];
  readonly figures: readonly StepFigures[];
  readonly summary: { readonly fullState: Summary; readonly observer: Summary | null };
};

/** Everything computed about a design. Each part stands alone: computed, or refused with its reason. */
export type Evidence = {
  readonly methodVersion: string;
  readonly gains: Part<GainEvidence>;
  readonly poles: Part<readonly PoleReport[]>;
  /** `absent` when the recipe asks for none */
  readonly reference: Part<ReferenceEvidence> | { readonly state: "absent" };
  readonly observer: Part<ObserverEvidence> | { readonly state: "absent" };
  readonly responses: Part<ResponseEvidence>;
};

export type { Complex, Rows };
