"use client";

import { formatNumber, formatSeconds } from "@/control/words/format-number";
import type { TradePoint } from "./trade-points";

type TradePictureProps = Readonly<{
  points: readonly TradePoint[];
  effortLabel: string;
  /** Drawn as a line across, where the effort is in parts of a limit. */
  limit: number | null;
  onChoose: (place: number) => void;
}>;

const FRAME = { width: 480, height: 300, left: 12, right: 12, top: 16, bottom: 20 } as const;

type Scale = { readonly low: number; readonly high: number; readonly at: (value: number) => number };

function logScale(values: readonly number[], from: number, to: number): Scale {
  const positive = values.filter((value) => value > 0);
  const low = Math.min(...positive) / 1.1;
  const high = Math.max(...positive) * 1.1;
  const span = Math.log(high / low);
  return { low, high, at: (value) => from + (Math.log(Math.max(value, low) / low) / span) * (to - from) };
}

/** Settling across, effort upwards, both by ratio; every point can be pressed to become the recipe. */
export function TradePicture({ points, effortLabel, limit, onChoose }: TradePictureProps) {
  const across = logScale(
    points.map(({ settling }) => settling),
    FRAME.left,
    FRAME.width - FRAME.right,
  );
  const shownLimit = limit !== null && points.some(({ effort }) => effort > limit / 4) ? limit : null;
  const efforts = points.map(({ effort }) => effort);
  const up = logScale(shownLimit === null ? efforts : [...efforts, shownLimit], FRAME.height - FRAME.bottom, FRAME.top);
  const place = ({ settling, effort }: TradePoint) => ({ x: across.at(settling), y: up.at(effort) });
  const path = points
    .map((point, k) => `${k === 0 ? "M" : "L"}${place(point).x.toFixed(1)} ${place(point).y.toFixed(1)}`)
    .join("");
  return (
    <figure aria-label="Settling against effort">
      <p className="text-sm text-soft">up: {effortLabel} · across: settling, s · a point, pressed, becomes the recipe</p>
      <div className="relative">
        <svg
          aria-hidden="true"
          viewBox={`0 0 ${FRAME.width} ${FRAME.height}`}
          className="w-full border border-rule bg-sheet font-mono text-[12px]"
        >
          {shownLimit === null ? null : (
            <path d={`M0 ${up.at(shownLimit)}H${FRAME.width}`} stroke="var(--soft)" strokeDasharray="6 3" fill="none" />
          )}
          <path d={path} fill="none" stroke="var(--ink)" strokeWidth="1.5" />
          <g fill="var(--soft)">
            <text x={4} y={12}>
              {formatNumber(up.high, 2)}
            </text>
            <text x={4} y={FRAME.height - 6}>
              {formatSeconds(across.low)}
            </text>
            <text x={FRAME.width - 4} y={FRAME.height - 6} textAnchor="end">
              {formatSeconds(across.high)}
            </text>
          </g>
        </svg>
        {points.map((point) => (
          <button
            key={point.place}
            type="button"
            aria-label={`Use ${point.words}`}
            title={point.words}
            onClick={() => onChoose(point.place)}
            style={{ left: `${(place(point).x / FRAME.width) * 100}%`, top: `${(place(point).y / FRAME.height) * 100}%` }}
            className="absolute size-6 -translate-x-1/2 -translate-y-1/2"
          >
            <span
              aria-hidden="true"
              className={`mx-auto block rounded-full border-2 border-ink ${point.factor === 1 ? "size-3 bg-ink" : "size-2 bg-sheet"}`}
            />
          </button>
        ))}
      </div>
    </figure>
  );
}
