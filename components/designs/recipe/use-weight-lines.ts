"use client";

import { useEffect, useState } from "react";
import type { Recipe } from "@/control/design/recipe";
import type { PlantModel } from "@/control/plant/model";
import { useLiveWorker } from "../live/use-live-worker";
import { weightLines } from "./weight-words";

/** Only once the hand rests: each weight costs a prediction of its own. */
const REST_MS = 300;
const NONE: ReadonlyMap<string, string> = new Map();

/** What doubling each weight is predicted to change, worked out beside the solving of the recipe itself. */
export function useWeightLines(recipe: Recipe | null, model: PlantModel): ReadonlyMap<string, string> {
  const worker = useLiveWorker();
  const [lines, setLines] = useState(NONE);
  useEffect(() => {
    if (recipe?.method !== "weights") {
      setLines(NONE);
      return;
    }
    let left = false;
    const timer = window.setTimeout(async () => {
      const outcome = await worker.run({ kind: "effects", model, recipe });
      if (left || outcome.kind === "dropped") return;
      const found = outcome.kind === "done" && outcome.value.state === "computed" ? outcome.value.value : null;
      setLines(found ? weightLines(found, model.inputs) : NONE);
    }, REST_MS);
    return () => {
      left = true;
      window.clearTimeout(timer);
    };
  }, [recipe, model, worker]);
  return lines;
}
