import { defaultRecipe } from "@/control/design/default-recipe";
import type { DraftSubject } from "@/lib/client/drafts";
import type { DesignRevision, DesignSummary } from "@/lib/schemas/design";
import type { Unsaved } from "../drafts/draft-store";
import { type FormReading, recipeKey } from "../recipe/read-form";
import { formOf, type RecipeForm } from "../recipe/recipe-form";
import type { BenchStart, Ground, Solved } from "./bench-types";

/** What the page's edits are held against. */
export type Base = Pick<BenchStart, "design" | "revision" | "recipe" | "ground"> & {
  /** What the edit started from: version and newest revision of the design then. A save over anything later is asked about. */
  readonly from: { readonly version: number; readonly revisionId: string } | null;
};

export const baseOf = ({ design, revision, recipe, ground }: Omit<BenchStart, "plant" | "older">): Base => ({
  design,
  revision,
  recipe,
  ground,
  from: startedFrom(design),
});

export const startedFrom = (design: DesignSummary | null): Base["from"] =>
  design && { version: design.version, revisionId: design.currentRevision.id };

export const storedBase = (design: DesignSummary, revision: DesignRevision): Base =>
  baseOf({ design, revision, recipe: revision.recipe, ground: groundOf(revision) });

export const groundOf = ({ plantRevision, model }: DesignRevision): Ground => ({ plantRevision, model });

const samePlant = (a: Ground, b: Ground) => a.plantRevision.id === b.plantRevision.id;

/** What the sliders start from: the stored recipe, or the plant's own on a revision that it was not made for. */
export const startOf = (base: Base, ground: Ground): RecipeForm =>
  formOf(samePlant(ground, base.ground) ? base.recipe : defaultRecipe(ground.model), ground.model);

/** Whether the page holds something that is not saved. */
export function isDirty(base: Base, ground: Ground, { recipe }: FormReading): boolean {
  return !samePlant(ground, base.ground) || recipe === null || recipeKey(recipe) !== recipeKey(base.recipe);
}

/** Whether what is shown was solved from another recipe than the one on the page. */
export function isStale(solved: Solved | null, ground: Ground, { recipe }: FormReading): boolean {
  if (!solved) return false;
  return !samePlant(ground, solved.ground) || recipe === null || recipeKey(recipe) !== recipeKey(solved.recipe);
}

export const unsavedOf = (form: RecipeForm, ground: Ground, { from }: Base): Unsaved => ({
  form,
  plantRevisionId: ground.plantRevision.id,
  base: from,
});

/** The design renamed, archived or brought back: an edit that started from it still does. */
export function withDesign(base: Base, design: DesignSummary): Base {
  const fresh = base.from !== null && base.from.version === base.design?.version;
  return { ...base, design, from: fresh ? startedFrom(design) : base.from };
}

/** What a draft is of: a design, an older revision that is edited on its own, or a new design of the plant. */
export function draftSubject({ design, revision, older, plant }: BenchStart): DraftSubject {
  const ofDesign = older && revision ? revision.id : design?.id;
  return { plantId: plant.id, subjectId: ofDesign ?? plant.id };
}

/** What the copy in the browser is kept under. */
export function draftName({ design, revision, older, plant }: BenchStart): string {
  if (!design) return `new:${plant.id}`;
  return older && revision ? `${design.id}@${revision.id}` : design.id;
}
