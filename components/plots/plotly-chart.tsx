"use client";

import * as bundle from "plotly.js-dist-min";
import factory from "react-plotly.js/factory";

// The bundle arrives as a namespace here and as a default export there, by build.
const namespace = bundle as unknown as { readonly default?: object };

/** The one place that loads the chart library; reached only through `OverlayPlot`'s dynamic import. */
export const PlotlyChart = factory(namespace.default ?? namespace);
