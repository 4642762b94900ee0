"use client";

import { parseAsStringLiteral, useQueryState } from "nuqs";
import { useMemo, useState } from "react";
import { ComparisonsList } from "../designs/comparisons-list";
import { DesignsTable } from "../designs/designs-table";
import { Button } from "../ui/button";
import { Checkbox } from "../ui/checkbox";
import { CopyButton } from "../ui/copy-button";
import { Disclosure } from "../ui/disclosure";
import { Notice } from "../ui/notice";
import { PageHeading } from "../ui/page-heading";
import { SheetSection } from "../ui/sheet-section";
import { compareSections } from "./compare-sections";
import { CompareTable } from "./compare-table";
import type { Compared } from "./compare-types";
import { onlyDifferences } from "./difference-marks";
import { GainComparison } from "./gain-comparison";
import { OverlaidResponses } from "./overlaid-responses";
import { SaveComparisonDialog } from "./save-comparison-dialog";

type SideBySideProps = Readonly<{ plant: { readonly id: string; readonly name: string }; designs: readonly Compared[] }>;

const COUNT = ["No", "One", "Two", "Three", "Four", "Five", "Six"];

/** Two to six designs: every number aligned, differences marked, curves over each other. */
export function SideBySide({ plant, designs }: SideBySideProps) {
  const [rows, setRows] = useQueryState("rows", parseAsStringLiteral(["all", "different"]).withDefault("all"));
  const [saving, setSaving] = useState(false);
  const sections = useMemo(() => compareSections(designs), [designs]);
  const shown = rows === "different" ? onlyDifferences(sections) : sections;
  const ids = designs.map(({ id }) => id);
  return (
    <>
      <PageHeading
        title={`${COUNT[designs.length]} designs, side by side`}
        crumbs={[
          { label: "Plants", href: "/plants" },
          { label: plant.name, href: `/plants/${plant.id}` },
          { label: revisionsText(designs) },
        ]}
        actions={
          <>
            <Checkbox
              label="Hide equal rows"
              checked={rows === "different"}
              onChange={({ target }) => void setRows(target.checked ? "different" : "all")}
            />
            <CopyButton size="normal" label="Copy link" text={() => window.location.href} />
            <Button onClick={() => window.print()}>Print</Button>
            <Button tone="primary" onClick={() => setSaving(true)}>
              Save comparison
            </Button>
          </>
        }
      />
      <PlantsDiffer designs={designs} />
      <p className="mb-3 text-sm text-soft">
        A thick rule on the left of a cell: it is not what the first design has. Best and last are among the figures as shown.
      </p>
      <div className="mb-10">
        {shown.length === 0 ? <p>These designs are alike in everything compared here.</p> : null}
        <CompareTable designs={designs} sections={shown} plantId={plant.id} />
      </div>
      <OverlaidResponses designs={designs} />
      <GainComparison designs={designs} />
      <div className="no-print">
        <SheetSection title="Saved comparisons" ruled>
          <ComparisonsList plantId={plant.id} />
        </SheetSection>
        <Disclosure summary="Choose other designs">
          <DesignsTable plantId={plant.id} chosen={ids} />
        </Disclosure>
      </div>
      {saving ? <SaveComparisonDialog plantId={plant.id} designRevisionIds={ids} onClose={() => setSaving(false)} /> : null}
    </>
  );
}

const plantRevisions = (designs: readonly Compared[]) =>
  [...new Set(designs.map(({ plantRevision }) => plantRevision.number))].toSorted((a, b) => a - b);

function revisionsText(designs: readonly Compared[]): string {
  const numbers = plantRevisions(designs);
  return `plant revision${numbers.length > 1 ? "s" : ""} ${numbers.join(", ")}`;
}

/** Designs of different revisions of their plant are computed on different numbers. */
function PlantsDiffer({ designs }: Readonly<{ designs: readonly Compared[] }>) {
  const numbers = plantRevisions(designs);
  if (numbers.length < 2) return null;
  return (
    <div className="mb-4">
      <Notice kind="caution" title="These designs stand on different revisions of the plant.">
        Revisions {numbers.join(", ")}: part of what differs below comes from the plant, not from the recipes. Signals are matched
        by name.
      </Notice>
    </div>
  );
}
