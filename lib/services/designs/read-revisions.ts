import "server-only";
import { inTransaction } from "@/db/client";
import { findDesignRevisions } from "@/db/queries/design-revisions";
import { findEvidenceOf } from "@/db/queries/evidence";
import { DomainError, NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import { MOST } from "@/lib/schemas/compared-count";
import type { DesignRevision } from "@/lib/schemas/design";
import type { Context } from "../context";
import { toDesignRevision } from "./to-design";

/** What stands side by side: revisions of one plant, in the order asked for. All of them, or none. */
export async function readDesignRevisions(
  ctx: Context,
  plantId: string,
  revisionIds: readonly string[],
): Promise<DesignRevision[]> {
  allow(ctx, "design:read");
  if (revisionIds.length === 0) return [];
  if (revisionIds.length > MOST) throw new DomainError("invalid", `At most ${MOST} designs stand side by side.`);
  const { teamId } = ctx;
  return inTransaction(ctx, async (tx) => {
    const found = await findDesignRevisions(tx, { teamId, plantId }, revisionIds);
    const evidence = await findEvidenceOf(tx, { teamId, revisionIds });
    return revisionIds.map((id) => {
      const row = found.find((one) => one.id === id);
      if (!row) throw new NotFound("Design revision");
      const its = evidence.filter(({ designRevisionId }) => designRevisionId === id);
      return toDesignRevision(row, its);
    });
  });
}
