import type { Complex, Rows } from "../plant/model";

/**
 * One wanted pole or conjugate pair. `real` and `pair` are in the plant's own plane (s, or z when sampled);
 * `damping` (frequency in rad/s) and `time-constant` (s) are always in s and are mapped by z = exp(s h) for a sampled plant.
 */
export type PoleEntry =
  | { readonly kind: "real"; readonly value: number }
  | { readonly kind: "pair"; readonly re: number; readonly im: number }
  | { readonly kind: "damping"; readonly frequency: number; readonly damping: number }
  | { readonly kind: "time-constant"; readonly seconds: number };

/** Weights of x'Q x + 2 x'S u + u'R u. */
export type Weights =
  | {
      /** Bryson & Ho: weight = 1 / (largest acceptable deviation)²; null leaves a state unweighted. */
      readonly form: "deviations";
      readonly states: readonly (number | null)[];
      readonly inputs: readonly number[];
    }
  | {
      readonly form: "matrices";
      /** n×n symmetric positive semidefinite */
      readonly state: Rows;
      /** m×m symmetric positive definite */
      readonly input: Rows;
    };

export type WantedPoles = {
  readonly poles: readonly PoleEntry[];
  /**
   * Place poles repeated, or lying together, more often than there are independent inputs (outputs, of an observer). Their
   * eigenvectors are then dependent and small errors move them far; without this such poles are refused.
   */
  readonly allowDefective?: true;
};

export type ObserverRecipe =
  | { readonly kind: "none" }
  | ({ readonly kind: "poles" } & WantedPoles)
  /** Steady-state Kalman: spectral densities for a continuous plant, variances per sample for a sampled one. */
  | { readonly kind: "noise"; readonly process: Rows; readonly measurement: Rows }
  /** Reduced order (Luenberger): n minus rank C poles. */
  | ({ readonly kind: "reduced" } & WantedPoles);

/** What the stored responses show. `horizon` null: chosen from the slowest settling. All in the signals' units, as deviations. */
export type ResponseTest = {
  readonly horizon: number | null;
  readonly initialState: readonly number[];
  readonly inputDisturbance: readonly number[];
};

type RecipeBase = {
  readonly version: 1;
  readonly observer: ObserverRecipe;
  readonly reference: { readonly kind: "feed-through" } | { readonly kind: "none" };
  readonly test: ResponseTest;
  /** A written reason beside a choice, keyed by what it explains: `weights`, `poles`, `observer`, `reference`, `state:2`, ... */
  readonly reasons: Readonly<Record<string, string>>;
};

export type WeightsRecipe = RecipeBase & {
  readonly method: "weights";
  readonly weights: Weights;
  /** n×m cross weight S, or null for zero */
  readonly crossWeight: Rows | null;
  /** Continuous: every pole left of -value (1/s), value ≥ 0. Sampled: every pole inside radius exp(-value h). null: none asked for. */
  readonly degreeOfStability: number | null;
};

export type PolesRecipe = RecipeBase & { readonly method: "poles" } & WantedPoles;

/** How a design is made. A versioned document that never holds results. */
export type Recipe = WeightsRecipe | PolesRecipe;

export type ResolvedPoles = readonly Complex[];
