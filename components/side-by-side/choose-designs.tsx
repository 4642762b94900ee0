"use client";

import { MOST } from "@/lib/schemas/compared-count";
import { ComparisonsList } from "../designs/comparisons-list";
import { DesignsTable } from "../designs/designs-table";
import type { Picked } from "../designs/picked-revisions";
import { Notice } from "../ui/notice";
import { PageHeading } from "../ui/page-heading";
import { SheetSection } from "../ui/sheet-section";

type ChooseDesignsProps = Readonly<{
  plant: { readonly id: string; readonly name: string };
  chosen: readonly Picked[];
  tooMany: boolean;
}>;

/** Stands where fewer than two designs, or more than fit, are asked for. */
export function ChooseDesigns({ plant, chosen, tooMany }: ChooseDesignsProps) {
  const crumbs = [
    { label: "Plants", href: "/plants" },
    { label: plant.name, href: `/plants/${plant.id}?tab=designs` },
  ];
  return (
    <>
      <PageHeading title="Side-by-side" crumbs={crumbs} />
      {tooMany ? (
        <div className="mb-5">
          <Notice kind="caution" title={`At most ${MOST} designs stand side by side.`}>
            The first {MOST} of those asked for are chosen below.
          </Notice>
        </div>
      ) : null}
      <SheetSection title="Designs to compare">
        <DesignsTable plantId={plant.id} chosen={chosen} />
      </SheetSection>
      <SheetSection title="Saved comparisons of this plant" ruled>
        <ComparisonsList plantId={plant.id} />
      </SheetSection>
    </>
  );
}
