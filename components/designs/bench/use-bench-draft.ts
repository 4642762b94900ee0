"use client";

import { type Dispatch, type SetStateAction, useMemo, useState } from "react";
import { useSession } from "../../providers/session-provider";
import { draftKey, fitsPlant, type RecipeDraft } from "../drafts/draft-store";
import { useKeptDraft } from "../drafts/use-kept-draft";
import { readForm } from "../recipe/read-form";
import { rekeyed } from "../recipe/recipe-form";
import type { useRecipeForm } from "../recipe/use-recipe-form";
import { type Base, draftName, draftSubject, isDirty, unsavedOf } from "./bench-base";
import type { BenchStart, Ground } from "./bench-types";

type BenchDraft = Readonly<{
  start: BenchStart;
  active: boolean;
  dirty: boolean;
  editing: ReturnType<typeof useRecipeForm>;
  base: Base;
  setBase: Dispatch<SetStateAction<Base>>;
  ground: Ground;
  setGround: (ground: Ground) => void;
  /** @throws RequestProblem */
  plantRevision: (revisionId: string) => Promise<Ground>;
}>;

/** What is unsaved on the bench, kept; and what another visit left, shown in its place. */
export function useBenchDraft({ start, active, dirty, editing, base, setBase, ground, setGround, plantRevision }: BenchDraft) {
  const { teamId, userId } = useSession();
  const [found, setFound] = useState<RecipeDraft | null>(null);
  const { form, reset, change, canUndo, canRedo } = editing;
  const unsaved = useMemo(() => (dirty && active ? unsavedOf(form, ground, base) : null), [dirty, active, form, ground, base]);

  const takeUp = async (draft: RecipeDraft) => {
    const same = draft.plantRevisionId === start.ground.plantRevision.id;
    const its = same ? start.ground : await plantRevision(draft.plantRevisionId).catch(() => null);
    if (!its || !fitsPlant(draft.form, its.model)) return;
    const back = rekeyed(draft.form);
    // Saved already, in another tab or by one that ended right then: nothing is unsaved, and edits start from the newest revision.
    if (!isDirty(base, its, readForm(back, its.model))) return;
    setGround(its);
    // In place of what somebody is at work on, it is a step that can be undone.
    if (canUndo && its.plantRevision.id === ground.plantRevision.id) change(null, () => back);
    else reset(back);
    setFound(draft);
    setBase((now) => ({ ...now, from: draft.base ?? now.from }));
  };
  const kept = useKeptDraft({
    key: draftKey(teamId, userId, draftName(start)),
    subject: draftSubject(start),
    active,
    unsaved,
    edited: canUndo || canRedo,
    onFound: (draft) => void takeUp(draft),
  });
  return { ...kept, found, setFound };
}
