"use client";

import { useRouter } from "next/navigation";
import { createPlant } from "@/lib/client/plants";
import { useSession } from "../../providers/session-provider";
import { Button } from "../../ui/button";
import { FormProblems } from "../../ui/form-problems";
import { NameField } from "../../ui/name-field";
import { PageHeading } from "../../ui/page-heading";
import { useCreateKey } from "../../ui/use-create-key";
import { useSubmit } from "../../ui/use-submit";
import { PlantChecks } from "../plant-checks";
import { ProblemList } from "../problem-list";
import { AxesChoice } from "./axes-choice";
import { DraftNotice } from "./draft-notice";
import { EditorTabs } from "./editor-tabs";
import { blankPlant } from "./plant-document";
import { UndoButtons } from "./plant-page";
import { useEvaluation } from "./use-evaluation";
import { usePlantDraft } from "./use-plant-draft";

const START = { content: blankPlant(["first axis", "second axis"]), name: "", version: null, revisionId: null };

/** A plant from nothing: axes first, then signals and matrices of the right shape to type or paste into. */
export function NewPlantPage() {
  const { teamId, userId, resume } = useSession();
  const router = useRouter();
  const draft = usePlantDraft(`gainwright:plant:${teamId}:${userId}:new`, START);
  const evaluation = useEvaluation(draft.content);
  const keyFor = useCreateKey();
  const { busy, attempt, problems, at, run } = useSubmit({ "/name": "new-plant-name" });
  const model = evaluation?.model ?? null;
  const fresh = !draft.dirty;

  const save = () =>
    run(async () => {
      const body = { name: draft.name, content: draft.content, note: "" };
      const made = await resume(() => createPlant(body, keyFor(body)));
      draft.settle(draft.content, { version: made.version, revisionId: made.currentRevision.id });
      router.push(`/plants/${made.id}`);
    });

  return (
    <>
      <PageHeading
        crumbs={[{ label: "Plants", href: "/plants" }]}
        title="New plant"
        actions={
          <>
            <UndoButtons {...draft} />
            <Button tone="primary" busy={busy} disabled={model === null} onClick={save}>
              {busy ? "Saving…" : "Save plant"}
            </Button>
          </>
        }
      />
      <DraftNotice draft={draft} />
      <FormProblems {...{ attempt, problems }} />
      <div className="mb-6 flex flex-wrap items-start gap-x-8 gap-y-4">
        <NameField
          id="new-plant-name"
          label="Name of the plant"
          className="w-80 max-w-full"
          value={draft.name}
          problem={at("/name")}
          hint="The machine, as your team calls it."
          onChange={draft.setName}
        />
        <AxesChoice fresh={fresh} onChoose={(names) => draft.set(blankPlant(names))} />
      </div>
      {draft.dirty ? <ProblemList problems={evaluation?.problems ?? []} /> : null}
      <EditorTabs {...{ draft, evaluation }} readOnly={false} />
      <PlantChecks revision={null} content={draft.content} model={model} dirty />
    </>
  );
}
