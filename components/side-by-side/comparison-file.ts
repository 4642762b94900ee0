import type { DesignRevision } from "@/lib/schemas/design";
import type { GainMatrix } from "../designs/gains/gain-matrices";
import { gainUnit } from "../designs/unit-text";
import { type ComparedDesign, compareDesigns, factsOf } from "./compare-designs";
import { type Fact, mergeOrder, shownSizes, type Verdict, verdicts } from "./compared-rows";
import { tradeWords } from "./trade-words";

type Cell = string | number | null;
/** One line of the file: a cell per design. `figure` is "" where the line is the whole of its item. */
export type ComparedLine = {
  readonly section: string;
  readonly item: string;
  readonly figure: string;
  readonly unit: string;
  readonly cells: readonly Cell[];
  /** The designs that are, where the line is one that designs are judged by. */
  readonly best?: string;
  readonly worst?: string;
};

export type ComparisonSource = {
  readonly plantName: string;
  readonly labels: readonly string[];
  readonly lines: readonly ComparedLine[];
};

type OwnLine = Omit<ComparedLine, "cells"> & { readonly cell: Cell };
const aboutOf = ({ section, item, figure }: OwnLine) => JSON.stringify([section, item, figure]);
const keyOf = (line: OwnLine) => `${aboutOf(line)} ${line.unit}`;

/** A word in place of a number, such as "not weighted", stands in the line of the numbers. */
function besideNumbers(designs: readonly (readonly OwnLine[])[]): OwnLine[][] {
  const measured = designs.flatMap((lines) => lines.filter(({ unit }) => unit !== ""));
  const units = new Map(measured.map((line) => [aboutOf(line), line.unit]));
  return designs.map((lines) => lines.map((line) => (line.unit ? line : { ...line, unit: units.get(aboutOf(line)) ?? "" })));
}

/** Lines of several designs about the same thing, in the same unit, as one. */
function aligned(designs: readonly (readonly OwnLine[])[]): ComparedLine[] {
  const own = besideNumbers(designs).map((lines) => new Map(lines.map((line) => [keyOf(line), line])));
  const keys = mergeOrder(own.map((lines) => [...lines.keys()]));
  const sections = mergeOrder(designs.map((lines) => [...new Set(lines.map(({ section }) => section))]));
  const rows = keys.map((key): ComparedLine => {
    const found = own.map((lines) => lines.get(key));
    const { cell: _, ...named } = found.find((line) => line !== undefined) as OwnLine;
    return { ...named, cells: found.map((line) => line?.cell ?? null) };
  });
  return sections.flatMap((section) => rows.filter((row) => row.section === section));
}

type Judged = { readonly best?: string; readonly worst?: string };

/** Who is best and worst by each figure, in the words of the page. */
function judgements(facts: readonly (readonly Fact[])[], labels: readonly string[]): Map<string, Judged> {
  const keys = new Set(facts.flatMap((own) => own.flatMap(({ sort }) => sort?.key ?? [])));
  return new Map(
    [...keys].map((key) => {
      const words = verdicts(shownSizes(facts.map((own) => own.find(({ sort }) => sort?.key === key))));
      const named = (end: "best" | "worst") =>
        labels.filter((_, k) => words[k] === end || words[k] === (`${end}, shared` satisfies Verdict)).join("; ");
      return [key, { best: named("best"), worst: named("worst") }];
    }),
  );
}

function linesOf(fact: Fact, judged: Judged | undefined): OwnLine[] {
  const { section, label: item, text, note, mark, data = [] } = fact;
  const words = `${mark?.word ?? ""}${[text, ...(note ? [note] : [])].join(", ")}`;
  if (data.length === 0) return [{ section, item, figure: "", unit: "", cell: words }];
  const numbers = data.map(({ what, unit, value }, index): OwnLine => {
    return { section, item, figure: what, unit, cell: value, ...(index === 0 && judged) };
  });
  return note || mark ? [...numbers, { section, item, figure: "in words", unit: "", cell: words }] : numbers;
}

/** Each entry on a line of its own, named by its signals, so that designs stand beside each other whatever their order. */
function entriesOf({ symbol, meaning, rows, columns, values }: GainMatrix): OwnLine[] {
  const section = `${symbol}, ${meaning}`;
  return rows.flatMap((row, r) =>
    columns.map((column, c): OwnLine => {
      const own = row.unit === undefined || column.unit === undefined;
      const unit = own ? "in the observer's own coordinates" : gainUnit(row.unit, column.unit);
      return { section, item: row.label, figure: `for ${column.label}`, unit, cell: values[r][c] };
    }),
  );
}

function head({ methodVersion }: DesignRevision["evidence"], design: ComparedDesign): OwnLine[] {
  const section = "Design";
  const line = (item: string, cell: Cell): OwnLine => ({ section, item, figure: "", unit: "", cell });
  const { name, number, plantRevision, outdated, gains, observer } = design;
  return [
    line("design", name),
    line("revision", number),
    line("plant revision", plantRevision),
    line("up to date", outdated ? "outdated: the plant has a newer revision" : "on the newest plant revision"),
    line("control law", gains.law),
    line("observer", observer.words),
    ...(gains.observerLaw ? [line("observer law", gains.observerLaw)] : []),
    line("time base", gains.timeBase),
    line("numerical methods, version", methodVersion),
  ];
}

function tradeLines(designs: readonly ComparedDesign[]): ComparedLine[] {
  const [first, ...others] = designs.map(({ trade }) => trade);
  const cells = ["what the others are held against", ...others.map((side) => tradeWords(first, side))];
  return [{ section: "What each trade bought", item: "against the first", figure: "", unit: "", cells }];
}

/** The whole comparison as lines of a file. The revisions are of one plant and have at least two designs among them. */
export function comparisonSource(revisions: readonly DesignRevision[]): ComparisonSource {
  const { designs } = compareDesigns(revisions);
  const labels = designs.map(({ label }) => label);
  const facts = factsOf(revisions);
  const judged = judgements(facts, labels);
  const lines = designs.map((design, k) => [
    ...head(revisions[k].evidence, design),
    ...facts[k].flatMap((fact) => linesOf(fact, fact.sort && judged.get(fact.sort.key))),
    ...design.gains.matrices.flatMap(entriesOf),
  ]);
  return { plantName: revisions[0]?.plantName ?? "", labels, lines: [...aligned(lines), ...tradeLines(designs)] };
}
