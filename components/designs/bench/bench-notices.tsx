"use client";

import { useState } from "react";
import { RequestProblem } from "@/lib/client/request";
import { Button } from "../../ui/button";
import { LinkButton } from "../../ui/link-button";
import { Notice } from "../../ui/notice";
import { UnsavedBack } from "../../ui/unsaved-back";
import { DraftNotices } from "../drafts/draft-notices";
import type { BenchStart } from "./bench-types";
import type { Bench } from "./use-bench";

type BenchNoticesProps = Readonly<{ bench: Bench; start: BenchStart; mayEdit: boolean }>;

/** What somebody who opens the page has to know before reading on. */
export function BenchNotices({ bench, start, mayEdit }: BenchNoticesProps) {
  return (
    <>
      <RestoredNotice bench={bench} />
      <div className="mb-6 flex flex-col gap-3 empty:hidden">
        <DraftNotices drafting={bench.drafting} dirty={bench.dirty} />
        <OlderNotice bench={bench} plantId={start.plant.id} mayEdit={mayEdit} />
        <OutdatedNotice bench={bench} newest={start.plant.newest} mayEdit={mayEdit} />
      </div>
    </>
  );
}

function RestoredNotice({ bench: { found, base, discard, dismissFound, dirty } }: Readonly<{ bench: Bench }>) {
  if (!found || !dirty) return null;
  const { design } = base;
  const overtaken = design !== null && found.base !== null && found.base.revisionId !== design.currentRevision.id;
  return (
    <UnsavedBack at={found.at} where={found.where} onKeep={dismissFound} onDiscard={discard}>
      {overtaken ? ` Since then revision ${design.currentRevision.number} was saved; saving yours will show what differs.` : ""}
    </UnsavedBack>
  );
}

function OlderNotice({ bench: { base }, plantId, mayEdit }: Readonly<{ bench: Bench; plantId: string; mayEdit: boolean }>) {
  const { design, revision } = base;
  if (!design || !revision || revision.id === design.currentRevision.id) return null;
  const newest = design.currentRevision.number;
  return (
    <Notice
      kind="caution"
      title={`This is revision ${revision.number} of ${newest}.`}
      action={
        <LinkButton size="small" href={`/plants/${plantId}/designs/${design.id}`}>
          Go to revision {newest}
        </LinkButton>
      }
    >
      {mayEdit ? `Saved from here, the recipe becomes revision ${newest + 1}; no revision is ever changed.` : null}
    </Notice>
  );
}

type OutdatedNoticeProps = Readonly<{ bench: Bench; newest: BenchStart["plant"]["newest"]; mayEdit: boolean }>;

function OutdatedNotice({ bench, newest, mayEdit }: OutdatedNoticeProps) {
  const [busy, setBusy] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const { number, id } = bench.ground.plantRevision;
  if (id === newest.id) return null;
  const carry = async () => {
    setBusy(true);
    setTrouble(null);
    try {
      await bench.carryOver();
    } catch (error) {
      if (!(error instanceof RequestProblem)) throw error;
      setTrouble(error.message);
    } finally {
      setBusy(false);
    }
  };
  return (
    <Notice
      kind="caution"
      title={`Outdated: this stands on plant revision ${number}, the newest is ${newest.number}.`}
      action={
        mayEdit ? (
          <Button size="small" busy={busy} onClick={carry}>
            Carry the recipe over to plant revision {newest.number}
          </Button>
        ) : undefined
      }
    >
      The numbers below hold for the plant as it was.
      {mayEdit ? " Carried over, the recipe is solved again at once and saved only when you say so." : ""}
      {trouble ? ` It could not be carried over: ${trouble}` : ""}
    </Notice>
  );
}
