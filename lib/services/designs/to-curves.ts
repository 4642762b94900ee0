import "server-only";
import type { ResponseRecord } from "@/control/design/evidence";
import type { PlantModel } from "@/control/plant/model";
import { type CurveSignal, namedCurves } from "@/control/response/named-curves";
import type { ResponseCurves } from "@/lib/schemas/evidence";

/** A record as it is sent: its signals named, only those of the roles asked for. */
export function toCurves(record: ResponseRecord, model: PlantModel, roles: readonly CurveSignal["role"][]): ResponseCurves {
  const { signals, values, ...curves } = namedCurves(record, model, roles);
  return { ...curves, signals: [...signals], values: values.map((line) => Array.from(line)) };
}
