"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { fetchDesignRevision } from "@/lib/client/designs";
import { publishTemplate } from "@/lib/client/templates";
import type { Plant, PlantContent } from "@/lib/schemas/plant";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { Dialog } from "../ui/dialog";
import { useCreateKey } from "../ui/use-create-key";
import { useSubmit } from "../ui/use-submit";
import { openParameters, publishFields, type RecipeChoice, startDraft } from "./publish-draft";
import { PublishForm } from "./publish-form";

type PublishTemplateProps = Readonly<{
  plantName: string;
  /** The plant as saved; entries and parameters as typed. */
  content: PlantContent;
  /** The plant's own, which go along. */
  criteria: Plant["criteria"];
  /** Whose recipe can go along, the newest first. */
  designs: readonly RecipeChoice[];
}>;

const FORM = "publish-template";

/** For leads: makes the plant and one design's recipe a template. What was typed stays when the dialog is closed. */
export function PublishTemplate({ plantName, content, criteria, designs }: PublishTemplateProps) {
  const { resume } = useSession();
  const toast = useToast();
  const router = useRouter();
  const keyFor = useCreateKey();
  const [open, setOpen] = useState(false);
  const [kept, setDraft] = useState(() => startDraft(plantName, content, ""));
  // The designs may arrive after the dialog was opened, and the chosen one may be gone.
  const known = designs.some(({ revisionId }) => revisionId === kept.revisionId);
  const draft = known ? kept : { ...kept, revisionId: designs[0]?.revisionId ?? "" };
  const submit = useSubmit(publishFields(draft.rows));
  const possible = draft.rows.length > 0 && designs.length > 0;

  const start = () => {
    // A plant that was saved meanwhile has other parameters; what was typed for those that remain is kept.
    const { rows } = startDraft(plantName, content, "");
    const opened = new Map(draft.rows.filter((row) => row.open).map((row) => [row.name, row]));
    setDraft({ ...draft, rows: rows.map((row) => opened.get(row.name) ?? row) });
    setOpen(true);
  };
  const publish = async () => {
    await submit.run(async () => {
      const parameters = openParameters(draft.rows);
      const { recipe } = await resume(() => fetchDesignRevision(draft.revisionId));
      const body = {
        name: draft.name,
        description: draft.description,
        content: { plant: content, recipe, criteria, openParameters: parameters },
      };
      const { id, name } = await resume(() => publishTemplate(body, keyFor(body)));
      setOpen(false);
      toast({
        kind: "met",
        text: `“${name}” is published: the team can start from it.`,
        action: { label: "Open it", run: () => router.push(`/templates/${id}`) },
      });
    });
  };

  return (
    <>
      <Button onClick={start}>Save as template</Button>
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        wide
        title={`Save ${plantName} as a template`}
        actions={
          <>
            <Button onClick={() => setOpen(false)}>Not now</Button>
            {possible ? (
              <Button type="submit" form={FORM} tone="primary" busy={submit.busy}>
                {submit.busy ? "Trying the suggested values…" : "Publish the template"}
              </Button>
            ) : null}
          </>
        }
      >
        <PublishForm
          id={FORM}
          {...{ content, designs, draft, submit, possible }}
          onChange={(change) => setDraft((before) => ({ ...before, ...change(before) }))}
          onPublish={publish}
        />
      </Dialog>
    </>
  );
}
