"use client";

import Link from "next/link";
import type { DesignRevisionEntry, DesignSummary } from "@/lib/schemas/design";
import { Button } from "../ui/button";
import { ErrorState } from "../ui/error-state";
import { LoadingState } from "../ui/loading-state";
import { SheetSection } from "../ui/sheet-section";
import { ShowMore } from "../ui/show-more";
import { When } from "../ui/when";
import { sideBySideAddress } from "./side-by-side-address";
import { useDesignRevisions } from "./use-design-revisions";

type RevisionsListProps = Readonly<{ design: DesignSummary; shownId: string }>;

/** Every revision of the design, newest first; each can be looked at again and held against the newest. */
export function RevisionsList({ design, shownId }: RevisionsListProps) {
  const revisions = useDesignRevisions(design.id);
  return (
    <SheetSection title="Revisions" note="they never change; a save adds one" ruled>
      {revisions.isPending ? <LoadingState label="Loading the revisions" lines={2} /> : null}
      {revisions.isError ? (
        <ErrorState
          title="The revisions could not be loaded."
          action={<Button onClick={() => revisions.refetch()}>Try again</Button>}
        >
          {revisions.error.message}
        </ErrorState>
      ) : null}
      {revisions.data ? (
        <ol className="divide-y divide-rule border-y border-rule">
          {revisions.data.pages
            .flatMap(({ items }) => items)
            .map((entry) => (
              <RevisionEntry key={entry.id} {...{ design, entry }} shown={entry.id === shownId} />
            ))}
        </ol>
      ) : null}
      <ShowMore list={revisions} />
    </SheetSection>
  );
}

type RevisionEntryProps = Readonly<{ design: DesignSummary; entry: DesignRevisionEntry; shown: boolean }>;

function RevisionEntry({ design, entry: { id, number, note, createdBy, createdAt }, shown }: RevisionEntryProps) {
  const newest = id === design.currentRevision.id;
  const address = `/plants/${design.plantId}/designs/${design.id}${newest ? "" : `?revision=${id}`}`;
  return (
    <li className="flex flex-wrap items-baseline gap-x-4 gap-y-1 py-2" aria-current={shown ? "true" : undefined}>
      <Link href={address} className={shown ? "font-semibold" : ""}>
        Revision {number}
      </Link>
      <span className="text-sm text-soft">
        {shown ? "shown above · " : ""}
        {newest ? "newest · " : ""}
        {createdBy ? `${createdBy}, ` : ""}
        <When at={createdAt} />
      </span>
      <span className="min-w-40 flex-1 text-table whitespace-pre-line">{note}</span>
      {newest ? null : (
        <Link href={sideBySideAddress(design.plantId, [id, design.currentRevision.id])} className="text-sm">
          Side by side with the newest
        </Link>
      )}
    </li>
  );
}
