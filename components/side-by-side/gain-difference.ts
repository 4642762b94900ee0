import type { PlantModel, Rows } from "@/control/plant/model";
import { computed } from "../designs/evidence/figures-reply";
import { headersOf } from "../designs/signal-headers";
import type { Header } from "../matrix/header";
import type { Compared } from "./compare-types";

export type GainView = {
  readonly rows: readonly Header[];
  readonly columns: readonly Header[];
  readonly values: Rows;
  /** Whether the entry is not the first design's, as shown; true where the first has no such signal. */
  readonly differs: readonly (readonly boolean[])[];
  /** This gain less the first's; null where their signals are not the same. */
  readonly change: Rows | null;
};

const placesOf = (from: readonly { readonly name: string }[], of: readonly { readonly name: string }[]) =>
  of.map(({ name }) => from.findIndex((signal) => signal.name === name));

/** K of a design and what differs from the first design's, entries matched by signal names. */
export function gainView(first: Compared, design: Compared): GainView | null {
  const [reference, gains] = [computed(first.evidence.gains), computed(design.evidence.gains)];
  if (!gains) return null;
  const { model }: { model: PlantModel } = design;
  const r = placesOf(first.model.inputs, model.inputs);
  const c = placesOf(first.model.states, model.states);
  const at = (i: number, j: number) => reference?.K[r[i]]?.[c[j]];
  const aligned = reference !== null && [...r, ...c].every((place) => place >= 0);
  return {
    rows: headersOf(model.inputs),
    columns: headersOf(model.states),
    values: gains.K,
    differs: gains.K.map((row, i) => row.map((value, j) => value !== at(i, j))),
    change: aligned ? gains.K.map((row, i) => row.map((value, j) => value - (at(i, j) ?? 0))) : null,
  };
}
