"use client";

import type { PlantContent } from "@/control/plant/content";
import { MOST_CRITERIA } from "@/lib/schemas/criteria-count";
import type { Plant } from "@/lib/schemas/plant";
import { Button } from "../../ui/button";
import { EmptyState } from "../../ui/empty-state";
import { FormProblems } from "../../ui/form-problems";
import { Notice } from "../../ui/notice";
import { SheetSection } from "../../ui/sheet-section";
import { EditorTable } from "../editor/editor-table";
import { CriteriaList } from "./criteria-list";
import { CriterionRow } from "./criterion-row";
import { type CriteriaEditing, useCriteria } from "./use-criteria";

const TITLE = "Acceptance criteria";
const NOTE = "every design of this plant is held against them, whenever it was made";

type CriteriaTabProps = Readonly<{
  plant: Plant;
  /** As it is being written: its signals are what criteria are about. */
  content: PlantContent;
  readOnly: boolean;
  onSaved: (saved: Plant) => void;
}>;

/** What a design of this plant must hold: lines to be added and removed, saved as one. */
export function CriteriaTab({ plant, content, readOnly, onSaved }: CriteriaTabProps) {
  if (!readOnly) return <EditableCriteria {...{ plant, content, onSaved }} />;
  return (
    <SheetSection title={TITLE} note={NOTE}>
      {plant.criteria.length === 0 ? <NoCriteria /> : <CriteriaList label={TITLE} criteria={plant.criteria} />}
    </SheetSection>
  );
}

function EditableCriteria({ plant, content, onSaved }: Omit<CriteriaTabProps, "readOnly">) {
  const editing = useCriteria(plant, onSaved);
  const { lines, dirty, submit, theirs } = editing;
  const add = (
    <Button size="small" disabled={lines.length >= MOST_CRITERIA} onClick={() => editing.add(content)}>
      Add criterion
    </Button>
  );
  const actions = (
    <>
      {lines.length > 0 ? add : null}
      {dirty ? (
        <Button size="small" onClick={editing.drop}>
          Drop the changes
        </Button>
      ) : null}
      {dirty || lines.length > 0 ? (
        <Button size="small" tone="primary" busy={submit.busy} disabled={!dirty} onClick={editing.save}>
          {submit.busy ? "Saving…" : "Save criteria"}
        </Button>
      ) : null}
    </>
  );
  return (
    <SheetSection title={TITLE} note={NOTE} actions={actions}>
      <FormProblems attempt={submit.attempt} problems={submit.problems} title="The criteria could not be saved yet." />
      {theirs ? <ChangedByOthers theirs={theirs} editing={editing} /> : null}
      {lines.length === 0 ? (
        <NoCriteria action={add} />
      ) : (
        <EditorTable caption={TITLE} headers={["What is limited", "Of", "At most"]} buttons="Removal">
          {lines.map((line, index) => (
            <CriterionRow key={line.key} {...{ line, index, content, editing }} />
          ))}
        </EditorTable>
      )}
    </SheetSection>
  );
}

function NoCriteria({ action }: Readonly<{ action?: React.ReactNode }>) {
  return (
    <EmptyState title="No acceptance criteria yet" action={action}>
      Limits belong here that every design of this machine has to keep: how soon it settles, how far it overshoots, how much one
      axis may disturb another, and what share of an actuator it may use. Each design then says which of them it meets.
    </EmptyState>
  );
}

type ChangedByOthersProps = Readonly<{ theirs: Plant; editing: CriteriaEditing }>;

/** Somebody saved other criteria meanwhile: theirs are shown, and nothing is overwritten without a press. */
function ChangedByOthers({ theirs, editing: { settle, save, submit } }: ChangedByOthersProps) {
  const action = (
    <>
      <Button onClick={() => settle(theirs)}>Take theirs, drop mine</Button>
      <Button busy={submit.busy} onClick={save}>
        Save mine over theirs
      </Button>
    </>
  );
  return (
    <div className="mb-4">
      <Notice kind="caution" role="alert" title="Somebody changed the criteria after you opened this plant." action={action}>
        {theirs.criteria.length === 0 ? (
          "They removed all of them."
        ) : (
          <div className="mt-2">
            <CriteriaList label="The criteria that they saved" criteria={theirs.criteria} />
          </div>
        )}
      </Notice>
    </div>
  );
}
