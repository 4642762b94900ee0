import { modulus } from "../linalg/complex";
import type { Complex, PlantModel, TimeBase } from "../plant/model";
import type { ModeReport } from "../plant/report";
import { poleFigures, stabilityMargin } from "../structure/continuous-pole";
import { formatFrequency, formatSeconds } from "./format-number";
import { joinNames, leadingNames } from "./join-names";

/**
 * A short label: what the mode does and which states take part, such as "oscillation at 15.8 Hz, mostly th and om".
 *
 * Shapes    a mode of that plant
 * Units     in the label
 * Throws    nothing
 * Accuracy  figures rounded for reading
 * Source    the modes of `checkPlant`
 */
export function describeMode(mode: ModeReport, model: PlantModel): string {
  const { kind, figure } = motionOf(mode, model.timeBase, mode.marginal);
  const { participation } = mode;
  const names = leadingNames(participation, model.states);
  const held = model.states.reduce((sum, { name }, i) => (names.includes(name) ? sum + (participation[i] ?? 0) : sum), 0);
  if (names.length === 0) return kind + figure;
  if (held > 0.995) return `${kind} of ${joinNames(names)}${figure}`;
  return `${kind}${figure}, ${held >= 0.6 ? `mostly ${joinNames(names)}` : `spread over ${names.join(", ")} and others`}`;
}

/** The same for a bare pole, which knows nothing of states. */
export function describePole(pole: Complex, timeBase: TimeBase): string {
  const near = Math.sqrt(Number.EPSILON) * (timeBase.kind === "sampled" ? 1 : modulus(pole));
  const marginal = Math.abs(stabilityMargin(pole, timeBase)) <= near;
  const { kind, figure } = motionOf({ pole, ...poleFigures(pole, timeBase, near) }, timeBase, marginal);
  return kind + figure;
}

type Motion = Pick<ModeReport, "pole" | "naturalFrequency" | "damping" | "timeConstant">;
type MotionWords = { readonly kind: string; readonly figure: string };

function motionOf({ pole, naturalFrequency, damping, timeConstant }: Motion, timeBase: TimeBase, marginal: boolean): MotionWords {
  if (naturalFrequency === null) return { kind: "motion", figure: " that is gone after a few samples" };
  if (naturalFrequency === 0) return { kind: "free drift", figure: "" };
  if (timeBase.kind === "sampled" && pole.im === 0 && pole.re < 0) {
    return { kind: "alternation", figure: ` from sample to sample${trend(timeConstant)}` };
  }
  if (pole.im === 0) {
    if (timeConstant === null) return { kind: "free drift", figure: "" };
    return {
      kind: timeConstant > 0 ? "decay" : "growth",
      figure: ` with time constant ${formatSeconds(Math.abs(timeConstant))}`,
    };
  }
  const kind = marginal ? "undamped oscillation" : damping !== null && damping < 0 ? "growing oscillation" : "oscillation";
  return { kind, figure: ` at ${formatFrequency(naturalFrequency)}` };
}

function trend(timeConstant: number | null): string {
  if (timeConstant === null) return "";
  return timeConstant > 0 ? ` that decays with time constant ${formatSeconds(timeConstant)}` : " that grows";
}
