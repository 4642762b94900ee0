"use client";

import { timeBaseText } from "../../plants/time-base-text";
import { Button } from "../../ui/button";
import { Chip } from "../../ui/chip";
import { LinkButton } from "../../ui/link-button";
import { type Crumb, PageHeading } from "../../ui/page-heading";
import { DraftState } from "../drafts/draft-state";
import { DesignMenu } from "../saving/design-menu";
import { sideBySideAddress } from "../side-by-side-address";
import type { BenchStart } from "./bench-types";
import type { Bench } from "./use-bench";

type BenchHeadingProps = Readonly<{
  bench: Bench;
  start: BenchStart;
  mayWrite: boolean;
  mayEdit: boolean;
  onSave: () => void;
  onSaveAsNew: () => void;
  onKeys: () => void;
}>;

function crumbsOf({ plant }: BenchStart, { ground: { plantRevision, model } }: Bench): Crumb[] {
  const size = `${model.states.length} states, ${model.inputs.length} inputs, ${model.outputs.length} outputs`;
  return [
    { label: "Plants", href: "/plants" },
    { label: plant.name, href: `/plants/${plant.id}` },
    { label: `revision ${plantRevision.number}` },
    { label: size },
    { label: timeBaseText(model.timeBase) },
  ];
}

export function BenchHeading({ bench, start, mayWrite, mayEdit, onSave, onSaveAsNew, onKeys }: BenchHeadingProps) {
  const { base, dirty, drafting } = bench;
  const { design, revision } = base;
  return (
    <PageHeading
      title={design?.name ?? "New design"}
      crumbs={crumbsOf(start, bench)}
      state={
        <>
          {revision ? <Chip>Revision {revision.number}</Chip> : null}
          {design?.archivedAt ? <Chip>archived</Chip> : null}
          {start.plant.archived ? <Chip>plant archived</Chip> : null}
          {mayEdit ? <DraftState drafting={drafting} dirty={dirty} /> : null}
        </>
      }
      actions={
        <>
          {mayEdit ? (
            <>
              <Button tone="quiet" disabled={!bench.canUndo} onClick={bench.undo}>
                Undo
              </Button>
              <Button tone="quiet" disabled={!bench.canRedo} onClick={bench.redo}>
                Redo
              </Button>
            </>
          ) : null}
          <Button tone="quiet" onClick={onKeys}>
            Keys
          </Button>
          {revision ? <LinkButton href={sideBySideAddress(start.plant.id, [revision.id])}>Side-by-side</LinkButton> : null}
          {mayWrite && design ? <DesignMenu design={design} onChanged={bench.setDesign} onSaveAsNew={onSaveAsNew} /> : null}
          {mayEdit ? (
            <Button tone="primary" disabled={design !== null && !dirty} onClick={onSave}>
              {design ? `Save revision ${design.currentRevision.number + 1}` : "Save design"}
            </Button>
          ) : null}
        </>
      }
    />
  );
}
