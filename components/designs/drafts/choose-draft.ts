import type { Draft } from "@/lib/schemas/draft";
import type { RecipeForm } from "../recipe/recipe-form";
import type { LocalDraft, RecipeDraft, Unsaved } from "./draft-store";

export type Choice = {
  /** What comes back; null: nothing. */
  readonly draft: RecipeDraft | null;
  /** What a write may replace on the server. */
  readonly marks: readonly string[];
  /** Written on another page meanwhile and not a part of `draft`: to be asked about. */
  readonly other: RecipeDraft | null;
};

/** A form of another shape is found out by `fitsPlant` before it is shown. */
export const fromServer = ({ form, plantRevisionId, base, updatedAt }: Draft): RecipeDraft => ({
  form: form as RecipeForm,
  plantRevisionId,
  base,
  at: updatedAt,
  where: "server",
});

/** Keys of a document come back from the server in another order. */
function ordered(_: string, value: unknown): unknown {
  if (typeof value !== "object" || value === null || Array.isArray(value)) return value;
  return Object.fromEntries(Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1)));
}
const textOf = ({ form, plantRevisionId, base }: Unsaved) => JSON.stringify({ form, plantRevisionId, base }, ordered);
export const sameDraft = (a: Unsaved, b: Unsaved): boolean => textOf(a) === textOf(b);

/**
 * Which unsaved work comes back. The copy in this browser may be ahead of the server's, as after a lost connection; the server's may be
 * ahead of it, or gone, since the person went on in another browser; or both went on, and then the newer one comes back.
 */
export function chooseDraft(local: LocalDraft | null, server: Draft | null): Choice {
  if (!server) return { draft: local?.synced ? null : local, marks: [], other: null };
  const theirs = fromServer(server);
  const marks = [server.mark];
  if (!local || local.synced) return { draft: theirs, marks, other: null };
  if (local.marks.includes(server.mark) || sameDraft(local, theirs)) return { draft: local, marks, other: null };
  return Date.parse(local.at) >= Date.parse(server.updatedAt)
    ? { draft: local, marks, other: theirs }
    : { draft: theirs, marks, other: local };
}
