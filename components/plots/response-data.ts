/** One small multiple: what one quantity does after one command. All lines share the grid's samples and step. */
export type ResponseCell = {
  readonly values: ArrayLike<number>;
  /** The observer's estimate of the same quantity: a thin line of the same hue. */
  readonly estimated?: ArrayLike<number> | null;
  /** The same with the full state fed back, where `values` have the observer in the loop: a thin line of the same hue. */
  readonly fullState?: ArrayLike<number> | null;
  /** The last saved revision: a thin grey line. */
  readonly ghost?: ArrayLike<number> | null;
  /** Value at rest, drawn dotted; null where there is none. */
  readonly final: number | null;
  /** Largest deviation over all time, signed, and when in seconds (null: only approached). */
  readonly peak: number | null;
  readonly peakAt: number | null;
  /** Seconds; null where it does not settle, or where the figure means nothing. */
  readonly settling?: number | null;
  /** The commanded quantity itself: its final value is captioned rather than its peak. */
  readonly own?: boolean;
};

/** One quantity of the machine, the same scale in every column. */
export type ResponseRow = {
  readonly key: string;
  readonly label: string;
  readonly unit: string;
  readonly axis: number | null;
  readonly kind: "commanded" | "output" | "state" | "effort";
  /** Of an input, as deviations like the values; drawn as lines. */
  readonly limits?: { readonly lower: number | null; readonly upper: number | null };
  /** Held between samples, so drawn as stairs. */
  readonly held?: boolean;
  /** One per column; null where there is no response. */
  readonly cells: readonly (ResponseCell | null)[];
};

/** What is commanded, for example "x commanded 10 mm". */
export type ResponseColumn = { readonly key: string; readonly label: string; readonly axis: number | null };

export type TimeGrid = { readonly samples: number; readonly step: number };

export type Range = { readonly low: number; readonly high: number };
