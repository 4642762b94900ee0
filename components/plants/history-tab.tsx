"use client";

import { useQuery } from "@tanstack/react-query";
import Link from "next/link";
import { parseAsString, useQueryStates } from "nuqs";
import { fetchDifference, fetchPlantRevisions, plantKeys } from "@/lib/client/plants";
import type { PlantRevisionEntry } from "@/lib/schemas/plant";
import { useSession } from "../providers/session-provider";
import { type Column, DataTable } from "../ui/data-table";
import { ErrorState } from "../ui/error-state";
import { LoadingState } from "../ui/loading-state";
import { Select } from "../ui/select";
import { SheetSection } from "../ui/sheet-section";
import { whenText } from "../ui/when-text";
import { DifferenceTable } from "./difference-table";

const columns: readonly Column<PlantRevisionEntry>[] = [
  { key: "number", header: "Revision", kind: "figure", cell: ({ number }) => number },
  { key: "note", header: "What changed", cell: ({ note }) => note || <span className="text-soft">no note</span> },
  { key: "by", header: "By", cell: ({ createdBy }) => createdBy ?? "somebody who left" },
  { key: "at", header: "When", cell: ({ createdAt }) => whenText(createdAt) },
];

/** The revisions of a plant, and what differs between any two of them. */
export function HistoryTab({ plantId }: Readonly<{ plantId: string }>) {
  const { resume } = useSession();
  const [range, setRange] = useQueryStates({ from: parseAsString, to: parseAsString }, { history: "replace" });
  const revisions = useQuery({
    queryKey: plantKeys.revisions(plantId),
    queryFn: ({ signal }) => resume(() => fetchPlantRevisions(plantId, {}, signal)),
  });
  const items = revisions.data?.items ?? [];
  const to = range.to ?? items[0]?.id;
  const from = range.from ?? items[1]?.id;
  const difference = useQuery({
    queryKey: plantKeys.difference(plantId, from ?? "", to ?? ""),
    queryFn: ({ signal }) => resume(() => fetchDifference(plantId, from ?? "", to ?? "", signal)),
    enabled: from !== undefined && to !== undefined && from !== to,
  });
  if (revisions.isPending) return <LoadingState label="Loading the revisions" />;
  if (revisions.isError) return <ErrorState title="The revisions could not be loaded.">{revisions.error.message}</ErrorState>;
  const options = items.map(({ id, number, note }) => ({
    value: id,
    label: note ? `${number}: ${note.slice(0, 60)}` : String(number),
  }));
  return (
    <>
      <DataTable caption="Revisions" columns={columns} rows={items} rowKey={({ id }) => id} />
      {items.length > 1 ? (
        <div className="mt-8">
          <SheetSection title="What differs">
            <div className="mb-4 flex flex-wrap gap-4">
              <Select
                label="From revision"
                value={from ?? ""}
                options={options}
                onChange={({ target }) => setRange({ from: target.value })}
              />
              <Select
                label="To revision"
                value={to ?? ""}
                options={options}
                onChange={({ target }) => setRange({ to: target.value })}
              />
            </div>
            {from === to ? <p>Choose two different revisions.</p> : null}
            {difference.isFetching ? <LoadingState label="Comparing" /> : null}
            {difference.isError ? <ErrorState title="They could not be compared.">{difference.error.message}</ErrorState> : null}
            {difference.data ? (
              <>
                <DifferenceTable difference={difference.data} />
                <Outdated designs={difference.data.outdates} revision={difference.data.to.number} plantId={plantId} />
              </>
            ) : null}
          </SheetSection>
        </div>
      ) : null}
    </>
  );
}

type OutdatedProps = Readonly<{
  designs: readonly { id: string; name: string; onRevision: number }[];
  revision: number;
  plantId: string;
}>;

function Outdated({ designs, revision, plantId }: OutdatedProps) {
  if (designs.length === 0) return null;
  return (
    <p className="mt-3">
      Designs on another revision than {revision}:{" "}
      {designs.map(({ id, name, onRevision }, index) => (
        <span key={id}>
          {index > 0 ? ", " : ""}
          <Link href={`/plants/${plantId}/designs/${id}`}>{name}</Link> (revision {onRevision})
        </span>
      ))}
    </p>
  );
}
