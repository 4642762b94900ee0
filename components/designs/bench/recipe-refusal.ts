import type { RecipeProblem } from "@/control/design/recipe-problems";
import { RequestProblem } from "@/lib/client/request";
import { IN_BODY } from "../recipe/recipe-fields";

/** A recipe that cannot be sent yet is refused like one that the service refused: same list, same fields. */
export function recipeRefusal(problems: readonly RecipeProblem[]): RequestProblem {
  return new RequestProblem({
    code: "invalid",
    status: 422,
    title: "Some values cannot be taken",
    detail: "Correct the places listed; everything else can stay.",
    errors: problems.map(({ pointer, message }) => ({ pointer: IN_BODY + pointer, detail: message })),
  });
}

/** The service's own refusals of a computation: it was understood, and an assumption does not hold. */
export const isUnsolvable = ({ status, code, issues }: RequestProblem) =>
  status === 422 && issues.length === 0 && code !== "invalid" && code !== "time-limit";

export const isAbort = (error: unknown) => error instanceof DOMException && error.name === "AbortError";
