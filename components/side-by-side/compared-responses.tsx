"use client";

import { joinNames } from "@/control/words/join-names";
import { OverlayPlot } from "../plots/overlay-plot";
import { Button } from "../ui/button";
import { ErrorState } from "../ui/error-state";
import { joinClasses } from "../ui/join-classes";
import { LoadingState } from "../ui/loading-state";
import { Segmented } from "../ui/radio-group";
import { Select } from "../ui/select";
import { SheetSection } from "../ui/sheet-section";
import { OnceSeen } from "./once-seen";
import { commandedNames, commandText, type Loop, type OverlaidDesign, overlayPictures, sourceOf } from "./overlay-pictures";
import { useOverlaidCurves } from "./use-overlaid-curves";
import type { SideBySideView } from "./use-side-by-side-view";

const CHART_HEIGHT = 260;
/** What fits between the margins of A4 and Letter. */
const PAPER_WIDTH = "max-w-[41rem]";

const LOOP_NOTES: Readonly<Record<Loop, string>> = {
  observer: "with the observer where there is one",
  "full-state": "with the full state",
};

type ComparedResponsesProps = Readonly<{
  designs: readonly OverlaidDesign[];
  view: SideBySideView;
  /** All of it now, to be printed. */
  whole: boolean;
}>;

/** The answers of every design to one command, drawn over each other on the same axes. */
export function ComparedResponses({ designs, view: [view, setView], whole }: ComparedResponsesProps) {
  const names = commandedNames(designs);
  const observed = designs.some(({ hasObserver }) => hasObserver);
  const commanded = names.find((name) => name === view.commanded) ?? names.at(0);
  if (commanded === undefined) {
    return (
      <SheetSection title="Responses" ruled>
        <p className="text-soft">Nothing can be commanded on this plant, so there are no steps to lay over each other.</p>
      </SheetSection>
    );
  }
  return (
    <SheetSection
      title={`Responses to ${commandText(designs, commanded)}`}
      note={`${LOOP_NOTES[observed ? view.loop : "full-state"]}; hue tells the axis, dash tells the design`}
      ruled
    >
      <div className="no-print mb-4 flex flex-wrap items-end gap-5">
        {names.length > 1 ? (
          <Select
            label="Commanded"
            value={commanded}
            onChange={({ target }) => setView({ commanded: target.value })}
            options={names.map((name) => ({ value: name, label: name }))}
          />
        ) : null}
        {observed ? (
          <Segmented<Loop>
            legend="Loop"
            value={view.loop}
            onChange={(loop) => setView({ loop })}
            choices={[
              { value: "observer", label: "observer where there is one" },
              { value: "full-state", label: "full state" },
            ]}
          />
        ) : null}
      </div>
      <OnceSeen height={2 * CHART_HEIGHT} now={whole}>
        <Overlays {...{ designs, commanded, whole }} loop={view.loop} />
      </OnceSeen>
    </SheetSection>
  );
}

type OverlaysProps = Readonly<{ designs: readonly OverlaidDesign[]; commanded: string; loop: Loop; whole: boolean }>;

function Overlays({ designs, commanded, loop, whole }: OverlaysProps) {
  const { curves, loading, error, again } = useOverlaidCurves(designs, commanded, loop);
  if (error) {
    return (
      <ErrorState title="The curves could not be fetched." action={<Button onClick={again}>Try again</Button>}>
        {error.message}
      </ErrorState>
    );
  }
  if (loading) {
    return (
      <div data-chart-pending="" style={{ minHeight: 2 * CHART_HEIGHT }}>
        <LoadingState label="Fetching the curves" />
      </div>
    );
  }
  const silent = designs.filter((_, k) => curves[k] === null);
  return (
    <>
      <Silent designs={silent} commanded={commanded} />
      <div className={joinClasses("grid gap-x-8 gap-y-8", whole ? PAPER_WIDTH : "lg:grid-cols-2")}>
        {overlayPictures(designs, curves).map(({ key, name, unit, effort, traces, summary }) => (
          <div key={key} data-chart="" className="min-w-0 break-inside-avoid">
            <OnceSeen height={CHART_HEIGHT} now={whole}>
              <OverlayPlot
                title={effort ? `${name}, effort` : name}
                quantity={name}
                height={CHART_HEIGHT}
                {...{ unit, traces, summary }}
              />
            </OnceSeen>
          </div>
        ))}
      </div>
    </>
  );
}

function Silent({ designs, commanded }: Readonly<{ designs: readonly OverlaidDesign[]; commanded: string }>) {
  if (designs.length === 0) return null;
  const unknown = designs.filter((design) => sourceOf(design, commanded) < 0);
  const other = designs.filter((design) => !unknown.includes(design));
  const names = (list: readonly OverlaidDesign[]) => joinNames(list.map(({ label }) => label));
  return (
    <p className="mb-4 text-soft">
      {unknown.length > 0 ? `${commanded} is not commanded on the plant revision of ${names(unknown)}. ` : ""}
      {other.length > 0
        ? `${names(other)} ${other.length === 1 ? "has" : "have"} no response to it: no reference is followed.`
        : ""}
    </p>
  );
}
