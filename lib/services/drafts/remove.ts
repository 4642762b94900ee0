import "server-only";
import { inTransaction } from "@/db/client";
import { removeDraft as deleteDraft, findDraft } from "@/db/queries/design-drafts";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Context } from "../context";
import { otherDraft } from "./keep";
import type { DraftSubject } from "./read";

/** Once it is saved or given up. One that another page wrote since stays; removing what is gone is no error. */
export async function removeDraft(ctx: Context, { plantId, subjectId }: DraftSubject, marks: readonly string[]): Promise<void> {
  allow(ctx, "design:write");
  const { teamId, userId } = ctx;
  await inTransaction(ctx, async (tx) => {
    const key = { teamId, userId, plantId, subjectId };
    if (await deleteDraft(tx, key, marks)) return;
    const left = await findDraft(tx, key);
    if (left === undefined) throw new NotFound("Plant or design");
    if (left !== null) throw otherDraft();
  });
}
