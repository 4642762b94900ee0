/** Plain data throughout: a plant crosses worker boundaries and JSON unchanged. Matrices are arrays of rows. */
export type Complex = { readonly re: number; readonly im: number };
export type Rows = readonly (readonly number[])[];

/** Continuous (rates in 1/s) or sampled with a fixed period in seconds. */
export type TimeBase = { readonly kind: "continuous" } | { readonly kind: "sampled"; readonly period: number };

/** `axis` is an index into `axes`, or null for a signal that belongs to none. `scale` is the largest acceptable deviation, in `unit`. */
export type Signal = { readonly name: string; readonly unit: string; readonly axis: number | null };
export type ScaledSignal = Signal & { readonly scale: number | null };
export type InputSignal = ScaledSignal & { readonly lower: number | null; readonly upper: number | null };
export type CommandedSignal = Signal & { readonly amplitude: number };

/**
 * A linear plant about an operating point, in deviations:
 * x' = A x + B u + E w, y = C x + D u, z = H x + J u (sampled: x(k+1) = ...).
 *
 * Shapes  n states, m inputs, p outputs, q commanded quantities, w disturbances:
 *         A n×n, B n×m, C p×n, D p×m, E n×w, H q×n, J q×m. A matrix with no rows is `[]`; E without disturbances is n empty rows.
 * Limits  1 ≤ n ≤ 60, 1 ≤ m ≤ 12, 0 ≤ p ≤ 12, 0 ≤ q ≤ 12, 0 ≤ w ≤ 12
 */
export type PlantModel = {
  readonly timeBase: TimeBase;
  readonly axes: readonly { readonly name: string; readonly tag: string }[];
  readonly states: readonly ScaledSignal[];
  readonly inputs: readonly InputSignal[];
  readonly outputs: readonly ScaledSignal[];
  readonly disturbances: readonly ScaledSignal[];
  readonly commanded: readonly CommandedSignal[];
  readonly A: Rows;
  readonly B: Rows;
  readonly C: Rows;
  readonly D: Rows;
  readonly E: Rows;
  readonly H: Rows;
  readonly J: Rows;
  readonly operatingPoint: {
    readonly states: readonly number[];
    readonly inputs: readonly number[];
    readonly outputs: readonly number[];
  };
};

/** The largest plants that are taken. */
export const SIZE_LIMITS = { states: 60, inputs: 12, outputs: 12, commanded: 12, disturbances: 12 } as const;
