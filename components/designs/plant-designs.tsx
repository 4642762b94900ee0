"use client";

import { SheetSection } from "../ui/sheet-section";
import { ComparisonsList } from "./comparisons-list";
import { DesignsTable } from "./designs-table";

/** The designs of a plant, and the comparisons of them that were kept. */
export function PlantDesigns({ plantId, designCount }: Readonly<{ plantId: string; designCount: number }>) {
  return (
    <>
      <DesignsTable plantId={plantId} />
      {designCount > 0 ? (
        <div className="mt-8">
          <SheetSection title="Saved comparisons of this plant" ruled>
            <ComparisonsList plantId={plantId} />
          </SheetSection>
        </div>
      ) : null}
    </>
  );
}
