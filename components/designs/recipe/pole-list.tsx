"use client";

import { X } from "lucide-react";
import type { MovePole } from "../../plots/pole-handles";
import { PolePlane } from "../../plots/pole-plane";
import { Button } from "../../ui/button";
import { FieldNotes } from "../../ui/field";
import { Select } from "../../ui/select";
import { StateMark } from "../../ui/state-mark";
import { asKind, movedTo, POLE_FIGURES, POLE_KINDS, type PoleDraft, poleOf, poleTotal } from "./pole-drafts";
import { useRecipe } from "./recipe-context";
import { fieldId } from "./recipe-fields";
import { blankDraft, type RecipeForm } from "./recipe-form";
import { RecipeNumber } from "./recipe-number";

type PoleListProps = Readonly<{
  legend: string;
  /** Of the list in the recipe. */
  pointer: string;
  drafts: readonly PoleDraft[];
  /** How many poles are wanted; null until it is known. */
  wanted: number | null;
  /** What one pole stands for, in the count: "states". */
  per: string;
  write: (form: RecipeForm, drafts: readonly PoleDraft[]) => RecipeForm;
  /** Buttons that fill the list. */
  proposals: React.ReactNode;
}>;

/** Wanted poles, each said in the way that suits it; the count is held against what is needed. */
export function PoleList({ legend, pointer, drafts, wanted, per, write, proposals }: PoleListProps) {
  const { change, problemAt, model } = useRecipe();
  const id = fieldId(pointer);
  const replace = (next: readonly PoleDraft[]) => change(null, (form) => write(form, next));
  const total = poleTotal(drafts);
  const listProblem = drafts.some((_, k) => problemAt(`${pointer}/${k}`)) ? undefined : problemAt(pointer);
  return (
    <fieldset id={id} tabIndex={-1} className="min-w-0 outline-none">
      <legend className="text-table font-semibold">{legend}</legend>
      <p role="status" className="flex items-center gap-1.5 text-sm text-soft">
        {wanted !== null && total === wanted ? <StateMark kind="met" word="Complete: " /> : null}
        {wanted === null ? `${total} given` : `${total} of ${wanted} poles for ${per}; a pair counts as two`}
      </p>
      <ol className="mt-1 divide-y divide-rule border-y border-rule empty:hidden">
        {drafts.map((draft, k) => (
          <li key={draft.key} className="py-1.5">
            <PoleRow
              {...{ draft, k, pointer }}
              onKind={(kind) => replace(drafts.map((old) => (old === draft ? asKind(old, kind, model.timeBase) : old)))}
              onRemove={() => replace(drafts.filter((old) => old !== draft))}
              write={(form, next) =>
                write(
                  form,
                  listIn(form, pointer).map((old) => (old.key === draft.key ? next(old) : old)),
                )
              }
            />
          </li>
        ))}
      </ol>
      <FieldNotes id={id} problem={listProblem} />
      <DraftPlane
        {...{ legend, drafts }}
        onMove={(key, pole) =>
          change(`${pointer}/moved/${key}`, (form) =>
            write(
              form,
              listIn(form, pointer).map((old) => (String(old.key) === key ? movedTo(old, pole, model.timeBase) : old)),
            ),
          )
        }
      />
      <div className="mt-2 flex flex-wrap gap-2">
        <Button size="small" onClick={() => replace([...drafts, blankDraft()])}>
          Add a pole
        </Button>
        {proposals}
      </div>
    </fieldset>
  );
}

type DraftPlaneProps = Readonly<{ legend: string; drafts: readonly PoleDraft[]; onMove: MovePole }>;

/** The poles that can be read, in their plane, to be moved by hand. */
function DraftPlane({ legend, drafts, onMove }: DraftPlaneProps) {
  const { model } = useRecipe();
  const marks = drafts.flatMap((draft, k) => {
    const pole = poleOf(draft, model.timeBase);
    if (!pole) return [];
    return { key: String(draft.key), pole, kind: "closed" as const, axis: null, tag: `entry ${k + 1}` };
  });
  if (marks.length === 0) return null;
  const sampled = model.timeBase.kind === "sampled";
  return (
    <div className="mt-2">
      <PolePlane title={`${legend}, to be moved`} poles={marks} sampled={sampled} table={false} onMove={onMove} />
    </div>
  );
}

/** The list as it stands when the change is made, not when the row was drawn. */
function listIn({ poles, observer }: RecipeForm, pointer: string): readonly PoleDraft[] {
  if (pointer === "/poles") return poles;
  return observer.kind === "reduced" ? observer.reduced : observer.poles;
}

type PoleRowProps = Readonly<{
  draft: PoleDraft;
  k: number;
  pointer: string;
  onKind: (kind: PoleDraft["kind"]) => void;
  onRemove: () => void;
  write: (form: RecipeForm, next: (draft: PoleDraft) => PoleDraft) => RecipeForm;
}>;

function PoleRow({ draft, k, pointer, onKind, onRemove, write }: PoleRowProps) {
  const { model } = useRecipe();
  const sides = ["first", "second"] as const;
  return (
    <>
      <div className="flex items-center gap-2">
        <Select
          label={`Entry ${k + 1} is given as`}
          hideLabel
          className="min-w-0 flex-1"
          value={draft.kind}
          onChange={({ target }) => onKind(target.value as PoleDraft["kind"])}
          options={POLE_KINDS}
        />
        <Button size="small" tone="quiet" aria-label={`Remove entry ${k + 1}`} onClick={onRemove}>
          <X aria-hidden size={16} />
        </Button>
      </div>
      <div className="mt-1 grid grid-cols-2 gap-2">
        {POLE_FIGURES[draft.kind].map(({ field, label, unit }, index) => (
          <RecipeNumber
            key={field}
            label={<span className="font-normal text-soft">{label}</span>}
            pointer={`${pointer}/${k}/${field}`}
            value={draft[sides[index]]}
            unit={unit(model.timeBase)}
            write={(form, value) => write(form, (old) => ({ ...old, [sides[index]]: value }))}
          />
        ))}
      </div>
    </>
  );
}
