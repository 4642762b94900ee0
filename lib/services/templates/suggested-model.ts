import "server-only";
import type { PlantModel } from "@/control/plant/model";
import { allow } from "@/lib/permissions/allow";
import type { Template } from "@/lib/schemas/template";
import type { Context } from "../context";
import { evaluateOrRefuse } from "../plants/evaluate-or-refuse";
import { fillIn } from "./fill-in";

/** The template's plant at its suggested values: what its page shows of it. */
export function suggestedModel(ctx: Context, { content }: Template, signal?: AbortSignal): Promise<PlantModel> {
  allow(ctx, "template:read");
  return evaluateOrRefuse(ctx, fillIn(content, {}).content, { signal });
}
