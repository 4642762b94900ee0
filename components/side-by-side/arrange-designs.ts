import type { ComparedDesign, Comparing } from "./compare-designs";
import { alignFacts, type ComparedSection } from "./compared-rows";
import { type Sorting, sortedPlaces, sortingWords } from "./sort-designs";

/** As shown: in the order wanted, row by row. */
export type Arranged = {
  readonly designs: readonly ComparedDesign[];
  readonly sections: readonly ComparedSection[];
  /** Null where the order is the one that was chosen. */
  readonly sorted: string | null;
};

/** Rows that stand side by side, the designs put in order by a figure or as they were chosen. */
export function arrangeDesigns({ designs, facts }: Comparing, sorting: Sorting | null): Arranged {
  const places = sorting && sortedPlaces(facts, sorting);
  if (!places) return { designs, sections: alignFacts(facts), sorted: null };
  const shown = places.map((place) => designs[place]);
  const names = shown.map(({ label }) => label);
  const own = places.map((place) => facts[place]);
  return { designs: shown, sections: alignFacts(facts, places), sorted: sortingWords(names, own, sorting) };
}
