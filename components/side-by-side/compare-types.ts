import type { DesignRevision } from "@/lib/schemas/design";

/** A design revision as it stands in a comparison; its place is its dash. */
export type Compared = Pick<
  DesignRevision,
  | "id"
  | "number"
  | "designId"
  | "designName"
  | "plantRevision"
  | "outdated"
  | "recipe"
  | "model"
  | "evidence"
  | "note"
  | "createdBy"
>;

export type CompareCell = {
  readonly text: string;
  /** Decides whether two cells differ: what the text rounds off counts too. */
  readonly exact: string;
  /** Below the text, in words. */
  readonly note?: string;
  /** Ranks the designs, less being better; absent where none is better than another. */
  readonly rank?: number | null;
  /** Beyond a limit. */
  readonly beyond?: boolean;
};

export type CompareRow = {
  readonly key: string;
  readonly label: string;
  readonly axis?: number | null;
  /** Read across rather than down. */
  readonly prose?: boolean;
  /** One per design; null where it has no such thing. */
  readonly cells: readonly (CompareCell | null)[];
};

export type CompareSection = {
  readonly key: string;
  readonly title: string;
  readonly note?: string;
  readonly rows: readonly CompareRow[];
};
