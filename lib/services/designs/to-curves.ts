import "server-only";
import type { ResponseRecord } from "@/control/design/evidence";
import type { PlantModel } from "@/control/plant/model";
import type { ResponseCurves } from "@/lib/schemas/evidence";

type CurveSignal = ResponseCurves["signals"][number];

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

/** A record with its signals named, only those of the roles asked for. */
export function toCurves(record: ResponseRecord, model: PlantModel, roles: readonly CurveSignal["role"][]): ResponseCurves {
  const { kind, loop, source, amplitude, samples, step, values } = record;
  const shown = recordSignals(model, loop)
    .map((signal, row) => ({ signal, row }))
    .filter(({ signal }) => roles.includes(signal.role));
  const { name: sourceName, unit } = sourceOf(model, record);
  return {
    ...{ kind, loop, source, sourceName, amplitude, unit, step, samples },
    signals: shown.map(({ signal }) => signal),
    values: shown.map(({ row }) => Array.from(values.subarray(row * samples, (row + 1) * samples))),
  };
}
