import type { StepFigures } from "@/control/design/evidence";
import type { PlantModel } from "@/control/plant/model";
import { formatNumber } from "@/control/words/format-number";
import type { ResponseCell, ResponseColumn, ResponseRow, TimeGrid } from "../../plots/response-data";
import type { Curves } from "./curves";

export type RowRole = "commanded" | "output" | "state" | "input";
export type LoopChoice = Curves["loop"] | "both";

export type GridWanted = {
  readonly kind: Curves["kind"];
  readonly loop: LoopChoice;
  readonly roles: readonly RowRole[];
};

export type ResponseData = {
  readonly model: PlantModel;
  readonly curves: readonly Curves[];
  /** Of the last saved revision, drawn thin and grey. */
  readonly ghosts: readonly Curves[];
  readonly figures: readonly StepFigures[];
};

export type ResponsePicture = {
  readonly columns: readonly ResponseColumn[];
  readonly rows: readonly ResponseRow[];
  readonly time: TimeGrid;
};

const ROW_KIND = { commanded: "commanded", output: "output", state: "state", input: "effort" } as const;
const SIGNALS = { commanded: "commanded", output: "outputs", state: "states", input: "inputs" } as const;

function columnsOf(model: PlantModel, curves: readonly Curves[]): ResponseColumn[] {
  return curves.map(({ kind, source, sourceName, amplitude, unit }) => {
    if (kind === "initial") return { key: "initial", label: "let go from the initial state", axis: null };
    const size = `${formatNumber(amplitude)} ${unit}`;
    const signal = kind === "step" ? model.commanded[source] : model.inputs[source];
    const label = kind === "step" ? `${sourceName} commanded ${size}` : `${sourceName} disturbed by ${size}`;
    return { key: `${kind} ${source}`, label, axis: signal?.axis ?? null };
  });
}

const lineOf = (curves: Curves | undefined, role: string, index: number) => {
  const at = curves?.signals.findIndex((signal) => signal.role === role && signal.index === index) ?? -1;
  return at < 0 ? undefined : curves?.values[at];
};

/** A curve at the instants of another grid, straight between its samples; for the eye only. */
export function resample(values: ArrayLike<number>, from: number, to: TimeGrid): number[] {
  return Array.from({ length: to.samples }, (_, k) => {
    const place = (k * to.step) / from;
    const left = Math.min(Math.floor(place), values.length - 1);
    const right = Math.min(left + 1, values.length - 1);
    return values[left] + (values[right] - values[left]) * Math.min(1, place - left);
  });
}

/** Sample furthest from zero, with its sign, and when. */
function furthest(values: ArrayLike<number>, step: number): { peak: number; peakAt: number } {
  let at = 0;
  for (let k = 1; k < values.length; k++) if (Math.abs(values[k]) > Math.abs(values[at])) at = k;
  return { peak: values[at] ?? 0, peakAt: at * step };
}

const NEGLIGIBLE = 1e-9;
/** What is left of rounding stands for zero, so that no sentence speaks of 1e-37 at rest. */
const atRest = (final: number, peak: number) => (Math.abs(final) <= NEGLIGIBLE * Math.abs(peak) ? 0 : final);

type Traced = Pick<ResponseCell, "final" | "peak" | "peakAt" | "settling">;

/** Figures over all time where the evidence has them; else what the samples show. The sign comes from the samples. */
function figuresOf(
  role: RowRole,
  index: number,
  curve: Curves,
  values: ArrayLike<number>,
  figures: ResponseData["figures"],
): Traced {
  const seen = furthest(values, curve.step);
  const found =
    curve.kind === "step" ? figures.find(({ loop, source }) => loop === curve.loop && source === curve.source) : undefined;
  const signed = (size: number) => (seen.peak < 0 ? -size : size);
  if (found && role === "input") {
    const { peak, at } = found.effort[index];
    return { final: null, peak: signed(peak), peakAt: at };
  }
  if (found && (role === "commanded" || role === "output")) {
    const { final, peak, peakAt, settling } = (role === "commanded" ? found.commanded : found.outputs)[index];
    return { final: atRest(final, peak), peak: signed(peak), peakAt, settling };
  }
  return { final: null, ...seen };
}

const limitsOf = ({ inputs, operatingPoint }: PlantModel, index: number): ResponseRow["limits"] => {
  const held = operatingPoint.inputs[index] ?? 0;
  const { lower, upper } = inputs[index];
  return { lower: lower === null ? null : lower - held, upper: upper === null ? null : upper - held };
};

/** The small multiples of one kind of response: what the evidence and the curves give, in the terms of the grid. */
export function responsePicture(
  { model, curves, ghosts, figures }: ResponseData,
  { kind, loop, roles }: GridWanted,
): ResponsePicture | null {
  const main = loop === "both" ? "observer" : loop;
  const shown = curves.filter((curve) => curve.kind === kind && curve.loop === main);
  const first = shown.at(0);
  if (!first) return null;
  const time = { samples: first.samples, step: first.step };
  const sampled = model.timeBase.kind === "sampled";
  const beside = (of: readonly Curves[], source: number, wantedLoop: string) =>
    of.find((curve) => curve.kind === kind && curve.loop === wantedLoop && curve.source === source);

  const cellOf = (role: RowRole, index: number, curve: Curves): ResponseCell | null => {
    const values = lineOf(curve, role, index);
    if (!values) return null;
    const ghostCurve = beside(ghosts, curve.source, main);
    const ghost = lineOf(ghostCurve, role, index);
    return {
      values,
      estimated: role === "state" && loop !== "both" ? (lineOf(curve, "estimate", index) ?? null) : null,
      fullState: loop === "both" ? (lineOf(beside(curves, curve.source, "full-state"), role, index) ?? null) : null,
      ghost: ghost && ghostCurve ? resample(ghost, ghostCurve.step, time) : null,
      own: kind === "step" && role === "commanded" && index === curve.source,
      ...figuresOf(role, index, curve, values, figures),
    };
  };

  const commandedNames = new Set(model.commanded.map(({ name }) => name));
  const rows = roles.flatMap((role) =>
    model[SIGNALS[role]].map(({ name, unit, axis }, index): ResponseRow => {
      const repeats = (role === "output" || role === "state") && commandedNames.has(name) && roles.includes("commanded");
      return {
        key: `${role} ${index}`,
        label: repeats ? `${name}, ${role === "output" ? "measured" : "state"}` : name,
        unit,
        axis,
        kind: ROW_KIND[role],
        ...(role === "input" ? { limits: limitsOf(model, index), held: sampled } : {}),
        cells: shown.map((curve) => cellOf(role, index, curve)),
      };
    }),
  );
  return { columns: columnsOf(model, shown), rows, time };
}
