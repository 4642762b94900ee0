"use client";

import { parseAsStringLiteral, useQueryState } from "nuqs";
import { useState } from "react";
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
import { PickedList } from "./picked-list";
import { type Picked, togglePicked } from "./picked-revisions";
import { PickBox, RevisionChoice } from "./revision-choice";
import { useDesigns } from "./use-designs";

type DesignsTableProps = Readonly<{
  plantId: string;
  /** Design revisions already chosen, as in an address with too few of them. */
  chosen?: readonly Picked[];
}>;

/** The designs of a plant with their worst figures. Two to six of them are chosen here and laid side by side. */
export function DesignsTable({ plantId, chosen = [] }: DesignsTableProps) {
  const { role } = useSession();
  const mayWrite = role !== "reviewer";
  const [archived, setArchived] = useQueryState("archived", parseAsStringLiteral(SHOWN).withDefault("no"));
  const [picked, setPicked] = useState(chosen);
  const [unfolded, setUnfolded] = useState<string | null>(null);
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
  const onToggle = (one: Picked) => setPicked((now) => togglePicked(now, one));
  const onUnfold = (id: string) => setUnfolded((now) => (now === id ? null : id));
  return (
    <>
      <div className="mb-4 flex flex-wrap items-end gap-4">
        <ShownSelect value={archived} onChange={setArchived} />
        <PickedList plantId={plantId} picked={picked} onRemove={onToggle} />
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
          columns={columnsWith({ picked, onToggle, unfolded, onUnfold })}
          detail={(design) => (design.id === unfolded ? <RevisionChoice {...{ design, picked, onToggle }} /> : null)}
          rowHeader="name"
          rows={rows}
          rowKey={({ id }) => id}
        />
      )}
      <ShowMore list={designs} />
    </>
  );
}

type Choosing = Readonly<{
  picked: readonly Picked[];
  onToggle: (one: Picked) => void;
  /** The design whose earlier revisions are shown. */
  unfolded: string | null;
  onUnfold: (designId: string) => void;
}>;

function columnsWith({ picked, onToggle, unfolded, onUnfold }: Choosing): Column<DesignSummary>[] {
  const choice: Column<DesignSummary> = {
    key: "choose",
    header: <span className="sr-only">Choose for side-by-side</span>,
    cell: ({ name, currentRevision }) => <PickBox {...{ picked, onToggle }} one={{ ...currentRevision, name }} />,
  };
  const revision = ({ id, name, currentRevision: { number } }: DesignSummary) =>
    number === 1 ? (
      number
    ) : (
      <span className="inline-flex items-baseline gap-1">
        {number}
        <Button
          size="small"
          tone="quiet"
          className="font-sans underline underline-offset-3"
          aria-expanded={unfolded === id}
          aria-label={`Earlier revisions of ${name}`}
          onClick={() => onUnfold(id)}
        >
          earlier
        </Button>
      </span>
    );
  return [choice, ...DESIGN_COLUMNS.map((column) => (column.key === "revision" ? { ...column, cell: revision } : column))];
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
