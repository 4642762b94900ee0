"use client";

import { useCallback, useRef, useState } from "react";
import type { Recipe } from "@/control/design/recipe";
import { compute } from "@/lib/client/designs";
import { RequestProblem } from "@/lib/client/request";
import { useSession } from "../../providers/session-provider";
import { useSubmit } from "../../ui/use-submit";
import { useLiveWorker } from "../live/use-live-worker";
import type { FormReading } from "../recipe/read-form";
import { asComputed, asLive, type Ground, type Solved } from "./bench-types";
import { isAbort, recipeRefusal, refusedGains, tookTooLong } from "./recipe-refusal";

/** Work that is done sooner than this is not announced: words that flash by help nobody. */
const ANNOUNCE_AFTER_MS = 150;

/**
 * Solves recipes without storing: in the page's own worker, by the same core as the server; on the server where the browser runs no
 * worker. The newest request wins; a running one can be stopped.
 */
export function useSolving(fields: Readonly<Record<string, string>>, start: Solved | null) {
  const submit = useSubmit(fields);
  const [solved, setSolved] = useState(start);
  const [slow, setSlow] = useState(false);
  const [live, setLive] = useState(true);
  const worker = useLiveWorker();
  const { solveThere, abort } = useServerSolving();
  const { run, clear } = submit;

  /** Null where something newer was asked for. @throws RequestProblem */
  const solveHere = useCallback(
    async (recipe: Recipe, ground: Ground): Promise<Solved | "broken" | null> => {
      const announce = setTimeout(() => setSlow(true), ANNOUNCE_AFTER_MS);
      const outcome = await worker.run({ kind: "design", model: ground.model, recipe });
      clearTimeout(announce);
      if (outcome.kind === "dropped") return null;
      setSlow(false);
      if (outcome.kind === "broken") return "broken";
      if (outcome.kind === "too-long") throw tookTooLong();
      const { gains } = outcome.value.evidence;
      if (gains.state === "refused") throw refusedGains(gains);
      return asLive(ground, recipe, outcome.value);
    },
    [worker],
  );

  const solve = (reading: FormReading, ground: Ground) =>
    run(async () => {
      const { recipe, problems } = reading;
      if (!recipe) throw recipeRefusal(problems);
      const here = await solveHere(recipe, ground);
      if (here === "broken") setLive(false);
      const found = here === "broken" ? await solveThere(recipe, ground) : here;
      if (found) setSolved(found);
    });

  /** Solves while the hand is still on the control: says nothing but the result, or why there is none. */
  const follow = useCallback(
    async (recipe: Recipe, ground: Ground) => {
      try {
        const here = await solveHere(recipe, ground);
        if (here === "broken") setLive(false);
        if (here === null || here === "broken") return;
        setSolved(here);
        clear();
      } catch (error) {
        if (!(error instanceof RequestProblem)) throw error;
        void run(() => Promise.reject(error));
      }
    },
    [solveHere, run, clear],
  );

  const stop = () => {
    worker.stop();
    abort();
    setSlow(false);
  };
  return { ...submit, busy: submit.busy || slow, live, solved, setSolved, solve, follow, stop };
}

function useServerSolving() {
  const { resume } = useSession();
  const running = useRef<AbortController | null>(null);
  const abort = () => running.current?.abort();

  /** Null once it was given up. @throws RequestProblem */
  const solveThere = async (recipe: Recipe, ground: Ground): Promise<Solved | null> => {
    abort();
    const stop = new AbortController();
    running.current = stop;
    try {
      return asComputed(ground, recipe, await resume(() => compute(computeBody(recipe, ground), stop.signal)));
    } catch (error) {
      if (!isAbort(error)) throw error;
      return null;
    }
  };
  return { solveThere, abort };
}

const ALL_ROLES = ["commanded", "output", "state", "estimate", "input"] as const;

const computeBody = (recipe: Recipe, { plantRevision }: Ground): Parameters<typeof compute>[0] => ({
  plant: { revisionId: plantRevision.id },
  recipe: recipe as Parameters<typeof compute>[0]["recipe"],
  signals: [...ALL_ROLES],
});
