import type { DesignRevision } from "@/lib/schemas/design";
import { computed } from "../designs/evidence/figures-reply";
import { OBSERVER_WORDS } from "../designs/recipe/recipe-words";

/** What a design estimates its states with: decides which matrices it has, and how large they are. */
export type ObserverFacts = { readonly words: string; readonly order: number | null };

export function observerFacts({ evidence, recipe, model }: DesignRevision): ObserverFacts {
  const observer = computed(evidence.observer);
  if (evidence.observer.state === "refused") return { words: "an observer that was refused", order: null };
  if (!observer) return { words: "no observer", order: null };
  if (observer.kind === "reduced") return { words: `an observer of reduced order ${observer.order}`, order: observer.order };
  return {
    words: `an observer of full order ${model.states.length}, ${OBSERVER_WORDS[recipe.observer.kind]}`,
    order: model.states.length,
  };
}

type Named = { readonly label: string; readonly observer: ObserverFacts };

/** Said where designs estimate differently, so that a matrix that only some have is no surprise. Null where all are alike. */
export function observersDiffer(designs: readonly Named[]): string | null {
  if (new Set(designs.map(({ observer }) => observer.words)).size < 2) return null;
  const each = designs.map(({ label, observer }) => `${label} has ${observer.words}`);
  return `The observers differ: ${each.join("; ")}.`;
}
