import "server-only";
import { advanceDesignAt } from "@/db/queries/designs";
import { StaleVersion } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { AddDesignRevision, DesignSummary } from "@/lib/schemas/design";
import type { Context } from "../context";
import { changeDesignAt } from "./change-at-version";
import { insertWithEvidence } from "./create";
import { findSolvablePlant } from "./find-solvable-plant";
import { readDesign } from "./read";
import { requireAgreement } from "./require-agreement";
import { solveOrRefuse } from "./solve-or-refuse";

/** `version` is the design's version that the edit started from. */
export async function addDesignRevision(
  ctx: Context,
  designId: string,
  version: number,
  { plantRevisionId, recipe, note, shown }: AddDesignRevision,
  signal?: AbortSignal,
): Promise<DesignSummary> {
  allow(ctx, "design:write");
  const { plantId, version: stored } = await readDesign(ctx, designId);
  // Said before anything is computed in vain; the write below still decides between two that start from the same version.
  if (stored !== version) throw new StaleVersion(version, stored);
  const { model } = await findSolvablePlant(ctx, plantId, plantRevisionId);
  const evidence = await solveOrRefuse(ctx, model, recipe, { signal });
  requireAgreement(evidence, shown);
  return changeDesignAt(ctx, designId, version, "design.revised", async (tx, key) => {
    const saved = await advanceDesignAt(tx, key, version);
    if (saved) {
      await insertWithEvidence(
        tx,
        ctx,
        { plantId, designId, number: saved.currentRevision, plantRevisionId, recipe, note },
        evidence,
      );
    }
    return saved;
  });
}
