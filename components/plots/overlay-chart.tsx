"use client";

import { useMemo } from "react";
import type { OverlayTrace } from "./overlay-data";
import { overlayFigure } from "./overlay-figure";
import { useThemeKey } from "./plot-colours";
import { PlotlyChart } from "./plotly-chart";

type OverlayChartProps = Readonly<{
  traces: readonly OverlayTrace[];
  quantity: string;
  unit: string;
  height: number;
  fileName: string;
}>;

export function OverlayChart({ traces, quantity, unit, height, fileName }: OverlayChartProps) {
  const theme = useThemeKey();
  const { data, layout } = useMemo(() => {
    const figure = overlayFigure(traces, quantity, unit);
    return { ...figure, layout: { ...figure.layout, datarevision: theme } };
  }, [traces, quantity, unit, theme]);
  return (
    <PlotlyChart
      data={data}
      layout={layout}
      useResizeHandler
      style={{ width: "100%", height }}
      config={{
        displaylogo: false,
        responsive: true,
        // The first would send the data to the library maker's servers.
        modeBarButtonsToRemove: ["sendChartToCloud", "lasso2d", "select2d", "autoScale2d"],
        toImageButtonOptions: { format: "svg", filename: fileName },
      }}
    />
  );
}
