"use client";

import { useRouter } from "next/navigation";
import { parseAsStringLiteral, useQueryState } from "nuqs";
import { useState } from "react";
import { FEWEST, MOST } from "@/lib/schemas/compared-count";
import type { DesignSummary } from "@/lib/schemas/design";
import { useSession } from "../providers/session-provider";
import { Button } from "../ui/button";
import { type Column, DataTable } from "../ui/data-table";
import { EmptyState } from "../ui/empty-state";
import { ErrorState } from "../ui/error-state";
import { LinkButton } from "../ui/link-button";
import { LoadingState } from "../ui/loading-state";
import { ShowMore } from "../ui/show-more";
import { SHOWN, ShownSelect } from "../ui/shown-select";
import { DESIGN_COLUMNS } from "./design-columns";
import { sideBySideAddress } from "./side-by-side-address";
import { useDesigns } from "./use-designs";

type DesignsTableProps = Readonly<{
  plantId: string;
  /** Design revisions already chosen, as in an address with too few of them. */
  chosen?: readonly string[];
}>;

/** The designs of a plant with their worst figures. Two to six of them are chosen here and laid side by side. */
export function DesignsTable({ plantId, chosen = [] }: DesignsTableProps) {
  const { role } = useSession();
  const mayWrite = role !== "reviewer";
  const [archived, setArchived] = useQueryState("archived", parseAsStringLiteral(SHOWN).withDefault("no"));
  const [picked, setPicked] = useState<readonly string[]>(chosen);
  const designs = useDesigns(plantId, archived);
  if (designs.isPending) return <LoadingState label="Loading the designs" />;
  if (designs.isError) {
    const again = <Button onClick={() => designs.refetch()}>Try again</Button>;
    return (
      <ErrorState title="The designs could not be loaded." action={again}>
        {designs.error.message}
      </ErrorState>
    );
  }
  const rows = designs.data.pages.flatMap(({ items }) => items);
  if (rows.length === 0 && archived === "no")
    return <NoDesign plantId={plantId} mayWrite={mayWrite} onShowAll={() => setArchived("all")} />;
  const toggle = (id: string) => setPicked((now) => (now.includes(id) ? now.filter((other) => other !== id) : [...now, id]));
  return (
    <>
      <div className="mb-4 flex flex-wrap items-end gap-4">
        <ShownSelect value={archived} onChange={setArchived} />
        <Comparing plantId={plantId} picked={picked} />
        {mayWrite ? (
          <LinkButton href={`/plants/${plantId}/designs/new`} className="ml-auto">
            New design
          </LinkButton>
        ) : null}
      </div>
      {rows.length === 0 ? (
        <EmptyState title="No design here" action={<Button onClick={() => setArchived("no")}>Show the designs in use</Button>}>
          Archived designs keep everything and can be brought back from their page.
        </EmptyState>
      ) : (
        <DataTable
          caption="Designs of this plant, figures worst over everything commanded"
          columns={[choiceColumn(picked, toggle), ...DESIGN_COLUMNS]}
          rowHeader="name"
          rows={rows}
          rowKey={({ id }) => id}
        />
      )}
      <ShowMore list={designs} />
    </>
  );
}

const choiceColumn = (picked: readonly string[], onToggle: (revisionId: string) => void): Column<DesignSummary> => ({
  key: "choose",
  header: <span className="sr-only">Choose for side-by-side</span>,
  cell: ({ name, currentRevision: { id } }) => (
    <label className="inline-flex min-h-6 min-w-6 items-center">
      <span className="sr-only">Lay {name} side by side</span>
      <input
        type="checkbox"
        checked={picked.includes(id)}
        disabled={picked.length >= MOST && !picked.includes(id)}
        onChange={() => onToggle(id)}
        className="size-4"
      />
    </label>
  ),
});

function Comparing({ plantId, picked }: Readonly<{ plantId: string; picked: readonly string[] }>) {
  const router = useRouter();
  const enough = picked.length >= FEWEST;
  const said =
    picked.length === 0
      ? "Choose two to six designs to compare."
      : `${picked.length} chosen${picked.length < FEWEST ? ", one more is needed" : picked.length === MOST ? ", as many as fit" : ""}.`;
  return (
    <div className="flex flex-wrap items-center gap-3">
      <Button tone="primary" disabled={!enough} onClick={() => router.push(sideBySideAddress(plantId, picked))}>
        Lay side by side
      </Button>
      <p role="status" className="text-sm text-soft">
        {said}
      </p>
    </div>
  );
}

type NoDesignProps = Readonly<{ plantId: string; mayWrite: boolean; onShowAll: () => void }>;

function NoDesign({ plantId, mayWrite, onShowAll }: NoDesignProps) {
  const archive = (
    <Button tone="quiet" onClick={onShowAll}>
      Look among the archived
    </Button>
  );
  if (!mayWrite) {
    return (
      <EmptyState title="No design yet" action={archive}>
        A lead or an engineer of the team designs the feedback of this plant; you will find it here to read and compare.
      </EmptyState>
    );
  }
  const action = (
    <div className="flex flex-wrap gap-3">
      <LinkButton tone="primary" href={`/plants/${plantId}/designs/new`}>
        New design
      </LinkButton>
      {archive}
    </div>
  );
  return (
    <EmptyState title="No design yet" action={action}>
      A design is a recipe applied to this plant, with its gains and evidence. Say how far each state may stray and how much
      effort each input may spend, or where the poles shall lie; the coupled responses follow at once.
    </EmptyState>
  );
}
