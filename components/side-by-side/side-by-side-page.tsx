"use client";

import { useMemo, useRef, useState } from "react";
import { comparisonFileAddress } from "@/lib/client/designs";
import { ComparisonsList } from "../designs/comparisons-list";
import { Button } from "../ui/button";
import { buttonStyle } from "../ui/button-style";
import { CopyButton } from "../ui/copy-button";
import { LinkButton } from "../ui/link-button";
import { Notice } from "../ui/notice";
import { PageHeading } from "../ui/page-heading";
import { SheetSection } from "../ui/sheet-section";
import { arrangeDesigns } from "./arrange-designs";
import type { ComparedDesign, Comparing } from "./compare-designs";
import { ComparedFacts, sortingOf } from "./compared-facts";
import { ComparedMatrices } from "./compared-matrices";
import { ComparedResponses } from "./compared-responses";
import { ComparedTrades } from "./compared-trades";
import { SaveComparison } from "./save-comparison";
import { usePrinting } from "./use-printing";
import { type SideBySideView, useSideBySideView } from "./use-side-by-side-view";

type SideBySidePageProps = Readonly<{
  plant: { readonly id: string; readonly name: string };
  comparing: Comparing;
  maySave: boolean;
}>;

const COUNTS = ["", "", "Two", "Three", "Four", "Five", "Six"];

/** Of one design its revisions stand here. */
function titleOf(designs: readonly ComparedDesign[]): string {
  const what = new Set(designs.map(({ designId }) => designId)).size === 1 ? `revisions of ${designs[0].name}` : "designs";
  return `${COUNTS[designs.length]} ${what}, side by side`;
}

/** Two to six designs, every number and curve aligned, differences marked. */
export function SideBySidePage({ plant, comparing, maySave }: SideBySidePageProps) {
  const page = useRef<HTMLDivElement>(null);
  const view = useSideBySideView();
  const arranged = useArranged(comparing, view);
  const { designs } = arranged;
  const { whole, waiting, print } = usePrinting(page);
  const [saving, setSaving] = useState(false);
  const ids = designs.map(({ id }) => id);
  const actions = (
    <>
      <CopyButton label="Copy link" size="normal" text={() => window.location.href} />
      <Button busy={waiting} onClick={print}>
        Print
      </Button>
      <a href={comparisonFileAddress(plant.id, ids)} download className={buttonStyle()}>
        Download CSV
      </a>
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
      <PageHeading title={titleOf(designs)} crumbs={crumbs(plant, designs)} actions={actions} />
      <PlantsDiffer designs={designs} />
      <ComparedFacts {...{ arranged, view }} plantId={plant.id} />
      <ComparedTrades designs={designs} />
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

function useArranged(comparing: Comparing, [view]: SideBySideView) {
  const { sort, order } = view;
  return useMemo(() => arrangeDesigns(comparing, sortingOf({ sort, order })), [comparing, sort, order]);
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
