import "server-only";
import { inTransaction } from "@/db/client";
import { findDraftGround, putDraft } from "@/db/queries/design-drafts";
import { DomainError, NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { KeepDraft, KeptDraft } from "@/lib/schemas/draft";
import type { Context } from "../context";
import type { DraftSubject } from "./read";

/** Written every few seconds while somebody works, so it leaves no trace in the audit log. */
export async function keepDraft(
  ctx: Context,
  { plantId, subjectId }: DraftSubject,
  { mark, replaces = [], plantRevisionId, base, form }: KeepDraft,
): Promise<KeptDraft> {
  allow(ctx, "design:write");
  const { teamId, userId } = ctx;
  const on = { plantRevisionId, baseRevisionId: base?.revisionId ?? null };
  return inTransaction(ctx, async (tx) => {
    const key = { teamId, userId, plantId, subjectId };
    const ground = await findDraftGround(tx, key, on);
    if (!ground) throw new NotFound("Plant, design or revision");
    const values = { ...ground, ...on, baseVersion: base?.version ?? null, form, mark };
    const kept = await putDraft(tx, key, values, replaces);
    if (!kept) throw otherDraft();
    return { mark: kept.mark, updatedAt: kept.updatedAt.toISOString() };
  });
}

export const otherDraft = () =>
  new DomainError("stale-version", "Another page of yours kept a newer draft of this. Read it, then choose which one stays.");
