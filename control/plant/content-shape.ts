import type { EntryRows, PlantContent } from "./content";
import type { CommandedSignal } from "./model";

export const MATRIX_NAMES = ["A", "B", "C", "D", "E", "H", "J"] as const;
export type MatrixName = (typeof MATRIX_NAMES)[number];

const zeros = (rows: number, columns: number): EntryRows =>
  Array.from({ length: rows }, () => new Array<string>(columns).fill("0"));

/** The commanded quantities of a plant that names none are its outputs. */
export function commandedOf(content: PlantContent): readonly CommandedSignal[] {
  return content.commanded ?? content.outputs.map(({ name, unit, axis, scale }) => ({ name, unit, axis, amplitude: scale ?? 1 }));
}

/** Every matrix with its defaults filled in and the shape it must have. */
export function matricesOf(content: PlantContent): Record<MatrixName, { entries: EntryRows; rows: number; columns: number }> {
  const [n, m, p, w] = [content.states.length, content.inputs.length, content.outputs.length, content.disturbances.length];
  const outputsCommanded = content.commanded === null;
  const q = commandedOf(content).length;
  const D = content.D ?? zeros(p, m);
  const shape = (entries: EntryRows, rows: number, columns: number) => ({ entries, rows, columns });
  return {
    A: shape(content.A, n, n),
    B: shape(content.B, n, m),
    C: shape(content.C, p, n),
    D: shape(D, p, m),
    E: shape(content.E ?? zeros(n, w), n, w),
    H: shape(outputsCommanded ? content.C : (content.H ?? []), q, n),
    J: shape(outputsCommanded ? D : (content.J ?? zeros(q, m)), q, m),
  };
}
