import { modulus } from "../../linalg/complex";
import type { Complex, PlantModel } from "../../plant/model";
import type { PlantChecks, ZeroReport } from "../../plant/report";
import { continuousPole } from "../../structure/continuous-pole";
import { formatComplex } from "../format-complex";
import { formatFrequency } from "../format-number";
import { joinNames } from "../join-names";
import { type Finding, findingOf, plural } from "./finding";

/** Zeros from all inputs to all measured outputs, and what they forbid. */
export function zerosFinding({ zeros }: PlantChecks, model: PlantModel): Finding {
  return findingOf("zeros", model, zeros, (all) => {
    if (model.outputs.length === 0)
      return { tone: "met", headline: "No zeros", sentence: "Nothing is measured, so there are no zeros to speak of." };
    if (all.length === 0) {
      return {
        tone: "met",
        headline: "No zeros",
        sentence: "Between all inputs and all outputs nothing is blocked at any frequency.",
      };
    }
    const outside = all.filter(({ minimumPhase }) => !minimumPhase);
    if (outside.length === 0) {
      return {
        tone: "met",
        headline: `${plural(all.length, "zero")}, none in the way`,
        sentence: `${all.length === 1 ? "It lies" : "All lie"} in the stable region: ${listed(all)}. Very fast loops end there, and nothing forbids them.`,
      };
    }
    return {
      tone: "caution",
      headline: `${plural(outside.length, "zero")} in the way`,
      sentence: `${listed(outside)}: ${consequence(outside, model)}`,
    };
  });
}

function consequence(outside: readonly ZeroReport[], model: PlantModel): string {
  const rest = model.timeBase.kind === "sampled" ? 1 : 0;
  const atRest = outside.some(({ value }) => modulus({ re: value.re - rest, im: value.im }) <= Math.sqrt(Number.EPSILON));
  if (atRest)
    return "at rest some combination of outputs cannot be moved, so not all set points can be reached and an integrator there cannot work.";
  const frequencies = outside.flatMap(({ value }) => {
    const s = continuousPole(value, model.timeBase);
    return s === null ? [] : [modulus(s)];
  });
  const limit =
    frequencies.length === 0 ? "" : `, and no loop can be much faster than ${formatFrequency(Math.min(...frequencies) / 2, 2)}`;
  return `the outputs first move the wrong way or a fast loop hides growing motion inside${limit}.`;
}

function listed(zeros: readonly ZeroReport[]): string {
  const shown = zeros.map(({ value }) => value).filter(({ im }) => im >= 0);
  const names = shown.slice(0, 4).map((value: Complex) => formatComplex(value));
  return shown.length > 4 ? `${names.join(", ")} and ${shown.length - 4} more` : joinNames(names);
}
