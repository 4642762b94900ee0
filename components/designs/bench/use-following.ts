"use client";

import { useEffect, useRef } from "react";
import type { Recipe } from "@/control/design/recipe";
import { recipeKey } from "../recipe/read-form";
import type { Ground } from "./bench-types";

type Following = Readonly<{
  /** Null while it cannot be solved as it stands. */
  recipe: Recipe | null;
  ground: Ground;
  /** Whether what is shown was solved from something else. */
  behind: boolean;
  active: boolean;
  follow: (recipe: Recipe, ground: Ground) => void;
}>;

/** Every recipe that can be solved is solved as it is written; what was asked for already is not asked for again. */
export function useFollowing({ recipe, ground, behind, active, follow }: Following): void {
  const asked = useRef<string | null>(null);
  useEffect(() => {
    if (!active || !behind || !recipe) return;
    const key = `${ground.plantRevision.id} ${recipeKey(recipe)}`;
    if (asked.current === key) return;
    asked.current = key;
    follow(recipe, ground);
  }, [recipe, ground, behind, active, follow]);
  // Shown as it stands: the same recipe, written again later, is asked for again.
  useEffect(() => {
    if (!behind) asked.current = null;
  }, [behind]);
}
