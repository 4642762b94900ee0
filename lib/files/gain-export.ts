import { type CsvCell, toCsv } from "./csv";
import { type GainDocument, type GainSource, gainDocument, type NamedMatrix } from "./gain-document";

export type ExportedFile = { readonly name: string; readonly type: string; readonly content: string };

export const GAIN_CSV = "text/csv; charset=utf-8";
export const GAIN_JSON = "application/json";

/** The gain as a spreadsheet shows it: facts, cautions, then each matrix with its signals and units along both edges. */
export function gainAsCsv(source: GainSource): ExportedFile {
  const document = gainDocument(source);
  const records = [...facts(document), [], ...document.matrices.flatMap((matrix) => [...matrixRecords(matrix), []])];
  return { name: fileName(document, "csv"), type: GAIN_CSV, content: toCsv(records) };
}

/** The same as JSON; every number comes back as the same double. */
export function gainAsJson(source: GainSource): ExportedFile {
  const document = gainDocument(source);
  return { name: fileName(document, "json"), type: GAIN_JSON, content: `${JSON.stringify(document, null, 2)}\n` };
}

function facts(document: GainDocument): CsvCell[][] {
  const { plant, design, law, timeBase, timeBaseInWords, method, methodVersion, residual, bound, errorBound } = document;
  return [
    ["plant", plant.name, "revision", plant.revision],
    ["design", design.name, "revision", design.revision],
    ["control law", law],
    ...(document.observerLaw ? [["observer", document.observerLaw]] : []),
    ["time base", timeBaseInWords],
    ...(timeBase.kind === "sampled" ? [["period", timeBase.period, "s"]] : []),
    ["method", method, "version", methodVersion],
    ["residual", residual, "bound", bound],
    ...(errorBound === null ? [] : [["relative error of K, at most", errorBound]]),
    ...document.cautions.map((caution) => ["caution", caution]),
    ...document.operatingPoint.map(({ symbol, name, unit, value }) => ["operating point", symbol, name, value, unit]),
  ];
}

function matrixRecords({ symbol, meaning, rows, columns, entries }: NamedMatrix): CsvCell[][] {
  return [
    [symbol, meaning, ...columns.map(({ name }) => name)],
    ["", "unit", ...columns.map(({ unit }) => unit)],
    ...rows.map(({ name, unit }, index) => [name, unit, ...(entries[index] ?? [])]),
  ];
}

function fileName({ plant, design }: GainDocument, ending: string): string {
  return `${start(plant.name)} ${start(design.name)} r${design.revision} gain.${ending}`;
}

/** Two long names must not push the revision out of the file's name. */
const start = (name: string) => [...name].slice(0, 48).join("").trimEnd();
