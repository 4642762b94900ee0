import "server-only";
import type { Criterion } from "@/control/design/criteria";
import type { PlantModel } from "@/control/plant/model";
import { CAUTIONS } from "@/control/words/cautions";
import { evidenceInWords } from "@/control/words/evidence-in-words";
import { inTransaction } from "@/db/client";
import { findPlantRevision } from "@/db/queries/plant-revisions";
import { NotFound } from "@/lib/errors";
import { allow } from "@/lib/permissions/allow";
import type { Computation, Compute } from "@/lib/schemas/design";
import type { Context } from "../context";
import { solveOrRefuse } from "../designs/solve-or-refuse";
import { toAcceptance } from "../designs/to-acceptance";
import { toCurves } from "../designs/to-curves";
import { evaluateOrRefuse, issueBelow } from "../plants/evaluate-or-refuse";
import { checkModel } from "./check-plant";

type Found = { readonly model: PlantModel; readonly criteria: readonly Criterion[] };

async function plantOf(ctx: Context, plant: Compute["plant"], signal?: AbortSignal): Promise<Found> {
  if ("content" in plant) {
    const model = await evaluateOrRefuse(ctx, plant.content, { toIssue: issueBelow("/plant/content"), signal });
    return { model, criteria: [] };
  }
  const found = await inTransaction(ctx, (tx) => findPlantRevision(tx, { teamId: ctx.teamId, revisionId: plant.revisionId }));
  if (!found) throw new NotFound("Plant revision");
  return found;
}

/** Checks, gains, poles, residuals, responses, verdicts and the cautions of a plant and a recipe. Stores nothing. */
export async function compute(
  ctx: Context,
  { plant, recipe, signals = ["commanded", "output", "input"], criteria }: Compute,
  signal?: AbortSignal,
): Promise<Computation> {
  allow(ctx, "compute:use");
  const { model, criteria: own } = await plantOf(ctx, plant, signal);
  const evidence = await solveOrRefuse(ctx, model, recipe, { signal });
  const records = evidence.responses.state === "computed" ? evidence.responses.value.records : [];
  const shown = evidenceInWords(evidence, model) as Computation["evidence"];
  const judged = { evidence: shown, model };
  return {
    model: model as Computation["model"],
    checks: await checkModel(ctx, model, signal),
    evidence: shown,
    acceptance: criteria ? toAcceptance(criteria, "request", judged) : toAcceptance(own, "plant", judged),
    responses: records.map((record) => toCurves(record, model, signals)),
    cautions: [...CAUTIONS],
  };
}
