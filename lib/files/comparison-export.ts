import { CAUTIONS } from "@/control/words/cautions";
import { type CsvCell, toCsv } from "./csv";
import type { ExportedFile } from "./gain-export";

/** One line about every design: a cell per design, in one unit. */
export type ComparisonLine = {
  readonly section: string;
  readonly item: string;
  readonly figure: string;
  readonly unit: string;
  readonly cells: readonly CsvCell[];
  readonly best?: string;
  readonly worst?: string;
};

export type ComparisonDocument = {
  readonly plantName: string;
  /** The designs in order. */
  readonly labels: readonly string[];
  readonly lines: readonly ComparisonLine[];
};

export const COMPARISON_CSV = "text/csv; charset=utf-8";
const LONGEST_NAME = 80;

/** The comparison as a spreadsheet shows it: one head line, every fact on a line of its own with its unit, then the cautions. */
export function comparisonAsCsv({ plantName, labels, lines }: ComparisonDocument): ExportedFile {
  const records: CsvCell[][] = [
    ["section", "item", "figure", "unit", ...labels, "best", "worst"],
    ["Plant", "plant", "", "", ...labels.map(() => plantName)],
    ...lines.map(({ section, item, figure, unit, cells, best = "", worst = "" }) => [
      ...[section, item, figure, unit],
      ...cells,
      ...[best, worst],
    ]),
    ...CAUTIONS.map((caution) => ["Caution", caution]),
  ];
  const start = [...plantName].slice(0, LONGEST_NAME).join("").trimEnd();
  return { name: `${start} side by side.csv`, type: COMPARISON_CSV, content: toCsv(records) };
}
