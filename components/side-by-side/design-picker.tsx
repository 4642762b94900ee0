"use client";

import { ComparisonsList } from "../designs/comparisons-list";
import { DesignsTable } from "../designs/designs-table";
import { Notice } from "../ui/notice";
import { PageHeading } from "../ui/page-heading";
import { SheetSection } from "../ui/sheet-section";

type DesignPickerProps = Readonly<{
  plant: { readonly id: string; readonly name: string };
  chosen: readonly string[];
  /** The address named more than can stand side by side. */
  tooMany: boolean;
}>;

/** Where an address names fewer than two designs, or too many: choose them here. */
export function DesignPicker({ plant, chosen, tooMany }: DesignPickerProps) {
  return (
    <>
      <PageHeading
        title="Side by side"
        crumbs={[
          { label: "Plants", href: "/plants" },
          { label: plant.name, href: `/plants/${plant.id}` },
        ]}
      />
      {tooMany ? (
        <div className="mb-4">
          <Notice kind="caution" title="At most six designs stand side by side.">
            The address names more; choose which of them.
          </Notice>
        </div>
      ) : null}
      <SheetSection title="Which designs?" note="two to six">
        <DesignsTable plantId={plant.id} chosen={chosen} />
      </SheetSection>
      <SheetSection title="Saved comparisons" ruled>
        <ComparisonsList plantId={plant.id} />
      </SheetSection>
    </>
  );
}
