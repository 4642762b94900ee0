/** How one axis of the machine looks wherever it appears. */
export type AxisStyle = {
  /** A CSS colour that follows the theme. */
  readonly hue: string;
  /** For `stroke-dasharray`; empty is solid. */
  readonly dash: string;
  /** The same in words, for legends and text alternatives. */
  readonly dashName: string;
};

const STYLES: readonly AxisStyle[] = [
  { hue: "var(--axis-1)", dash: "", dashName: "solid" },
  { hue: "var(--axis-2)", dash: "8 4", dashName: "dashed" },
  { hue: "var(--axis-3)", dash: "2 3", dashName: "dotted" },
  { hue: "var(--axis-4)", dash: "8 3 2 3", dashName: "dash-dot" },
  { hue: "var(--axis-5)", dash: "12 4", dashName: "long dashes" },
  { hue: "var(--axis-6)", dash: "5 3", dashName: "short dashes" },
  { hue: "var(--axis-7)", dash: "1 2", dashName: "fine dots" },
  { hue: "var(--axis-8)", dash: "10 3 2 3 2 3", dashName: "dash-dot-dot" },
];

const NO_AXIS: AxisStyle = { hue: "var(--axis-none)", dash: "", dashName: "solid" };

/** Hue and dash follow the order of the axes; a ninth axis starts over. `null` is a signal of no axis. */
export function axisStyle(axis: number | null): AxisStyle {
  return axis === null ? NO_AXIS : STYLES[axis % STYLES.length];
}

/** Where several designs are overlaid the hue stays with the axis and the dash tells the design, in order. */
export function designDash(design: number): AxisStyle["dash"] {
  return STYLES[design % STYLES.length].dash;
}

export function designDashName(design: number): string {
  return STYLES[design % STYLES.length].dashName;
}
