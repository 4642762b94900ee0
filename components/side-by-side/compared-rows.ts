import type { Measured } from "../designs/measured";
import type { StateKind } from "../ui/state-mark";

/** One thing said of one design. Facts of several designs with the same section and key are about the same thing. */
export type Fact = {
  readonly section: string;
  readonly key: string;
  readonly label: string;
  readonly text: string;
  /** Decides whether two facts differ, and is given in full on hover. */
  readonly exact: string;
  readonly axis?: number | null;
  /** To be read across; the rest are figures. */
  readonly prose?: boolean;
  readonly note?: string;
  readonly mark?: { readonly kind: StateKind; readonly word: string };
  /** Where less is better: what best and worst are judged by. */
  readonly size?: number;
  /** Where the designs can be put in order by it: its name in an address, and in words. */
  readonly sort?: { readonly key: string; readonly words: string };
  /** The same as numbers: what a file holds. */
  readonly data?: readonly Measured[];
};

export type Verdict = "best" | "best, shared" | "worst" | "worst, shared";

export type ComparedCell = Pick<Fact, "text" | "exact" | "note" | "mark"> & {
  readonly differs: boolean;
  readonly verdict: Verdict | null;
};

export type ComparedRow = Pick<Fact, "key" | "label" | "axis" | "prose" | "sort"> & {
  /** One per design; null where the design says nothing about it. */
  readonly cells: readonly (ComparedCell | null)[];
  /** Whether each cell differs from the first; also where one of the two is empty. */
  readonly differs: readonly boolean[];
  readonly equal: boolean;
};

export type ComparedSection = { readonly title: string; readonly rows: readonly ComparedRow[] };

/** One order that keeps the order of every list as far as they agree: what only a later list has stands behind its neighbour there. */
export function mergeOrder(lists: readonly (readonly string[])[]): string[] {
  const merged: string[] = [];
  const known = new Set<string>();
  for (const list of lists) {
    let place = -1;
    for (const key of list) {
      // Lists mostly agree: looking at the neighbour first keeps thousands of gain entries from being searched for.
      if (!known.has(key)) merged.splice(++place, 0, key);
      else place = merged[place + 1] === key ? place + 1 : merged.indexOf(key);
      known.add(key);
    }
  }
  return merged;
}

const SHOWN_DIGITS = 4;
const asShown = (size: number) => Number(size.toPrecision(SHOWN_DIGITS));

/** The least is best and the largest worst, as far as they can be told apart in the digits shown; ties are said. */
export function verdicts(sizes: readonly (number | undefined)[]): (Verdict | null)[] {
  const shown = sizes.map((size) => (size === undefined ? undefined : asShown(size)));
  const known = shown.filter((size) => size !== undefined);
  const [least, most] = [Math.min(...known), Math.max(...known)];
  if (known.length < 2 || least === most) return sizes.map(() => null);
  const word = (name: "best" | "worst", end: number): Verdict =>
    known.filter((size) => size === end).length > 1 ? `${name}, shared` : name;
  return shown.map((size) => (size === least ? word("best", least) : size === most ? word("worst", most) : null));
}

/** One size per fact, in the digits shown: facts that read alike are of one size. */
export function shownSizes(facts: readonly (Fact | undefined)[]): (number | undefined)[] {
  const alike = (fact: Fact) => facts.find((other) => other?.text === fact.text && other.note === fact.note) ?? fact;
  return facts.map((fact) => {
    const size = fact && alike(fact).size;
    return size === undefined ? undefined : asShown(size);
  });
}

const LATER = "differs beyond the figures shown";

function comparedRow(facts: readonly (Fact | undefined)[]): ComparedRow {
  const first = facts[0];
  const named = facts.find((fact) => fact !== undefined) as Fact;
  const differs = facts.map((fact) => fact?.exact !== first?.exact);
  const judged = verdicts(shownSizes(facts));
  const cells = facts.map((fact, k): ComparedCell | null => {
    if (!fact) return null;
    const hidden = differs[k] && fact.text === first?.text && fact.note === first?.note;
    const note = hidden ? LATER : fact.note;
    return { text: fact.text, exact: fact.exact, note, mark: fact.mark, differs: differs[k], verdict: judged[k] };
  });
  const { key, label, axis, prose, sort } = named;
  return { key, label, axis, prose, sort, cells, differs, equal: !differs.includes(true) };
}

/**
 * Facts of several designs, one list each, as rows that stand side by side. `places` puts the columns in another order; the rows
 * stay where they are.
 */
export function alignFacts(designs: readonly (readonly Fact[])[], places = designs.map((_, place) => place)): ComparedSection[] {
  const sections = mergeOrder(designs.map((facts) => [...new Set(facts.map(({ section }) => section))]));
  return sections.map((title) => {
    const own = designs.map((facts) => new Map(facts.filter(({ section }) => section === title).map((fact) => [fact.key, fact])));
    const keys = mergeOrder(own.map((facts) => [...facts.keys()]));
    return { title, rows: keys.map((key) => comparedRow(places.map((place) => own[place].get(key)))) };
  });
}

/** Without the rows that say the same of every design, and how many those are. */
export function withoutEqual(sections: readonly ComparedSection[]): { sections: ComparedSection[]; hidden: number } {
  const kept = sections.map(({ title, rows }) => ({ title, rows: rows.filter(({ equal }) => !equal) }));
  const count = (list: readonly ComparedSection[]) => list.reduce((sum, { rows }) => sum + rows.length, 0);
  return { sections: kept.filter(({ rows }) => rows.length > 0), hidden: count(sections) - count(kept) };
}
