import type { RecipeProblem } from "@/control/design/recipe-problems";
import type { RefusedInWords } from "@/control/words/evidence-in-words";
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

/** A core that finds no gains is refused alike here and on the server. */
export function refusedGains({ code, data, title, sentence, nextStep }: RefusedInWords): RequestProblem {
  return new RequestProblem({ code, status: 422, title, detail: `${sentence} ${nextStep}`, data });
}

export function tookTooLong(): RequestProblem {
  const detail = "The recipe was given up after half a minute. Try fewer states, or widen the weights.";
  return new RequestProblem({ code: "time-limit", status: 422, title: "Took too long", detail });
}

/** The service's own refusals of a computation: it was understood, and an assumption does not hold. */
export const isUnsolvable = ({ status, code, issues }: RequestProblem) =>
  status === 422 && issues.length === 0 && code !== "invalid" && code !== "time-limit";

export const isAbort = (error: unknown) => error instanceof DOMException && error.name === "AbortError";
