import "server-only";
import { commandedOf, MATRIX_NAMES, matricesOf } from "@/control/plant/content-shape";
import type { TimeBase } from "@/control/plant/model";
import type { PlantContent, PlantDifference } from "@/lib/schemas/plant";

type Change = PlantDifference["changes"][number];
type Value = string | number | null | undefined;
type Entry = Readonly<Record<string, Value>>;
type Named = { readonly name: string };
type Pair<T> = { readonly before: T; readonly after: T };

const LISTS = {
  axes: "axis",
  states: "state",
  inputs: "input",
  outputs: "output",
  disturbances: "disturbance",
  commanded: "commanded quantity",
  parameters: "parameter",
} as const;

const shown = (value: Value): string | null => (value === undefined ? null : value === null ? "none" : String(value));

/** No line where both show the same. */
function changeAt(pointer: string, place: string, before: Value, after: Value): Change[] {
  const [a, b] = [shown(before), shown(after)];
  return a === b ? [] : [{ pointer, place, before: a, after: b }];
}

/** A list as it is told: the axis of a signal by its name, since its number means nothing to a reader. */
function entriesOf(content: PlantContent, list: keyof typeof LISTS): readonly Entry[] {
  if (list === "axes" || list === "parameters") return content[list];
  const signals: readonly (Entry & { readonly axis: number | null })[] =
    list === "commanded" ? commandedOf(content) : content[list];
  return signals.map((signal) => ({ ...signal, axis: signal.axis === null ? null : content.axes[signal.axis]?.name }));
}

function listChanges(list: keyof typeof LISTS, before: readonly Entry[], after: readonly Entry[]): Change[] {
  return Array.from({ length: Math.max(before.length, after.length) }, (_, i) => {
    const [a, b] = [before[i], after[i]];
    if (!a || !b) return changeAt(`/${list}/${i}`, `${LISTS[list]} ${i + 1}`, a?.name, b?.name);
    const fields = [...new Set([...Object.keys(a), ...Object.keys(b)])];
    return fields.flatMap((field) =>
      changeAt(`/${list}/${i}/${field}`, `${LISTS[list]} ${b.name}, ${field}`, a[field], b[field]),
    );
  }).flat();
}

/** The signals of both sides: a row that is gone is still told by the name it had. */
function namesOf({ before, after }: Pair<PlantContent>) {
  const longer = (of: (content: PlantContent) => readonly Named[]) => {
    const [a, b] = [of(before), of(after)];
    return Array.from({ length: Math.max(a.length, b.length) }, (_, i) => (b[i] ?? a[i]).name);
  };
  return {
    states: longer(({ states }) => states),
    inputs: longer(({ inputs }) => inputs),
    outputs: longer(({ outputs }) => outputs),
    disturbances: longer(({ disturbances }) => disturbances),
    commanded: longer(commandedOf),
  };
}

const SIDES = {
  A: ["states", "states"],
  B: ["states", "inputs"],
  C: ["outputs", "states"],
  D: ["outputs", "inputs"],
  E: ["states", "disturbances"],
  H: ["commanded", "states"],
  J: ["commanded", "inputs"],
} as const;

/** Both take their outputs for the commanded quantities: what changes in those is told there. */
const isDerived = (before: PlantContent, after: PlantContent) => before.commanded === null && after.commanded === null;

function matrixChanges({ before, after }: Pair<PlantContent>): Change[] {
  const [a, b, names] = [matricesOf(before), matricesOf(after), namesOf({ before, after })];
  return MATRIX_NAMES.filter((name) => !isDerived(before, after) || (name !== "H" && name !== "J")).flatMap((name) => {
    const [rows, columns] = SIDES[name].map((side) => names[side]);
    return rows.flatMap((row, i) =>
      columns.flatMap((column, j) => {
        const [was, is] = [a[name].entries[i]?.[j]?.trim(), b[name].entries[i]?.[j]?.trim()];
        return changeAt(`/${name}/${i}/${j}`, `${name}, row ${row}, column ${column}`, was, is);
      }),
    );
  });
}

/** No operating point is one at zero. */
function operatingPointChanges({ before, after }: Pair<PlantContent>): Change[] {
  return (["states", "inputs", "outputs"] as const).flatMap((list) => {
    const values = (content: PlantContent) => content.operatingPoint?.[list] ?? content[list].map(() => 0);
    const [a, b] = [values(before), values(after)];
    return Array.from({ length: Math.max(a.length, b.length) }, (_, i) => {
      const name = (after[list][i] ?? before[list][i])?.name ?? i + 1;
      return changeAt(`/operatingPoint/${list}/${i}`, `operating point, ${LISTS[list]} ${name}`, a[i], b[i]);
    }).flat();
  });
}

const timeBaseInWords = (timeBase: TimeBase) =>
  timeBase.kind === "continuous" ? "continuous" : `sampled every ${timeBase.period} s`;

/** What differs between two plants as typed, in the order of the plant's page. A reordered signal shows as a change of both. */
export function contentDifferences(before: PlantContent, after: PlantContent): Change[] {
  const both = { before, after };
  const all = Object.keys(LISTS) as (keyof typeof LISTS)[];
  const lists = all.filter((list) => list !== "commanded" || !isDerived(before, after));
  return [
    ...changeAt("/timeBase", "time base", timeBaseInWords(before.timeBase), timeBaseInWords(after.timeBase)),
    ...lists.flatMap((list) => listChanges(list, entriesOf(before, list), entriesOf(after, list))),
    ...matrixChanges(both),
    ...operatingPointChanges(both),
    ...changeAt("/source", "source note", before.source, after.source),
  ];
}
