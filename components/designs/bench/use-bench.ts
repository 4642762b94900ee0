"use client";

import { useCallback, useMemo, useState } from "react";
import type { PlantModel } from "@/control/plant/model";
import { fetchPlantRevision } from "@/lib/client/plants";
import type { DesignRevision, DesignSummary } from "@/lib/schemas/design";
import { useSession } from "../../providers/session-provider";
import { carryRecipe } from "../recipe/carry-recipe";
import { type FormReading, readForm } from "../recipe/read-form";
import { recipeFields } from "../recipe/recipe-fields";
import { formOf, type RecipeForm } from "../recipe/recipe-form";
import { useRecipeForm } from "../recipe/use-recipe-form";
import { type Base, baseOf, groundOf, isDirty, isStale, startedFrom, storedBase, withDesign } from "./bench-base";
import { asStored, type BenchStart, type Ground } from "./bench-types";
import { useBenchDraft } from "./use-bench-draft";
import { useFollowing } from "./use-following";
import { useSolving } from "./use-solving";
import { useUnread, withUnread } from "./use-unread";

export type Bench = ReturnType<typeof useBench>;

/** Everything the page of a design holds: what is stored, what is being written, what was solved last. */
export function useBench(start: BenchStart, mayWrite: boolean) {
  const [base, setBase] = useState<Base>(() => baseOf(start));
  const [ground, setGround] = useState(start.ground);
  const [firstForm] = useState(() => formOf(start.recipe, start.ground.model));
  const editing = useRecipeForm(firstForm);
  const { form, reset } = editing;
  const { unread, setUsable } = useUnread();
  const reading = useMemo(() => withUnread(readForm(form, ground.model), unread), [form, ground, unread]);
  const dirty = useMemo(() => isDirty(base, ground, reading), [base, ground, reading]);
  const { solving, stale } = useFollowedSolving(start, form, ground, reading, mayWrite);
  const { setSolved, solve, clear } = solving;
  const plantRevision = usePlantRevision(start.plant.id);

  const { drafting, forget, found, setFound } = useBenchDraft({
    ...{ start, dirty, editing, base, setBase, ground, setGround, plantRevision },
    active: mayWrite,
  });

  return {
    ...editing,
    ...{ drafting, forget },
    ...{ base, ground, reading, dirty, stale, solving, found, setUsable },
    solve: () => solve(reading, ground),
    /** What is stored now is where the next edit starts from. */
    settle: (design: DesignSummary, revision: DesignRevision) => {
      setBase(storedBase(design, revision));
      setGround(groundOf(revision));
      setFound(null);
      setSolved(asStored(revision));
    },
    /** Drops what is not saved and shows a stored revision instead. */
    take: (design: DesignSummary, revision: DesignRevision) => {
      setBase(storedBase(design, revision));
      setGround(groundOf(revision));
      reset(formOf(revision.recipe, revision.model as PlantModel));
      setFound(null);
      setSolved(asStored(revision));
      clear();
    },
    setDesign: (design: DesignSummary) => setBase((now) => withDesign(now, design)),
    discard: () => {
      setBase((now) => ({ ...now, from: startedFrom(now.design) }));
      setGround(base.ground);
      reset(formOf(base.recipe, base.ground.model));
      setFound(null);
      clear();
    },
    dismissFound: () => setFound(null),
    /** The recipe on the newest revision of its plant, solved at once; saving it is another step. */
    carryOver: async () => {
      const newest = await plantRevision(start.plant.newest.id);
      const carried = formOf(carryRecipe(reading.recipe ?? base.recipe, ground.model, newest.model), newest.model);
      setGround(newest);
      reset(carried);
      await solve(readForm(carried, newest.model), newest);
    },
  };
}

/** What was solved last, and its following of what is written. */
function useFollowedSolving(start: BenchStart, form: RecipeForm, ground: Ground, reading: FormReading, mayWrite: boolean) {
  const solving = useSolving(recipeFields(form, ground.model), start.revision && asStored(start.revision));
  const { solved, live, follow } = solving;
  const stale = useMemo(() => isStale(solved, ground, reading), [solved, ground, reading]);
  const behind = solved === null || stale;
  useFollowing({ recipe: reading.recipe, ground, behind, active: mayWrite && live, follow });
  return { solving, stale };
}

/** @throws RequestProblem */
function usePlantRevision(plantId: string) {
  const { resume } = useSession();
  return useCallback(
    async (revisionId: string): Promise<Ground> => {
      const { id, number, model } = await resume(() => fetchPlantRevision(plantId, revisionId));
      return { plantRevision: { id, number }, model: model as PlantModel };
    },
    [resume, plantId],
  );
}
