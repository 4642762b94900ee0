import type { RecipeProblem } from "@/control/design/recipe-problems";
import type { RequestProblem } from "@/lib/client/request";
import { cellKey } from "../../matrix/matrix-head";
import type { FormReading } from "../recipe/read-form";
import { IN_BODY } from "../recipe/recipe-fields";

/**
 * What is wrong where, once a try was refused. What the page can judge itself follows the typing, so that a mended field is quiet
 * at once; what only the server knows stays until the next try.
 */
export function shownProblems(refusal: RequestProblem | null, reading: FormReading): readonly RecipeProblem[] {
  if (refusal?.code !== "invalid") return [];
  if (reading.problems.length > 0 || refusal.requestId === null) return reading.problems;
  return refusal.issues.map(({ pointer, detail }) => ({ pointer: pointer.slice(IN_BODY.length), message: detail }));
}

/** At a place of the recipe or below it. */
export const problemAt = (problems: readonly RecipeProblem[], at: string): string | undefined =>
  problems.flatMap(({ pointer, message }) => (pointer === at || pointer.startsWith(`${at}/`) ? [message] : [])).join(" ") ||
  undefined;

/** In the cells of a matrix of the recipe, keyed "r,c". */
export function cellProblems(problems: readonly RecipeProblem[], matrix: string): ReadonlyMap<string, string> {
  return new Map(
    problems.flatMap(({ pointer, message }) => {
      if (!pointer.startsWith(`${matrix}/`)) return [];
      const [r, c] = pointer.slice(matrix.length + 1).split("/");
      return c === undefined ? [] : [[cellKey(Number(r), Number(c)), message] as const];
    }),
  );
}
