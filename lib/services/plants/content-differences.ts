import "server-only";
import { commandedOf, MATRIX_NAMES, matricesOf } from "@/control/plant/content-shape";
import type { PlantContent, PlantDifference } from "@/lib/schemas/plant";

type Change = PlantDifference["changes"][number];
type Named = Readonly<Record<string, unknown>>;

const shown = (value: unknown): string | null =>
  value === undefined ? null : value === null ? "none" : typeof value === "object" ? JSON.stringify(value) : String(value);

function pushChange(changes: Change[], pointer: string, place: string, before: unknown, after: unknown) {
  const [a, b] = [shown(before), shown(after)];
  if (a !== b) changes.push({ pointer, place, before: a, after: b });
}

function listChanges(changes: Change[], list: string, one: string, before: readonly Named[], after: readonly Named[]) {
  for (let i = 0; i < Math.max(before.length, after.length); i++) {
    const [a, b] = [before[i], after[i]];
    if (!a || !b) {
      pushChange(changes, `/${list}/${i}`, `${one} ${i + 1}`, a?.name, b?.name);
      continue;
    }
    for (const field of new Set([...Object.keys(a), ...Object.keys(b)])) {
      pushChange(changes, `/${list}/${i}/${field}`, `${one} ${b.name}, ${field}`, a[field], b[field]);
    }
  }
}

function matrixChanges(changes: Change[], before: PlantContent, after: PlantContent) {
  const [a, b] = [matricesOf(before), matricesOf(after)];
  const { states, inputs, outputs, disturbances } = after;
  const commanded = commandedOf(after);
  const signals = {
    A: [states, states],
    B: [states, inputs],
    C: [outputs, states],
    D: [outputs, inputs],
    E: [states, disturbances],
    H: [commanded, states],
    J: [commanded, inputs],
  } as const;
  for (const name of MATRIX_NAMES) {
    if (after.commanded === null && before.commanded === null && (name === "H" || name === "J")) continue;
    const [rows, columns] = signals[name];
    const height = Math.max(a[name].entries.length, b[name].entries.length);
    const width = Math.max(...[...a[name].entries, ...b[name].entries].map((row) => row.length), 0);
    for (let i = 0; i < height; i++) {
      for (let j = 0; j < width; j++) {
        const place = `${name}, row ${rows[i]?.name ?? i + 1}, column ${columns[j]?.name ?? j + 1}`;
        pushChange(changes, `/${name}/${i}/${j}`, place, a[name].entries[i]?.[j]?.trim(), b[name].entries[i]?.[j]?.trim());
      }
    }
  }
}

/** What differs between two plants as typed, in the order of the plant's page. A reordered signal shows as a change of both. */
export function contentDifferences(before: PlantContent, after: PlantContent): Change[] {
  const changes: Change[] = [];
  pushChange(changes, "/timeBase", "time base", before.timeBase, after.timeBase);
  listChanges(changes, "axes", "axis", before.axes, after.axes);
  listChanges(changes, "states", "state", before.states, after.states);
  listChanges(changes, "inputs", "input", before.inputs, after.inputs);
  listChanges(changes, "outputs", "output", before.outputs, after.outputs);
  listChanges(changes, "disturbances", "disturbance", before.disturbances, after.disturbances);
  listChanges(changes, "commanded", "commanded quantity", commandedOf(before), commandedOf(after));
  listChanges(changes, "parameters", "parameter", before.parameters, after.parameters);
  matrixChanges(changes, before, after);
  pushChange(changes, "/operatingPoint", "operating point", before.operatingPoint, after.operatingPoint);
  pushChange(changes, "/source", "source note", before.source, after.source);
  return changes;
}
