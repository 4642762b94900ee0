import type { Complex, PlantModel, TimeBase } from "../plant/model";
import type { ModeReport } from "../plant/report";
import { poleFigures } from "../structure/continuous-pole";
import { formatFrequency, formatSeconds } from "./format-number";
import { joinNames, leadingNames } from "./join-names";

/** A short label: what the mode does and which states take part, such as "oscillation at 15.8 Hz, mostly th and om". */
export function describeMode(mode: ModeReport, model: PlantModel): string {
  const motion = motionOf(mode, model.timeBase, mode.marginal);
  const who = whoMoves(mode.participation, model);
  return who === "" ? motion : `${motion}, ${who}`;
}

/** The same for a bare pole, which knows nothing of states. */
export function describePole(pole: Complex, timeBase: TimeBase): string {
  const size = timeBase.kind === "sampled" ? Math.hypot(pole.re, pole.im) - 1 : pole.re;
  const near = Math.sqrt(Number.EPSILON) * Math.max(Math.hypot(pole.re, pole.im), timeBase.kind === "sampled" ? 1 : 0);
  return motionOf({ pole, ...poleFigures(pole, timeBase, near) }, timeBase, Math.abs(size) <= near);
}

type Motion = Pick<ModeReport, "pole" | "naturalFrequency" | "damping" | "timeConstant">;

function motionOf({ pole, naturalFrequency, damping, timeConstant }: Motion, timeBase: TimeBase, marginal: boolean): string {
  if (naturalFrequency === null) return "motion that is gone after a few samples";
  if (naturalFrequency === 0) return "free drift";
  if (timeBase.kind === "sampled" && pole.im === 0 && pole.re < 0)
    return `motion that changes sign with every sample${trend(timeConstant)}`;
  if (pole.im === 0) {
    if (timeConstant === null) return "free drift";
    return timeConstant > 0
      ? `decay with time constant ${formatSeconds(timeConstant)}`
      : `growth with time constant ${formatSeconds(-timeConstant)}`;
  }
  const kind = marginal ? "undamped oscillation" : damping !== null && damping < 0 ? "growing oscillation" : "oscillation";
  return `${kind} at ${formatFrequency(naturalFrequency)}`;
}

function trend(timeConstant: number | null): string {
  if (timeConstant === null) return "";
  return timeConstant > 0 ? ` and decays within ${formatSeconds(timeConstant)}` : " and grows";
}

function whoMoves(participation: readonly number[], model: PlantModel): string {
  const names = leadingNames(participation, model.states);
  if (names.length === 0) return "";
  const held = model.states.reduce((sum, { name }, i) => (names.includes(name) ? sum + (participation[i] ?? 0) : sum), 0);
  if (held > 0.995) return `of ${joinNames(names)}`;
  return held >= 0.6 ? `mostly ${joinNames(names)}` : `spread over ${names.join(", ")} and others`;
}
