"use client";

import { useQuery, useQueryClient } from "@tanstack/react-query";
import Link from "next/link";
import { archiveComparison, designKeys, fetchComparisons } from "@/lib/client/designs";
import { RequestProblem } from "@/lib/client/request";
import type { Comparison } from "@/lib/schemas/comparison";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { ErrorState } from "../ui/error-state";
import { LoadingState } from "../ui/loading-state";
import { When } from "../ui/when";
import { sideBySideAddress } from "./side-by-side-address";

/** Saved comparisons of a plant. One that is put away leaves this list; its address goes on working. */
export function ComparisonsList({ plantId }: Readonly<{ plantId: string }>) {
  const { resume } = useSession();
  const cache = useQueryClient();
  const say = useToast();
  const queryKey = designKeys.comparisons(plantId);
  const comparisons = useQuery({ queryKey, queryFn: ({ signal }) => resume(() => fetchComparisons(plantId, signal)) });
  if (comparisons.isPending) return <LoadingState label="Loading the saved comparisons" lines={2} />;
  if (comparisons.isError) {
    const again = <Button onClick={() => comparisons.refetch()}>Try again</Button>;
    return (
      <ErrorState title="The saved comparisons could not be loaded." action={again}>
        {comparisons.error.message}
      </ErrorState>
    );
  }
  const putAway = async ({ id, version, title }: Comparison) => {
    try {
      await resume(() => archiveComparison(id, version));
      say({ text: `“${title}” was taken off the list. Its address still works.`, kind: "met" });
    } catch (error) {
      if (!(error instanceof RequestProblem)) throw error;
      say({ text: error.message, kind: "unmet" });
    }
    await cache.invalidateQueries({ queryKey });
  };
  const { items } = comparisons.data;
  if (items.length === 0) {
    return (
      <p className="text-soft">
        None yet. Lay two to six designs side by side, then save that comparison with a title and a note.
      </p>
    );
  }
  return (
    <ul className="divide-y divide-rule border-y border-rule">
      {items.map((comparison) => (
        <ComparisonEntry key={comparison.id} comparison={comparison} onPutAway={() => putAway(comparison)} />
      ))}
    </ul>
  );
}

function ComparisonEntry({ comparison, onPutAway }: Readonly<{ comparison: Comparison; onPutAway: () => void }>) {
  const { plantId, title, note, designRevisionIds, createdBy, createdAt } = comparison;
  return (
    <li className="flex flex-wrap items-baseline gap-x-4 gap-y-1 py-2">
      <div className="min-w-0 flex-1">
        <Link href={sideBySideAddress(plantId, designRevisionIds)} className="font-semibold">
          {title}
        </Link>
        <span className="text-sm text-soft">
          {" "}
          · {designRevisionIds.length} designs · {createdBy ? `${createdBy}, ` : ""}
          <When at={createdAt} />
        </span>
        {note ? <p className="max-w-[70ch] text-table whitespace-pre-line">{note}</p> : null}
      </div>
      <Button size="small" tone="quiet" onClick={onPutAway} aria-label={`Take off the list: ${title}`}>
        Take off the list
      </Button>
    </li>
  );
}
