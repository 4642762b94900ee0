/** One curve of an overlay. Hue tells the axis, dash tells the design. */
export type OverlayTrace = {
  readonly key: string;
  /** The design's name. */
  readonly name: string;
  readonly values: ArrayLike<number>;
  /** Seconds between samples. */
  readonly step: number;
  readonly axis: number | null;
  /** Place of the design in the comparison, from zero; null draws the thin grey ghost. */
  readonly design: number | null;
  readonly held?: boolean;
};

/** The chart library reads a little HTML in texts: names are shown as they are. */
export const plotText = (text: string) => text.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll(">", "&gt;");
