import "server-only";
import type { PlantModel } from "@/control/plant/model";
import { runNumeric } from "@/lib/jobs/run-numeric";
import { allow } from "@/lib/permissions/allow";
import type { ChecksReply } from "@/lib/schemas/evidence";
import type { PlantContent } from "@/lib/schemas/plant";
import type { Context } from "../context";
import { evaluateOrRefuse } from "../plants/evaluate-or-refuse";
import { readPlantRevision } from "../plants/read-revision";
import { checksReply } from "./checks-reply";

export async function checkModel(ctx: Context, model: PlantModel, signal?: AbortSignal): Promise<ChecksReply> {
  return checksReply(await runNumeric({ kind: "checks", model }, { teamId: ctx.teamId, signal }), model);
}

/** Checks of a plant that need not be saved. */
export async function checkContent(ctx: Context, content: PlantContent, signal?: AbortSignal): Promise<ChecksReply> {
  allow(ctx, "compute:use");
  return checkModel(ctx, await evaluateOrRefuse(ctx, content, { signal }), signal);
}

export async function checkPlantRevision(
  ctx: Context,
  plantId: string,
  revisionId: string,
  signal?: AbortSignal,
): Promise<ChecksReply> {
  const { model } = await readPlantRevision(ctx, plantId, revisionId);
  return checkModel(ctx, model as PlantModel, signal);
}
