import "server-only";
import { inTransaction } from "@/db/client";
import { findDesignRevision } from "@/db/queries/design-revisions";
import { findDesign } from "@/db/queries/designs";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { DesignSummary } from "@/lib/schemas/design";
import type { Context } from "../context";
import { insertWithFirstDesignRevision } from "./create";
import { readDesign } from "./read";
import { solveOrRefuse } from "./solve-or-refuse";
import { toDesignSummary } from "./to-design";

/** A design of its own with the newest recipe, computed afresh, so that its evidence is this version's. */
export async function duplicateDesign(
  ctx: Context,
  designId: string,
  name: string,
  signal?: AbortSignal,
): Promise<DesignSummary> {
  allow(ctx, "design:write");
  const { teamId } = ctx;
  const original = await readDesign(ctx, designId);
  const revision = await inTransaction(ctx, (tx) => findDesignRevision(tx, { teamId, revisionId: original.currentRevision.id }));
  if (!revision) throw new NotFound("Design");
  const { recipe, plantId, plantRevisionId, model, number } = revision;
  const evidence = await solveOrRefuse(ctx, model, recipe, { signal });
  const note = `From ${original.name}, revision ${number}`;
  return inTransaction(ctx, async (tx) => {
    const id = await insertWithFirstDesignRevision(tx, ctx, { name, plantId, plantRevisionId, recipe, note }, evidence);
    const made = await findDesign(tx, { teamId, designId: id });
    if (!made) throw new NotFound("Design");
    return toDesignSummary(made);
  });
}
