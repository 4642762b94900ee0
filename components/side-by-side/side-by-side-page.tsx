"use client";

import { useRef, useState } from "react";
import { ComparisonsList } from "../designs/comparisons-list";
import { Button } from "../ui/button";
import { Checkbox } from "../ui/checkbox";
import { CopyButton } from "../ui/copy-button";
import { LinkButton } from "../ui/link-button";
import { Notice } from "../ui/notice";
import { PageHeading } from "../ui/page-heading";
import { SheetSection } from "../ui/sheet-section";
import type { ComparedDesign, Comparing } from "./compare-designs";
import { ComparedMatrices } from "./compared-matrices";
import { ComparedResponses } from "./compared-responses";
import { withoutEqual } from "./compared-rows";
import { ComparedTable } from "./compared-table";
import { SaveComparison } from "./save-comparison";
import { usePrinting } from "./use-printing";
import { useSideBySideView } from "./use-side-by-side-view";

type SideBySidePageProps = Readonly<{
  plant: { readonly id: string; readonly name: string };
  comparing: Comparing;
  maySave: boolean;
}>;

const COUNTS = ["", "", "Two", "Three", "Four", "Five", "Six"];

/** Two to six designs, every number and curve aligned, differences marked. */
export function SideBySidePage({ plant, comparing: { designs, sections }, maySave }: SideBySidePageProps) {
  const page = useRef<HTMLDivElement>(null);
  const view = useSideBySideView();
  const { whole, waiting, print } = usePrinting(page);
  const [saving, setSaving] = useState(false);
  const ids = designs.map(({ id }) => id);
  const actions = (
    <>
      <CopyButton label="Copy link" size="normal" text={() => window.location.href} />
      <Button busy={waiting} onClick={print}>
        Print
      </Button>
      <LinkButton href={`/plants/${plant.id}/side-by-side?choose=yes&designs=${ids.join(",")}`}>Choose designs</LinkButton>
      {maySave ? (
        <Button tone="primary" onClick={() => setSaving(true)}>
          Save comparison
        </Button>
      ) : null}
    </>
  );
  return (
    <div ref={page}>
      <PageHeading title={`${COUNTS[designs.length]} designs, side by side`} crumbs={crumbs(plant, designs)} actions={actions} />
      <PlantsDiffer designs={designs} />
      <Facts {...{ designs, sections, view }} plantId={plant.id} />
      <ComparedResponses {...{ designs, view, whole }} />
      <ComparedMatrices {...{ designs, view, whole }} />
      <div className="no-print">
        <SheetSection title="Saved comparisons of this plant" ruled>
          <ComparisonsList plantId={plant.id} />
        </SheetSection>
      </div>
      {saving ? <SaveComparison plantId={plant.id} designRevisionIds={ids} onClose={() => setSaving(false)} /> : null}
    </div>
  );
}

function crumbs({ id, name }: SideBySidePageProps["plant"], designs: readonly ComparedDesign[]) {
  const revisions = [...new Set(designs.map(({ plantRevision }) => plantRevision))];
  return [
    { label: "Plants", href: "/plants" },
    { label: name, href: `/plants/${id}?tab=designs` },
    {
      label: revisions.length === 1 ? `revision ${revisions[0]}` : `revisions ${revisions.toSorted((a, b) => a - b).join(", ")}`,
    },
  ];
}

function PlantsDiffer({ designs }: Readonly<{ designs: readonly ComparedDesign[] }>) {
  if (new Set(designs.map(({ plantRevision }) => plantRevision)).size === 1) return null;
  return (
    <div className="mb-5">
      <Notice kind="caution" title="These designs were computed on different revisions of the plant.">
        Signals are matched by name; what differs may come from the plant and not from the recipe.
      </Notice>
    </div>
  );
}

type FactsProps = Comparing & Readonly<{ plantId: string; view: ReturnType<typeof useSideBySideView> }>;

function Facts({ plantId, designs, sections, view: [view, setView] }: FactsProps) {
  const short = withoutEqual(sections);
  const hiding = view.hide === "equal";
  const shown = hiding ? short.sections : sections;
  return (
    <div className="mb-8">
      <div className="mb-2 flex flex-wrap items-center gap-x-4 text-table">
        <div className="no-print">
          <Checkbox
            label="Hide equal rows"
            checked={hiding}
            onChange={({ target }) => setView({ hide: target.checked ? "equal" : null })}
          />
        </div>
        <p role="status" className="text-sm text-soft">
          {hiding ? `${short.hidden} equal rows are hidden` : `${short.hidden} rows are equal`}; a thick rule stands where a
          design differs from the first
        </p>
      </div>
      <ComparedTable {...{ plantId, designs }} sections={shown} />
    </div>
  );
}
