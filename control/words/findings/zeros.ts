import { modulus } from "../../linalg/complex";
import type { Complex, PlantModel } from "../../plant/model";
import type { PlantChecks } from "../../plant/report";
import { continuousPole, stabilityMargin } from "../../structure/continuous-pole";
import { formatComplex } from "../format-complex";
import { formatFrequency } from "../format-number";
import { joinNames } from "../join-names";
import { blockedMotion } from "./blocked-motion";
import { type Finding, findingOf, plural } from "./finding";

/** Zeros from all inputs to all measured outputs, and what they forbid. */
export function zerosFinding({ zeros }: PlantChecks, model: PlantModel): Finding {
  return findingOf("zeros", model, zeros, (all) => {
    if (all.length === 0) {
      const sentence =
        model.outputs.length === 0
          ? "Nothing is measured, so there are no zeros to speak of."
          : "Between all inputs and all outputs nothing is blocked at any frequency.";
      return { tone: "met", headline: "No zeros", sentence };
    }
    const outside = all.filter(({ minimumPhase }) => !minimumPhase);
    if (outside.length > 0) {
      const values = outside.map(({ value }) => value);
      return {
        tone: "caution",
        headline: `${plural(outside.length, "zero")} in the way`,
        sentence: `${consequences(values, model)}${blockedMotion(outside, model)}`,
      };
    }
    const place = all.length === 1 ? "It lies" : "All lie";
    return {
      tone: "met",
      headline: `${plural(all.length, "zero")}, none in the way`,
      sentence: `${place} in the stable region: ${listed(all.map(({ value }) => value))}. Poles of a very fast loop end there.`,
    };
  });
}

/** Zeros at rest, on the boundary and beyond it forbid different things. */
function consequences(zeros: readonly Complex[], model: PlantModel): string {
  const sampled = model.timeBase.kind === "sampled";
  const near = Math.sqrt(Number.EPSILON);
  const atRest = zeros.filter(({ re, im }) => modulus({ re: re - (sampled ? 1 : 0), im }) <= near);
  const others = zeros.filter((zero) => !atRest.includes(zero));
  const onBoundary = others.filter((zero) => Math.abs(stabilityMargin(zero, model.timeBase)) <= near * modulus(zero));
  const beyond = others.filter((zero) => !onBoundary.includes(zero));
  const sentences = [];
  if (atRest.length > 0) {
    sentences.push(
      "A zero at rest: some combination of the outputs cannot be held away from its rest value, so not all set points can be reached.",
    );
  }
  if (onBoundary.length > 0) {
    sentences.push(
      `On the stability boundary ${listed(onBoundary)}: at that frequency some combination of the outputs does not answer to any input.`,
    );
  }
  if (beyond.length > 0) {
    const where = sampled ? "Outside the unit circle" : "Right of the imaginary axis";
    sentences.push(
      `${where} ${listed(beyond)}: in one direction the outputs first move the wrong way${speedLimit(beyond, model)}.`,
    );
  }
  return sentences.join(" ");
}

/** Rule of thumb: half the frequency of the nearest zero. Negative sampled zeros lie at half the sampling rate and limit nothing. */
function speedLimit(zeros: readonly Complex[], model: PlantModel): string {
  const limiting = model.timeBase.kind === "sampled" ? zeros.filter(({ re }) => re > 0) : zeros;
  const frequencies = limiting.flatMap((zero) => {
    const s = continuousPole(zero, model.timeBase);
    return s === null ? [] : [modulus(s)];
  });
  if (frequencies.length === 0) return "";
  return `, and a loop in that direction gains nothing beyond about ${formatFrequency(Math.min(...frequencies) / 2, 2)}`;
}

function listed(zeros: readonly Complex[]): string {
  const shown = zeros.filter(({ im }) => im >= 0);
  const names = shown.slice(0, 4).map((value) => formatComplex(value));
  return shown.length > 4 ? `${names.join(", ")} and ${shown.length - 4} more` : joinNames(names);
}
