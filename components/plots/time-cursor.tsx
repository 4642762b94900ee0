import { formatSeconds } from "@/control/words/format-number";

type TimeCursorProps = Readonly<{ cursor: number | null; last: number; step: number; onMove: (cursor: number | null) => void }>;

/** Moves one instant through all cells by arrow keys or by dragging; the corners then show the values there. */
export function TimeCursor({ cursor, last, step, onMove }: TimeCursorProps) {
  const said = cursor === null ? "off" : formatSeconds(cursor * step);
  return (
    <label className="no-print flex items-center gap-3 text-sm text-soft">
      Time cursor
      <input
        type="range"
        min={0}
        max={last}
        value={cursor ?? 0}
        aria-valuetext={said}
        onChange={({ target }) => onMove(Number(target.value))}
        onBlur={() => onMove(null)}
        className="h-6 max-w-72 flex-1"
      />
      <span className="min-w-16 font-mono">{said}</span>
    </label>
  );
}
