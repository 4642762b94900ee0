import type { ResponseRecord } from "../design/evidence";
import type { PlantModel } from "../plant/model";

export type CurveSignal = {
  readonly role: "commanded" | "output" | "state" | "estimate" | "input";
  readonly index: number;
  readonly name: string;
  readonly unit: string;
  readonly axis: number | null;
};

/** One response with its signals named; `values[i][k]` belongs to `signals[i]` at t = k · step seconds. */
export type NamedCurves = Omit<ResponseRecord, "values"> & {
  readonly sourceName: string;
  /** Of the amplitude. */
  readonly unit: string;
  readonly signals: readonly CurveSignal[];
  readonly values: readonly Float64Array[];
};

/** Signals of a record in the order of its rows: commanded, outputs, states, estimates (with an observer), inputs. */
export function recordSignals(model: PlantModel, loop: ResponseRecord["loop"]): CurveSignal[] {
  const named = (role: CurveSignal["role"], list: readonly { name: string; unit: string; axis: number | null }[]) =>
    list.map(({ name, unit, axis }, index) => ({ role, index, name, unit, axis }));
  return [
    ...named("commanded", model.commanded),
    ...named("output", model.outputs),
    ...named("state", model.states),
    ...(loop === "observer" ? named("estimate", model.states) : []),
    ...named("input", model.inputs),
  ];
}

function sourceOf(model: PlantModel, { kind, source }: ResponseRecord): { name: string; unit: string } {
  if (kind === "initial") return { name: "initial state", unit: "1" };
  return kind === "step" ? model.commanded[source] : model.inputs[source];
}

/**
 * A record with its signals named, only those of the roles asked for.
 *
 * Shapes    record (q + p + n [+ n] + m)×samples → one row of `samples` values for each signal asked for, in the record's order
 * Units     each row in the unit of its signal
 * Throws    nothing
 * Accuracy  the record's own values: the rows are views of its buffer, not copies
 * Source    none: a change of form
 */
export function namedCurves(record: ResponseRecord, model: PlantModel, roles: readonly CurveSignal["role"][]): NamedCurves {
  const { values, ...facts } = record;
  const { samples } = record;
  const shown = recordSignals(model, record.loop)
    .map((signal, row) => ({ signal, row }))
    .filter(({ signal }) => roles.includes(signal.role));
  const { name: sourceName, unit } = sourceOf(model, record);
  return {
    ...facts,
    sourceName,
    unit,
    signals: shown.map(({ signal }) => signal),
    values: shown.map(({ row }) => values.subarray(row * samples, (row + 1) * samples)),
  };
}
