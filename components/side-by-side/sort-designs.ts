import { joinNames } from "@/control/words/join-names";
import { type Fact, shownSizes } from "./compared-rows";

export type Order = "least" | "most";
export type Sorting = { readonly key: string; readonly order: Order };

const factBy = (facts: readonly Fact[], key: string) => facts.find(({ sort }) => sort?.key === key);

/**
 * Places of the designs, put in order by one figure; what has no such figure stands last, and what reads alike keeps the order
 * it was asked for in. Null where nothing is known by that name.
 */
export function sortedPlaces(facts: readonly (readonly Fact[])[], { key, order }: Sorting): number[] | null {
  const found = facts.map((own) => factBy(own, key));
  if (found.every((fact) => fact === undefined)) return null;
  const sizes = shownSizes(found);
  const sign = order === "least" ? 1 : -1;
  const compare = (a: number, b: number) => {
    const [one, other] = [sizes[a], sizes[b]];
    if (one === undefined || other === undefined) return Number(one === undefined) - Number(other === undefined);
    return sign * (one - other);
  };
  return facts.map((_, place) => place).sort((a, b) => compare(a, b) || a - b);
}

/** What is said of an order, for people who do not see it. `labels` and `facts` in the order shown. */
export function sortingWords(
  labels: readonly string[],
  facts: readonly (readonly Fact[])[],
  { key, order }: Sorting,
): string | null {
  const found = facts.map((own) => factBy(own, key));
  const words = found.find((fact) => fact !== undefined)?.sort?.words;
  if (words === undefined) return null;
  const without = labels.filter((_, k) => found[k] === undefined);
  const having = labels.filter((_, k) => found[k] !== undefined);
  const rest =
    without.length === 0
      ? ""
      : `; ${joinNames(without)} ${without.length === 1 ? "has" : "have"} no such figure and ${without.length === 1 ? "stands" : "stand"} last`;
  return `Sorted by ${words}, ${order} first: ${having.join(", ")}${rest}.`;
}

/** Pressed again, an order turns round and then goes back to the one that the designs were chosen in. */
export function nextSorting(now: Sorting | null, key: string): Sorting | null {
  if (now?.key !== key) return { key, order: "least" };
  return now.order === "least" ? { key, order: "most" } : null;
}
