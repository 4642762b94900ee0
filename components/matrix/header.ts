/** What stands at the head of a row or column of a matrix. */
export type Header = {
  readonly label: string;
  readonly unit?: string;
  /** Index of the axis the signal belongs to, or null. */
  readonly axis: number | null;
  /** Largest acceptable deviation, in `unit`: scales the entry when the share of a block is measured. */
  readonly scale?: number | null;
};
