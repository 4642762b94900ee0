import { memo } from "react";
import { axisStyle } from "./axis-style";
import type { Range, ResponseCell, ResponseRow } from "./response-data";
import { CELL, responsePath, yOf } from "./response-path";
import { drawnLimits } from "./response-scale";

type ResponseCurvesProps = Readonly<{ row: ResponseRow; cell: ResponseCell; range: Range }>;

/** The drawing of one cell; said in words by the grid, so hidden from screen readers. */
export const ResponseCurves = memo(function ResponseCurves({ row, cell, range }: ResponseCurvesProps) {
  const { hue, dash } = axisStyle(row.axis);
  const level = (value: number) => `M0 ${Math.round(yOf(value, range))}H${CELL.width}`;
  const held = row.held === true;
  return (
    <svg
      aria-hidden="true"
      viewBox={`0 0 ${CELL.width} ${CELL.height}`}
      preserveAspectRatio="none"
      className="absolute inset-x-0 top-5 bottom-1 h-[calc(100%-1.5rem)] w-full [&_path]:fill-none [&_path]:[vector-effect:non-scaling-stroke]"
    >
      <path d={level(0)} stroke="var(--rule)" />
      {drawnLimits(row).map((limit) => (
        <path key={limit} d={level(limit)} stroke="var(--soft)" strokeWidth="1" strokeDasharray="6 3" />
      ))}
      {cell.final === null ? null : <path d={level(cell.final)} stroke="var(--soft)" strokeWidth="1" strokeDasharray="1 3" />}
      {cell.ghost ? <path d={responsePath(cell.ghost, range, held)} stroke="var(--ghost)" strokeWidth="1.1" /> : null}
      <path
        d={responsePath(cell.values, range, held)}
        stroke={hue}
        strokeWidth="2"
        strokeDasharray={dash}
        strokeLinejoin="round"
      />
      {[cell.estimated, cell.fullState].map((thin) =>
        thin ? (
          <path key={thin === cell.estimated ? "estimated" : "full"} d={responsePath(thin, range, held)} stroke={hue} />
        ) : null,
      )}
    </svg>
  );
});
