import "server-only";
import { inTransaction } from "@/db/client";
import { findDraft } from "@/db/queries/design-drafts";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Draft } from "@/lib/schemas/draft";
import type { Context } from "../context";

export type DraftSubject = { readonly plantId: string; readonly subjectId: string };

/** Of whoever asks, and of nobody else; null where nothing is kept. */
export async function readDraft(ctx: Context, { plantId, subjectId }: DraftSubject): Promise<Draft | null> {
  allow(ctx, "design:write");
  const { teamId, userId } = ctx;
  const found = await inTransaction(ctx, (tx) => findDraft(tx, { teamId, userId, plantId, subjectId }));
  if (found === undefined) throw new NotFound("Plant or design");
  if (found === null) return null;
  const { mark, plantRevisionId, baseRevisionId, baseVersion, form, updatedAt } = found;
  const base = baseRevisionId !== null && baseVersion !== null ? { version: baseVersion, revisionId: baseRevisionId } : null;
  return { mark, plantRevisionId, base, form, updatedAt: updatedAt.toISOString() };
}
