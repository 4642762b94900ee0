import "server-only";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import type { PlantModel } from "@/control/plant/model";
import { DomainError } from "@/lib/errors";
import type { PlantContent } from "@/lib/schemas/plant";

/**
 * The doubles of a plant as typed.
 *
 * @param at JSON pointer of the content in the body that was sent, so that each problem points at its own field
 * @throws DomainError invalid, with one issue for each field in error
 */
export function evaluateOrRefuse(content: PlantContent, at = "/content"): PlantModel {
  const { model, problems } = evaluatePlant(content);
  if (model) return model;
  const issues = problems
    .filter(({ severity }) => severity === "error")
    .map(({ pointer, message }) => ({ pointer: at + pointer, detail: message }));
  throw new DomainError("invalid", "The plant cannot be evaluated yet: some entries need a change", {}, issues);
}
