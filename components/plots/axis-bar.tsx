import { axisStyle } from "./axis-style";

/** The upright bar of an axis's hue beside a name; the name carries the meaning. */
export function AxisBar({ axis }: Readonly<{ axis: number | null }>) {
  return (
    <span
      aria-hidden="true"
      className="inline-block h-[1em] w-1 shrink-0 translate-y-0.5 [print-color-adjust:exact]"
      style={{ background: axisStyle(axis).hue }}
    />
  );
}

/** A short piece of the axis's line, hue and dash, for legends. */
export function AxisSample({ axis, dash = axisStyle(axis).dash }: Readonly<{ axis: number | null; dash?: string }>) {
  return (
    <svg aria-hidden="true" width="34" height="8" viewBox="0 0 34 8" className="inline-block shrink-0">
      <path d="M0 4h34" fill="none" stroke={axisStyle(axis).hue} strokeWidth="2" strokeDasharray={dash} />
    </svg>
  );
}
