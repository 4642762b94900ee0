import type { TimeBase } from "./model";

/** Entries as typed: a number, or an expression in named parameters. */
export type EntryRows = readonly (readonly string[])[];

export type ParameterContent = {
  readonly name: string;
  readonly expression: string;
  readonly unit: string;
  readonly note: string;
};

export type SignalContent = { readonly name: string; readonly unit: string; readonly axis: number | null };
export type ScaledContent = SignalContent & { readonly scale: number | null };

/**
 * A plant as its author typed it; `evaluatePlant` turns it into a `PlantModel`.
 * D, J null: zeros. `commanded` null: the outputs, each with amplitude 1 (or its scale). Operating point null: zeros.
 */
export type PlantContent = {
  readonly version: 1;
  readonly timeBase: TimeBase;
  readonly axes: readonly { readonly name: string; readonly tag: string }[];
  readonly parameters: readonly ParameterContent[];
  readonly states: readonly ScaledContent[];
  readonly inputs: readonly (ScaledContent & { readonly lower: number | null; readonly upper: number | null })[];
  readonly outputs: readonly ScaledContent[];
  readonly disturbances: readonly ScaledContent[];
  readonly commanded: readonly (SignalContent & { readonly amplitude: number })[] | null;
  readonly A: EntryRows;
  readonly B: EntryRows;
  readonly C: EntryRows;
  readonly D: EntryRows | null;
  readonly E: EntryRows | null;
  readonly H: EntryRows | null;
  readonly J: EntryRows | null;
  readonly operatingPoint: {
    readonly states: readonly number[];
    readonly inputs: readonly number[];
    readonly outputs: readonly number[];
  } | null;
  /** Where the numbers come from and how far they hold. */
  readonly source: string;
};
