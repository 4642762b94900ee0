"use client";

import { RotateCcw } from "lucide-react";
import { formatNumber } from "@/control/words/format-number";
import { Button } from "../../ui/button";
import { placeOf, SLIDER_END, valueAt } from "./slider-scale";

type FigureSliderProps = Readonly<{
  /** Read out with the slider: "Largest deviation of x1". */
  label: string;
  unit: string;
  value: number | null;
  /** What stands in the middle: the value that the page started from, or a usual one where it started from none. */
  middle: number;
  /** What "back" goes back to. */
  start: number | null;
  onChange: (value: number | null) => void;
}>;

const said = (value: number | null, unit: string) => (value === null ? "not weighted" : `${formatNumber(value)} ${unit}`);

/** Two decades to either side, the same factor for every step; a value further out stands at the end until it is moved. */
export function FigureSlider({ label, unit, value, middle, start, onChange }: FigureSliderProps) {
  const usable = value !== null && value > 0;
  return (
    <div className="no-print col-span-full flex items-center gap-2">
      <input
        type="range"
        aria-label={`${label}, slider`}
        aria-valuetext={said(value, unit)}
        min={-SLIDER_END}
        max={SLIDER_END}
        value={usable ? placeOf(value, middle) : 0}
        onChange={({ target }) => onChange(valueAt(Number(target.value), middle))}
        className={`h-6 min-w-0 flex-1 accent-ink ${usable ? "" : "opacity-50"}`}
      />
      <Button
        size="small"
        tone="quiet"
        disabled={Object.is(value, start)}
        aria-label={`${label}: back to ${said(start, unit)}`}
        onClick={() => onChange(start)}
      >
        <RotateCcw aria-hidden size={14} />
      </Button>
    </div>
  );
}
