"use client";

import type { PlantContent } from "@/lib/schemas/plant";
import { FormProblems } from "../ui/form-problems";
import { NameField } from "../ui/name-field";
import { Notice } from "../ui/notice";
import { Select } from "../ui/select";
import { TextArea } from "../ui/text-area";
import type { Submit } from "../ui/use-submit";
import { derivedNames, type PublishDraft, type PublishRow, type RecipeChoice } from "./publish-draft";
import { PublishRowFields } from "./publish-row";

type PublishFormProps = Readonly<{
  id: string;
  content: PlantContent;
  designs: readonly RecipeChoice[];
  draft: PublishDraft;
  submit: Submit;
  possible: boolean;
  onChange: (change: (before: PublishDraft) => Partial<PublishDraft>) => void;
  onPublish: () => void;
}>;

export function PublishForm({ id, content, designs, draft, submit, possible, onChange, onPublish }: PublishFormProps) {
  if (!possible) return <NotYet hasDesigns={designs.length > 0} />;
  const { attempt, problems, refusal, at } = submit;
  const derived = derivedNames(content);
  const changeRow = (name: string, change: Partial<PublishRow>) =>
    onChange(({ rows }) => ({ rows: rows.map((row) => (row.name === name ? { ...row, ...change } : row)) }));
  const places = new Map(draft.rows.filter(({ open }) => open).map(({ name }, index) => [name, index]));
  return (
    <form
      id={id}
      method="post"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        onPublish();
      }}
    >
      <FormProblems title={refusal?.title ?? ""} {...{ attempt, problems }} />
      <div className="grid gap-4 sm:grid-cols-2">
        <NameField
          id="template-name"
          label="Name of the template"
          value={draft.name}
          onChange={(name) => onChange(() => ({ name }))}
          problem={at("/name")}
        />
        <Select
          id="template-recipe"
          label="Recipe that goes along"
          value={draft.revisionId}
          onChange={({ target }) => onChange(() => ({ revisionId: target.value }))}
          options={designs.map(({ revisionId, name }) => ({ value: revisionId, label: name }))}
          problem={at("/content/recipe")}
          hint="With its reasons; the gains are computed anew for each machine."
        />
        <TextArea
          id="template-description"
          label="What it is for"
          optional
          rows={2}
          value={draft.description}
          onChange={({ target }) => onChange(() => ({ description: target.value }))}
          maxLength={2000}
          problem={at("/description")}
          className="sm:col-span-2"
        />
      </div>
      <fieldset className="mt-5">
        <legend className="mb-1 text-table font-semibold">Open parameters</legend>
        <p className="mb-2 text-sm text-soft">
          Whoever starts from the template fills these in, within the range you allow. The suggested values must give a working
          design: that is tried before it is published.
        </p>
        {draft.rows.map((row) => (
          <PublishRowFields
            key={row.name}
            row={row}
            onChange={(change) => changeRow(row.name, change)}
            at={(part) => {
              const place = places.get(row.name);
              return place === undefined || part === "open" ? undefined : at(`/content/openParameters/${place}/${part}`);
            }}
          />
        ))}
      </fieldset>
      {derived.length > 0 ? (
        <p className="border-t border-rule pt-2 text-sm text-soft">
          Computed from others, and so never filled in: <span className="font-mono">{derived.join(", ")}</span>
        </p>
      ) : null}
    </form>
  );
}

function NotYet({ hasDesigns }: Readonly<{ hasDesigns: boolean }>) {
  return hasDesigns ? (
    <Notice kind="caution" title="This plant has no parameter to open.">
      Give the numbers that differ from machine to machine a name under “Parameters”, use the names in the matrices, save, and
      come back.
    </Notice>
  ) : (
    <Notice kind="caution" title="This plant has no design yet.">
      A template carries a recipe that is known to work: make a design first.
    </Notice>
  );
}
