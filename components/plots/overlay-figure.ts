import type { Dash, Data, Layout } from "plotly.js";
import { axisStyle, designDash } from "./axis-style";
import { type OverlayTrace, plotText } from "./overlay-data";
import { resolveColour } from "./plot-colours";

/** The library takes any list of lengths; its types know only the named ones. */
const withPx = (dash: string) => (dash === "" ? "solid" : dash.replaceAll(" ", "px,").concat("px")) as Dash;

/** Traces and layout in the library's terms, in the colours of the theme. Runs in the browser only. */
export function overlayFigure(
  traces: readonly OverlayTrace[],
  quantity: string,
  unit: string,
): { data: Data[]; layout: Partial<Layout> } {
  const [ink, soft, rule, sheet] = ["--ink", "--soft", "--rule", "--sheet"].map((token) => resolveColour(`var(${token})`));
  const styles = getComputedStyle(document.body);
  const figures = styles.getPropertyValue("--default-mono-font-family") || "monospace";
  const data: Data[] = traces.map(({ name, values, step, axis, design, held }) => ({
    type: "scatter",
    mode: "lines",
    name: plotText(name),
    x: Array.from(values, (_, k) => k * step),
    y: Array.from(values),
    line: {
      color: resolveColour(design === null ? "var(--ghost)" : axisStyle(axis).hue),
      dash: design === null ? "solid" : withPx(designDash(design)),
      width: design === null ? 1 : 2,
      shape: held ? "hv" : "linear",
    },
    hovertemplate: `%{y:.4g} ${plotText(unit)} at %{x:.4g} s<extra>${plotText(name)}</extra>`,
  }));
  // Units stand in the titles: no prefixes such as µ at the figures.
  const exponentformat = "e" as const;
  const ruling = {
    exponentformat,
    gridcolor: rule,
    zerolinecolor: soft,
    linecolor: soft,
    tickfont: { family: figures, size: 12, color: soft },
  };
  const layout: Partial<Layout> = {
    autosize: true,
    margin: { l: 64, r: 12, t: 8, b: 44 },
    paper_bgcolor: "transparent",
    plot_bgcolor: sheet,
    font: { family: styles.fontFamily, size: 13, color: ink },
    xaxis: { ...ruling, title: { text: "Time, s" } },
    yaxis: { ...ruling, title: { text: `${plotText(quantity)}, ${plotText(unit)}` } },
    showlegend: false,
    hovermode: "x unified",
    hoverlabel: { bgcolor: sheet, bordercolor: soft, font: { family: figures, color: ink, size: 12 } },
  };
  return { data, layout };
}
