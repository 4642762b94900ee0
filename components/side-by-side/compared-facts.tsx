"use client";

import { Button } from "../ui/button";
import { Checkbox } from "../ui/checkbox";
import type { Arranged } from "./arrange-designs";
import { withoutEqual } from "./compared-rows";
import { ComparedTable } from "./compared-table";
import { nextSorting, type Sorting } from "./sort-designs";
import type { SideBySideView } from "./use-side-by-side-view";

type ComparedFactsProps = Readonly<{ plantId: string; arranged: Arranged; view: SideBySideView }>;

/** The table, and what of it is shown in which order; both live in the address and are said in words. */
export function ComparedFacts({ plantId, arranged: { designs, sections, sorted }, view: [view, setView] }: ComparedFactsProps) {
  const short = withoutEqual(sections);
  const hiding = view.hide === "equal";
  const sorting = sorted === null ? null : sortingOf(view);
  const sortBy = (next: Sorting | null) => setView({ sort: next?.key ?? null, order: next?.order ?? null });
  return (
    <div className="mb-8">
      <div className="mb-2 flex flex-wrap items-center gap-x-4 gap-y-1 text-table">
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
      <div className="mb-2 flex flex-wrap items-center gap-x-4 gap-y-1 text-sm text-soft">
        <p role="status">{sorted ?? `In the order chosen; ${designs[0].label} is what the others are held against.`}</p>
        {sorting ? (
          <Button size="small" tone="quiet" className="no-print" onClick={() => sortBy(null)}>
            Back to the order chosen
          </Button>
        ) : (
          <span className="no-print">Press the name of a figure to sort the designs by it.</span>
        )}
      </div>
      <ComparedTable
        {...{ plantId, designs, sorting }}
        sections={hiding ? short.sections : sections}
        onSort={(key) => sortBy(nextSorting(sorting, key))}
      />
    </div>
  );
}

/** The order that the address asks for. */
export const sortingOf = ({ sort, order }: Pick<SideBySideView[0], "sort" | "order">): Sorting | null =>
  sort ? { key: sort, order } : null;
