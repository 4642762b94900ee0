import type { Rows } from "@/control/plant/model";
import { formatNumber } from "@/control/words/format-number";
import type { GainMatrix } from "../designs/gains/gain-matrices";
import type { Header } from "../matrix/header";
import type { ObserverFacts } from "./observer-words";

const same = (a: Header, b: Header) => a.label === b.label && (a.unit ?? "") === (b.unit ?? "");
const placesIn = (headers: readonly Header[], wanted: readonly Header[]) =>
  wanted.map((header) => headers.findIndex((other) => same(other, header)));

export type GainDifference = {
  readonly matrix: GainMatrix;
  /** Signals that only one of the two has: nothing can be said about them. */
  readonly left: readonly string[];
};

/** A matrix minus another, signal by signal: rows and columns are matched by name and unit, not by place. */
export function gainDifference(matrix: GainMatrix, first: GainMatrix): GainDifference {
  const [down, across] = [placesIn(first.rows, matrix.rows), placesIn(first.columns, matrix.columns)];
  const known = <T>(list: readonly T[], places: readonly number[]) => list.filter((_, index) => places[index] >= 0);
  const values: Rows = known(
    matrix.values.map((row, r) =>
      known(
        row.map((value, c) => value - (first.values[down[r]]?.[across[c]] ?? 0)),
        across,
      ),
    ),
    down,
  );
  const missing = (from: readonly Header[], to: readonly Header[]) =>
    from.filter((header) => !to.some((other) => same(header, other))).map(({ label }) => label);
  const pairs = [
    [matrix.rows, first.rows],
    [matrix.columns, first.columns],
  ];
  const left = new Set(pairs.flatMap(([mine, theirs]) => [...missing(mine, theirs), ...missing(theirs, mine)]));
  return {
    matrix: { ...matrix, rows: known(matrix.rows, down), columns: known(matrix.columns, across), values },
    left: [...left],
  };
}

/** Whether an entry reads differently from the first design's, signal matched to signal. */
export function differsFrom(matrix: GainMatrix, first: GainMatrix): (r: number, c: number) => boolean {
  const [down, across] = [placesIn(first.rows, matrix.rows), placesIn(first.columns, matrix.columns)];
  return (r, c) => {
    const other = first.values[down[r]]?.[across[c]];
    return other === undefined || formatNumber(other) !== formatNumber(matrix.values[r][c]);
  };
}

type Owner = { readonly label: string; readonly observer: ObserverFacts; readonly plantRevision: number };

/** Matrices that only an observer has. */
const ofObserver = (symbol: string) => symbol !== "K" && symbol !== "F";

/** Why a design has no such matrix. */
export function absentWords(symbol: string, { label, observer }: Owner): string {
  return ofObserver(symbol) ? `${label} has no ${symbol}: it has ${observer.words}.` : `${label} has no ${symbol}.`;
}

const inOwnCoordinates = ({ rows, columns }: GainMatrix) => [...rows, ...columns].some(({ unit }) => unit === undefined);

/** Why a matrix cannot be taken from that of the first design, or null where it can. */
export function noDifference(matrix: GainMatrix, first: GainMatrix | undefined, own: Owner, base: Owner): string | null {
  const { symbol } = matrix;
  if (!first) return `${absentWords(symbol, base)} That of ${own.label} has nothing to be held against.`;
  if (!inOwnCoordinates(matrix)) return null;
  const both = `${symbol} of ${own.label} and of ${base.label}`;
  if (own.observer.order !== base.observer.order) {
    return `No difference of ${both}: ${own.label} has ${own.observer.words}, ${base.label} ${base.observer.words}, each in coordinates of its own.`;
  }
  if (own.plantRevision !== base.plantRevision) {
    return `No difference of ${both}: they stand on different revisions of the plant, each in coordinates of its own.`;
  }
  return null;
}
