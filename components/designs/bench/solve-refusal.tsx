"use client";

import { useEffect, useState } from "react";
import type { NumericalErrorCode } from "@/control/errors";
import type { PlantModel } from "@/control/plant/model";
import type { RefusalWords } from "@/control/words/refusals/types";
import type { RequestProblem } from "@/lib/client/request";
import { Notice } from "../../ui/notice";

type SolveRefusalProps = Readonly<{
  problem: RequestProblem;
  model: PlantModel;
  /** Buttons below the words. */
  action?: React.ReactNode;
}>;

/** Which assumption failed, in this plant's signal names, and one change to try. The words are fetched when they are needed. */
export function SolveRefusal({ problem, model, action }: SolveRefusalProps) {
  const [words, setWords] = useState<RefusalWords | null>(null);
  useEffect(() => {
    let left = false;
    void import("@/control/words/explain-refusal").then(({ explainRefusal }) => {
      if (!left) setWords(explainRefusal(problem.code as NumericalErrorCode, problem.data, model));
    });
    return () => {
      left = true;
    };
  }, [problem, model]);
  return (
    <Notice kind="unmet" role="alert" title={`${words?.title ?? problem.title}.`} action={action}>
      {words ? (
        <>
          {words.sentence} <span className="font-semibold">What to try:</span> {words.nextStep}
        </>
      ) : (
        problem.message
      )}
    </Notice>
  );
}
