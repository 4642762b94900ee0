"use client";

import { useRef, useState } from "react";
import { compute } from "@/lib/client/designs";
import { useSession } from "../../providers/session-provider";
import { useSubmit } from "../../ui/use-submit";
import type { FormReading } from "../recipe/read-form";
import { asSolved, type Ground, type Solved } from "./bench-types";
import { isAbort, recipeRefusal } from "./recipe-refusal";

/** Solves a recipe on demand, without storing. The newest request wins; a running one can be stopped. */
export function useSolving(fields: Readonly<Record<string, string>>, start: Solved | null) {
  const { resume } = useSession();
  const submit = useSubmit(fields);
  const [solved, setSolved] = useState(start);
  const running = useRef<AbortController | null>(null);

  const solve = (reading: FormReading, ground: Ground) => {
    running.current?.abort();
    const stop = new AbortController();
    running.current = stop;
    return submit.run(async () => {
      const { recipe, problems } = reading;
      if (!recipe) throw recipeRefusal(problems);
      const body = { plant: { revisionId: ground.plantRevision.id }, recipe: recipe as Parameters<typeof compute>[0]["recipe"] };
      try {
        const reply = await resume(() => compute(body, stop.signal));
        if (!stop.signal.aborted) setSolved(asSolved(ground, recipe, reply));
      } catch (error) {
        if (!isAbort(error)) throw error;
      }
    });
  };
  return { ...submit, solved, setSolved, solve, stop: () => running.current?.abort() };
}
