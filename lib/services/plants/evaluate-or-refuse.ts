import "server-only";
import { parsePlainNumber } from "@/control/expression/plain-number";
import { MATRIX_NAMES } from "@/control/plant/content-shape";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import type { PlantModel } from "@/control/plant/model";
import type { PlantProblem } from "@/control/plant/plant-problem";
import { DomainError, type Issue } from "@/lib/errors";
import type { PlantVerdict } from "@/lib/jobs/numeric-job";
import { runNumeric } from "@/lib/jobs/run-numeric";
import type { PlantContent } from "@/lib/schemas/plant";
import type { Context } from "../context";

/**
 * So many characters of expressions take 20 ms here; more of them are evaluated by a numeric thread. A body that brings so many
 * takes its turn like a computation, see `inTurnAbove` of a route.
 */
export const EXPRESSIONS_HERE = 40_000;
const MOST_ISSUES = 50;

export type Evaluate = {
  /** How a problem is told to whoever sent the body; without it the content stands at `/content`. */
  readonly toIssue?: (problem: PlantProblem) => Issue;
  readonly signal?: AbortSignal | undefined;
};

/** The content stands at this place of the body, so that each problem points at its own field. */
export const issueBelow =
  (place: string) =>
  ({ pointer, message }: PlantProblem): Issue => ({ pointer: place + pointer, detail: message });

/**
 * The doubles of a plant as typed.
 *
 * @throws DomainError invalid, with one issue for each field in error, at most fifty; busy
 */
export async function evaluateOrRefuse(ctx: Context, content: PlantContent, how: Evaluate = {}): Promise<PlantModel> {
  const { toIssue = issueBelow("/content"), signal } = how;
  const { model, problems } = await evaluate(ctx, content, signal);
  if (model) return model;
  const errors = problems.filter(({ severity }) => severity === "error").slice(0, MOST_ISSUES);
  throw new DomainError("invalid", "The plant cannot be evaluated yet: some entries need a change", {}, errors.map(toIssue));
}

async function evaluate({ teamId }: Context, content: PlantContent, signal?: AbortSignal): Promise<PlantVerdict> {
  if (expressionLength(content) <= EXPRESSIONS_HERE) return evaluatePlant(content);
  return runNumeric({ kind: "evaluation", content }, { teamId, signal });
}

/** Plain numbers cost next to nothing, however many digits they have. */
function expressionLength(content: PlantContent): number {
  const entries = MATRIX_NAMES.flatMap((name) => content[name] ?? []).flat();
  const texts = [...entries, ...content.parameters.map(({ expression }) => expression)];
  return texts.reduce((length, text) => length + (parsePlainNumber(text) === null ? text.length : 0), 0);
}
