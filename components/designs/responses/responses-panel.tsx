"use client";

import { memo, useState } from "react";
import { ResponseGrid } from "../../plots/response-grid";
import { Button } from "../../ui/button";
import { ErrorState } from "../../ui/error-state";
import { LoadingState } from "../../ui/loading-state";
import { Notice } from "../../ui/notice";
import type { Solved } from "../bench/bench-types";
import { computed, type ResponsesReply } from "../evidence/figures-reply";
import { RefusedPart } from "../evidence/refused-part";
import { type Enlarged, EnlargedCell } from "./enlarged-cell";
import { ResponseControls } from "./response-controls";
import { type GridWanted, responsePicture } from "./response-rows";
import { useCurves, useStoredCurves } from "./use-curves";
import { useResponseView } from "./use-response-view";

type ResponsesPanelProps = Readonly<{
  solved: Solved;
  /** The saved revision that a loop not saved yet is held against; null where there is none, or where it is the one shown. */
  ghostOf: string | null;
}>;

/** The middle column: coupled responses as a grid, whose cells off the diagonal are the cross-coupling. */
export const ResponsesPanel = memo(function ResponsesPanel({ solved, ghostOf }: ResponsesPanelProps) {
  const { responses } = solved.evidence;
  const hasObserver = computed(solved.evidence.observer) !== null;
  const view = useResponseView(hasObserver);
  if (responses.state === "refused") return <RefusedPart refusal={responses} />;
  return (
    <>
      <ResponseControls {...view} hasObserver={hasObserver} horizon={responses.value.horizon} />
      <Picture solved={solved} ghostOf={ghostOf} wanted={view.wanted} figures={responses.value.figures} />
    </>
  );
});

type PictureProps = ResponsesPanelProps & Readonly<{ wanted: GridWanted; figures: ResponsesReply["figures"] }>;

const CAPTIONS = {
  step: "Coupled response to steps",
  initial: "Coupled response from the initial state",
  disturbance: "Coupled response to input disturbances",
} as const;

const NOTES = {
  step: "No steps: the recipe asks for no reference, or the plant has no commanded quantities. Look at the initial state or a disturbance.",
  initial: "There is no response from an initial state.",
  disturbance: "There is no response to a disturbance.",
} as const;

function Picture({ solved, ghostOf, wanted, figures }: PictureProps) {
  const { model } = solved.ground;
  const [enlarged, setEnlarged] = useState<Enlarged | null>(null);
  const withStates = wanted.roles.includes("state");
  const { curves, error, again } = useCurves(solved, wanted.kind, withStates);
  const ghosts = useStoredCurves(ghostOf, wanted.kind, withStates);
  if (error) {
    const retry = <Button onClick={() => again()}>Try again</Button>;
    return (
      <ErrorState title="The curves could not be fetched." action={retry}>
        {error.message}
      </ErrorState>
    );
  }
  if (!curves) return <Waiting rows={wanted.roles.length * 2} />;
  if (wanted.roles.length === 0) return <p className="text-soft">Switch on a kind of row above.</p>;
  const picture = responsePicture({ model, curves, figures, ghosts: ghostOf ? (ghosts.data ?? []) : [] }, wanted);
  if (!picture)
    return (
      <Notice kind="caution" title="Nothing to show here.">
        {NOTES[wanted.kind]}
      </Notice>
    );
  return (
    <>
      <ResponseGrid
        caption={CAPTIONS[wanted.kind]}
        {...picture}
        onEnlarge={(row, column, cell) => setEnlarged({ row, column, cell })}
      />
      <EnlargedCell shown={enlarged} step={picture.time.step} onClose={() => setEnlarged(null)} />
      <Legend wanted={wanted} ghost={ghostOf !== null} observed={computed(solved.evidence.observer) !== null} />
    </>
  );
}

/** Keeps the height, so that nothing below jumps when the curves arrive. */
function Waiting({ rows }: Readonly<{ rows: number }>) {
  return (
    <div style={{ minHeight: `${rows * 7.25 + 3}rem` }}>
      <LoadingState label="Fetching the curves" />
    </div>
  );
}

type LegendProps = Readonly<{ wanted: GridWanted; ghost: boolean; observed: boolean }>;

function Legend({ wanted: { loop, roles }, ghost, observed }: LegendProps) {
  const parts = [
    ...(roles.includes("state") && observed && loop === "observer" ? ["states: thick as they are, thin as estimated"] : []),
    ...(loop === "both" ? ["thick with the observer, thin with the full state"] : []),
    ...(ghost ? ["thin grey: the last saved revision"] : []),
    "dotted: value at rest",
    "dashed grey: limit of an input",
  ];
  return <p className="text-sm text-soft">{parts.join(" · ")}</p>;
}
