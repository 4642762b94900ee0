import "server-only";
import type { Evidence } from "@/control/design/evidence";
import type { Recipe } from "@/control/design/recipe";
import { type Db, inTransaction } from "@/db/client";
import { insertDesignRevision } from "@/db/queries/design-revisions";
import { findDesign, insertDesign } from "@/db/queries/designs";
import { insertEvidence, insertResponseRecords } from "@/db/queries/evidence";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { CreateDesign, DesignSummary } from "@/lib/schemas/design";
import { recordEvent } from "../audit";
import type { Context } from "../context";
import { evidenceRows } from "./evidence-reply";
import { findSolvablePlant } from "./find-solvable-plant";
import { requireAgreement } from "./require-agreement";
import { requireFinite } from "./require-finite";
import { solveOrRefuse } from "./solve-or-refuse";
import { toDesignSummary } from "./to-design";

type NewRevision = {
  readonly plantId: string;
  readonly designId: string;
  readonly number: number;
  readonly plantRevisionId: string;
  readonly recipe: Recipe;
  readonly note: string;
};

/** A revision with all its evidence, within a transaction of the caller's. */
export async function insertWithEvidence(tx: Db, ctx: Context, revision: NewRevision, evidence: Evidence): Promise<void> {
  requireFinite(evidence);
  const { teamId, userId: createdBy } = ctx;
  const { methodVersion } = evidence;
  const { id } = await insertDesignRevision(tx, { ...revision, teamId, methodVersion, createdBy });
  const key = { teamId, revisionId: id };
  await insertEvidence(tx, key, evidenceRows(evidence));
  if (evidence.responses.state === "computed") await insertResponseRecords(tx, key, evidence.responses.value.records);
}

/** A design and its first revision, within a transaction of the caller's. */
export async function insertWithFirstDesignRevision(
  tx: Db,
  ctx: Context,
  { name, ...revision }: Omit<NewRevision, "designId" | "number"> & { readonly name: string },
  evidence: Evidence,
): Promise<string> {
  const { id: designId } = await insertDesign(tx, { teamId: ctx.teamId, plantId: revision.plantId, name, createdBy: ctx.userId });
  await insertWithEvidence(tx, ctx, { ...revision, designId, number: 1 }, evidence);
  await recordEvent(tx, ctx, "design.created", { type: "design", id: designId, revision: 1 });
  return designId;
}

/** Solves on the server, whatever the browser computed, and stores the recipe with its evidence. */
export async function createDesign(
  ctx: Context,
  plantId: string,
  { name, plantRevisionId, recipe, note, shown }: CreateDesign,
  signal?: AbortSignal,
): Promise<DesignSummary> {
  allow(ctx, "design:write");
  const { model } = await findSolvablePlant(ctx, plantId, plantRevisionId);
  const evidence = await solveOrRefuse(ctx, model, recipe, { signal });
  requireAgreement(evidence, shown);
  return inTransaction(ctx, async (tx) => {
    const designId = await insertWithFirstDesignRevision(tx, ctx, { name, plantId, plantRevisionId, recipe, note }, evidence);
    const made = await findDesign(tx, { teamId: ctx.teamId, designId });
    if (!made) throw new NotFound("Design");
    return toDesignSummary(made);
  });
}
