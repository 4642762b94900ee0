import type { TimeBase } from "@/control/plant/model";
import type { Header } from "../../matrix/header";

type Named = { readonly name: string; readonly unit: string; readonly axis: number | null; readonly scale?: number | null };

export const asHeader = ({ name, unit, axis, scale }: Named): Header => ({ label: name, unit, axis, scale: scale ?? null });

/** Per second, as the trade writes it: m/s becomes m/s². */
function ratePerSecond(unit: string): string {
  if (unit === "1") return "1/s";
  return unit.endsWith("/s") ? `${unit}²` : `${unit}/s`;
}

type States = { readonly states: readonly Named[]; readonly timeBase: TimeBase };

/** Rows of A and B say what is driven: the rate of a state, or its next value. */
export function drivenStates({ states, timeBase }: States): Header[] {
  const continuous = timeBase.kind === "continuous";
  return states.map((state) => ({
    ...asHeader(state),
    label: continuous ? `${state.name}′` : `${state.name} next`,
    unit: continuous ? ratePerSecond(state.unit) : state.unit,
  }));
}

/** Unit of an entry: what its row has, for one of what its column has. */
export const unitOfEntry = (rows: readonly Header[], columns: readonly Header[]) => (r: number, c: number) => {
  const [row, column] = [rows[r]?.unit || "?", columns[c]?.unit || "?"];
  return row === column ? "1" : `${row} per ${column}`;
};
