"use client";

import { MOST } from "@/lib/schemas/compared-count";
import type { DesignSummary } from "@/lib/schemas/design";
import { Button } from "../ui/button";
import { ErrorState } from "../ui/error-state";
import { LoadingState } from "../ui/loading-state";
import { ShowMore } from "../ui/show-more";
import { When } from "../ui/when";
import type { Picked } from "./picked-revisions";
import { useDesignRevisions } from "./use-design-revisions";

type RevisionChoiceProps = Readonly<{
  design: DesignSummary;
  picked: readonly Picked[];
  onToggle: (one: Picked) => void;
}>;

/** The earlier revisions of a design, each to be chosen as well as the newest or instead of it. */
export function RevisionChoice({ design: { id: designId, name, currentRevision }, picked, onToggle }: RevisionChoiceProps) {
  const revisions = useDesignRevisions(designId);
  if (revisions.isPending) return <LoadingState label="Loading the revisions" lines={2} />;
  if (revisions.isError) {
    const again = <Button onClick={() => revisions.refetch()}>Try again</Button>;
    return (
      <ErrorState title="The revisions could not be loaded." action={again}>
        {revisions.error.message}
      </ErrorState>
    );
  }
  const earlier = revisions.data.pages.flatMap(({ items }) => items).filter(({ id }) => id !== currentRevision.id);
  return (
    <>
      <ul aria-label={`Earlier revisions of ${name}`} className="flex flex-col">
        {earlier.map(({ id, number, note, createdBy, createdAt }) => (
          <li key={id} className="flex flex-wrap items-baseline gap-x-4 py-0.5">
            <PickBox {...{ picked, onToggle }} one={{ id, name, number }} label={`revision ${number}`} />
            <span className="text-sm text-soft">
              {createdBy ? `${createdBy}, ` : ""}
              <When at={createdAt} />
            </span>
            <span className="min-w-40 flex-1 whitespace-pre-line">{note}</span>
          </li>
        ))}
      </ul>
      <ShowMore list={revisions} />
    </>
  );
}

type PickBoxProps = Readonly<{
  picked: readonly Picked[];
  onToggle: (one: Picked) => void;
  one: Picked;
  /** What stands beside the box; without it the design is only said. */
  label?: string;
}>;

export function PickBox({ picked, onToggle, one, label }: PickBoxProps) {
  const checked = picked.some(({ id }) => id === one.id);
  return (
    <label className="inline-flex min-h-6 min-w-6 items-center gap-2">
      <input
        type="checkbox"
        checked={checked}
        disabled={picked.length >= MOST && !checked}
        onChange={() => onToggle(one)}
        className="size-4"
      />
      <span className="sr-only">{label ? `Lay ${label} of ${one.name} side by side` : `Lay ${one.name} side by side`}</span>
      {label ? <span aria-hidden="true">{label}</span> : null}
    </label>
  );
}
