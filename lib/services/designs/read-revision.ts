import "server-only";
import { inTransaction } from "@/db/client";
import { findDesignRevision } from "@/db/queries/design-revisions";
import { findEvidence } from "@/db/queries/evidence";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { DesignRevision } from "@/lib/schemas/design";
import type { Context } from "../context";
import { toDesignRevision } from "./to-design";

export async function readDesignRevision(ctx: Context, revisionId: string): Promise<DesignRevision> {
  allow(ctx, "design:read");
  const key = { teamId: ctx.teamId, revisionId };
  return inTransaction(ctx, async (tx) => {
    const found = await findDesignRevision(tx, key);
    if (!found) throw new NotFound("Design revision");
    return toDesignRevision(found, await findEvidence(tx, key));
  });
}
