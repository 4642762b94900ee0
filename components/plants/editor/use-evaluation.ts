"use client";

import { useDeferredValue, useEffect, useMemo, useState } from "react";
import type { evaluatePlant, PlantEvaluation } from "@/control/plant/evaluate-plant";
import type { PlantContent } from "@/lib/schemas/plant";

type Evaluate = typeof evaluatePlant;

/** The formula parser is most of this page's weight, so it arrives once the page can be used. */
export function useEvaluation(content: PlantContent): PlantEvaluation | null {
  const [evaluate, setEvaluate] = useState<Evaluate | null>(null);
  const latest = useDeferredValue(content);
  useEffect(() => {
    let here = true;
    import("@/control/plant/evaluate-plant").then((module) => here && setEvaluate(() => module.evaluatePlant));
    return () => {
      here = false;
    };
  }, []);
  return useMemo(() => (evaluate ? evaluate(latest) : null), [evaluate, latest]);
}

/** What is wrong at the cells of a matrix, for its grid. */
export function cellProblems(evaluation: PlantEvaluation | null, name: string): ReadonlyMap<string, string> {
  const found = new Map<string, string>();
  for (const { pointer, message } of evaluation?.problems ?? []) {
    const [, matrix, row, column] = pointer.split("/");
    if (matrix === name && row !== undefined && column !== undefined) found.set(`${row},${column}`, message);
  }
  return found;
}

export function fieldProblem(evaluation: PlantEvaluation | null, pointer: string): string | undefined {
  return evaluation?.problems.find((problem) => problem.pointer === pointer)?.message;
}
