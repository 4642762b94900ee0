"use client";

import { useState } from "react";
import type { Recipe } from "@/control/design/recipe";
import type { PlantModel } from "@/control/plant/model";
import { useLiveWorker } from "../live/use-live-worker";
import { readForm } from "../recipe/read-form";
import type { RecipeForm } from "../recipe/recipe-form";
import { SWEEP_FACTORS, type Swept, sweptForm } from "./sweep-form";
import { type TradePoint, tradePoints } from "./trade-points";

export type SweepState =
  | { readonly kind: "idle" }
  | { readonly kind: "running"; readonly done: number; readonly of: number }
  | { readonly kind: "done"; readonly forms: readonly RecipeForm[]; readonly points: readonly TradePoint[] }
  | { readonly kind: "failed"; readonly why: string };

/** Figures of the recipe with one thing turned, worked out by a worker of its own with progress and a stop. */
export function useSweep(model: PlantModel) {
  const worker = useLiveWorker();
  const [state, setState] = useState<SweepState>({ kind: "idle" });

  const start = async (form: RecipeForm, swept: Swept) => {
    const variants = SWEEP_FACTORS.flatMap((factor) => {
      const turned = sweptForm(form, swept, factor);
      const { recipe } = readForm(turned, model);
      return recipe ? [{ factor, form: turned, recipe }] : [];
    });
    if (variants.length === 0) return setState({ kind: "failed", why: "The recipe is not complete yet." });
    const recipes: Recipe[] = variants.map(({ recipe }) => recipe);
    setState({ kind: "running", done: 0, of: recipes.length });
    const outcome = await worker.run({ kind: "figures", model, recipes }, (done) =>
      setState({ kind: "running", done, of: recipes.length }),
    );
    if (outcome.kind === "dropped") return;
    if (outcome.kind !== "done") return setState({ kind: "failed", why: failure(outcome.kind) });
    const factors = variants.map(({ factor }) => factor);
    const points = tradePoints(outcome.value, factors, model);
    if (points.length === 0)
      return setState({ kind: "failed", why: "None of these recipes settles: there are no steps to judge by." });
    setState({ kind: "done", forms: variants.map(({ form: turned }) => turned), points });
  };
  const stop = () => {
    worker.stop();
    setState({ kind: "idle" });
  };
  return { state, start, stop };
}

const failure = (kind: "too-long" | "broken") =>
  kind === "too-long"
    ? "The sweep was given up after half a minute."
    : "This browser does not work in the background, which a sweep needs.";
