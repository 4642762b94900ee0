"use client";

import dynamic from "next/dynamic";
import { useState } from "react";
import { Disclosure } from "../ui/disclosure";
import { LoadingState } from "../ui/loading-state";
import { ScrollBox } from "../ui/scroll-box";
import { AxisSample } from "./axis-bar";
import { designDash, designDashName } from "./axis-style";
import type { OverlayTrace } from "./overlay-data";
import { SampledValues } from "./sampled-values";

const OverlayChart = dynamic(() => import("./overlay-chart").then((module) => module.OverlayChart), {
  ssr: false,
  loading: () => <LoadingState label="Drawing the curves…" />,
});

type OverlayPlotProps = Readonly<{
  /** "Responses to y commanded 10 mm: φ" */
  title: string;
  /** The quantity drawn upwards, and its unit. */
  quantity: string;
  unit: string;
  traces: readonly OverlayTrace[];
  /** Sentences that say what the curves show: peaks, settling, which design is faster. */
  summary?: readonly string[];
  height?: number;
}>;

/** Full-size curves with zoom and read-out. The library is fetched once the page is usable; words and figures need none of it. */
export function OverlayPlot({ title, quantity, unit, traces, summary = [], height = 320 }: OverlayPlotProps) {
  const [opened, setOpened] = useState(false);
  const longest = traces.reduce(
    (most, { values, step }) => (values.length * step > most.samples * most.step ? { samples: values.length, step } : most),
    {
      samples: traces[0]?.values.length ?? 0,
      step: traces[0]?.step ?? 0,
    },
  );
  return (
    <figure className="min-w-0">
      <figcaption className="mb-1 font-semibold">{title}</figcaption>
      <ul className="mb-1 flex flex-wrap gap-x-5 text-sm">
        {traces.map(({ key, name, axis, design }) => (
          <li key={key} className="flex items-center gap-2">
            <AxisSample axis={axis} dash={design === null ? "" : designDash(design)} />
            {name}
            <span className="text-soft">({design === null ? "thin grey" : designDashName(design)})</span>
          </li>
        ))}
      </ul>
      <div className="border border-rule bg-sheet" style={{ minHeight: height }}>
        <OverlayChart {...{ traces, quantity, unit, height }} fileName={title} />
      </div>
      {summary.length > 0 ? (
        <ul className="mt-2 list-disc pl-5 text-table">
          {summary.map((sentence) => (
            <li key={sentence}>{sentence}</li>
          ))}
        </ul>
      ) : null}
      <Disclosure summary={`${quantity} in figures`} onOpen={() => setOpened(true)}>
        {opened ? (
          <ScrollBox label={`${title}, in figures`}>
            <SampledValues
              caption={title}
              time={longest}
              series={traces.map(({ key, name, values, step }) => ({ key, label: name, unit, values, step }))}
            />
          </ScrollBox>
        ) : null}
      </Disclosure>
    </figure>
  );
}
