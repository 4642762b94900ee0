import "server-only";
import type { Evidence } from "@/control/design/evidence";
import type { Recipe } from "@/control/design/recipe";
import { recipeProblems } from "@/control/design/recipe-problems";
import type { PlantModel } from "@/control/plant/model";
import { inWords } from "@/control/words/evidence-in-words";
import { DomainError } from "@/lib/errors";
import { runNumeric } from "@/lib/jobs/run-numeric";
import type { Context } from "../context";

export type Solve = {
  /** JSON pointer of the recipe in the body that was sent; without it `/recipe`. */
  readonly at?: string;
  readonly signal?: AbortSignal | undefined;
};

/** @throws DomainError invalid, where the recipe does not fit the plant, with a pointer below `at` for each field */
function requireFittingRecipe(recipe: Recipe, model: PlantModel, at: string): void {
  const issues = recipeProblems(recipe, model).map(({ pointer, message }) => ({ pointer: at + pointer, detail: message }));
  if (issues.length > 0) throw new DomainError("invalid", "The recipe does not fit this plant", {}, issues);
}

/**
 * Evidence whose gains stand. A design without gains is not stored: its refusal is the answer.
 *
 * @throws DomainError unsolvable, in the plant's own signal names; invalid; busy
 */
export async function solveOrRefuse(ctx: Context, model: PlantModel, recipe: Recipe, how: Solve = {}): Promise<Evidence> {
  const { at = "/recipe", signal } = how;
  requireFittingRecipe(recipe, model, at);
  const evidence = await runNumeric({ kind: "design", model, recipe }, { teamId: ctx.teamId, signal });
  if (evidence.gains.state === "refused") {
    const { code, data, title, sentence, nextStep } = inWords(evidence.gains, model);
    throw new DomainError("unsolvable", `${sentence} ${nextStep}`, { code, data, title });
  }
  return evidence;
}
