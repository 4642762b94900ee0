"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import type { Plant, PlantRevision } from "@/lib/schemas/plant";
import { PlantDesigns } from "../../designs/plant-designs";
import { useSession } from "../../providers/session-provider";
import { useToast } from "../../providers/toast-provider";
import { Button } from "../../ui/button";
import { Chip } from "../../ui/chip";
import { LinkButton } from "../../ui/link-button";
import { PageHeading } from "../../ui/page-heading";
import { CriteriaTab } from "../criteria/criteria-tab";
import { HistoryTab } from "../history-tab";
import { PlantActions } from "../plant-actions";
import { PlantChecks } from "../plant-checks";
import { ProblemList } from "../problem-list";
import { SaveAsTemplate } from "../save-as-template";
import { DraftNotice } from "./draft-notice";
import { EditorTabs } from "./editor-tabs";
import { SaveRevision } from "./save-revision";
import { useEvaluation } from "./use-evaluation";
import { usePlantDraft } from "./use-plant-draft";

type PlantPageProps = Readonly<{ plant: Plant; revision: PlantRevision; mayWrite: boolean; mayPublish: boolean }>;

/** A stored plant: its newest revision, ready to be changed by those who may. */
export function PlantPage({ plant: start, revision, mayWrite, mayPublish }: PlantPageProps) {
  const { teamId, userId } = useSession();
  const router = useRouter();
  const toast = useToast();
  const [plant, setPlant] = useState(start);
  const [revisionId, setRevisionId] = useState(revision.id);
  const key = `gainwright:plant:${teamId}:${userId}:${plant.id}`;
  const draft = usePlantDraft(key, { content: revision.content, name: "", version: plant.version, revisionId });
  const evaluation = useEvaluation(draft.content);
  const readOnly = !mayWrite || plant.archivedAt !== null;
  const model = evaluation?.model ?? null;
  const shownModel = draft.dirty ? model : (model ?? revision.model);
  /**
   * New names and criteria leave the model as it is: an edit that started from the version before goes on from this one. A newer
   * model that somebody saved meanwhile is not what this page shows, and an edit has still not seen it.
   */
  const changed = (next: Plant) => {
    const sameModel = next.currentRevision.id === plant.currentRevision.id;
    if (sameModel && draft.version === plant.version) draft.rebase(next.version);
    setPlant(sameModel ? next : { ...next, currentRevision: plant.currentRevision });
  };

  return (
    <>
      <PageHeading
        crumbs={[{ label: "Plants", href: "/plants" }]}
        title={plant.name}
        state={
          <>
            <Chip>
              Revision {plant.currentRevision.number}
              {draft.dirty ? " · unsaved changes" : ""}
            </Chip>
            {plant.archivedAt ? <Chip>archived</Chip> : null}
          </>
        }
        actions={
          <>
            {readOnly ? null : <UndoButtons {...draft} />}
            {mayWrite ? <PlantActions plant={plant} onChanged={changed} /> : null}
            {mayPublish && !draft.dirty ? <SaveAsTemplate plant={plant} content={draft.content} /> : null}
            {readOnly || draft.dirty ? null : (
              <LinkButton tone={plant.designCount === 0 ? "primary" : undefined} href={`/plants/${plant.id}/designs/new`}>
                New design
              </LinkButton>
            )}
            {readOnly ? null : (
              <SaveRevision
                plant={plant}
                content={draft.content}
                from={{ version: draft.version ?? plant.version, revisionId: draft.revisionId }}
                disabled={!draft.dirty || model === null}
                onSaved={(saved, content) => {
                  setPlant(saved);
                  setRevisionId(saved.currentRevision.id);
                  draft.settle(content, { version: saved.version, revisionId: saved.currentRevision.id });
                  toast({ text: `Revision ${saved.currentRevision.number} is saved.`, kind: "met" });
                  router.refresh();
                }}
                onCopied={draft.discard}
                onTakeTheirs={() => {
                  draft.discard();
                  window.location.reload();
                }}
              />
            )}
          </>
        }
      />
      <DraftNotice draft={draft} />
      {draft.dirty || !evaluation ? <ProblemList problems={evaluation?.problems ?? []} /> : null}
      <EditorTabs
        {...{ draft, evaluation, readOnly }}
        more={[
          {
            key: "designs",
            label: "Designs",
            count: plant.designCount,
            panel: <PlantDesigns plantId={plant.id} designCount={plant.designCount} />,
          },
          {
            key: "criteria",
            label: "Acceptance criteria",
            count: plant.criteria.length,
            panel: <CriteriaTab {...{ plant, readOnly }} content={draft.content} onSaved={changed} />,
          },
          { key: "history", label: "History", panel: <HistoryTab plantId={plant.id} /> },
        ]}
      />
      <PlantChecks revision={{ plantId: plant.id, revisionId }} content={draft.content} model={shownModel} dirty={draft.dirty} />
    </>
  );
}

type UndoButtonsProps = Readonly<{ undo: () => void; redo: () => void; canUndo: boolean; canRedo: boolean }>;

export function UndoButtons({ undo, redo, canUndo, canRedo }: UndoButtonsProps) {
  return (
    <>
      <Button disabled={!canUndo} onClick={undo}>
        Undo
      </Button>
      <Button disabled={!canRedo} onClick={redo}>
        Redo
      </Button>
    </>
  );
}
