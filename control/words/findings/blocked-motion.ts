import { modulus } from "../../linalg/complex";
import type { Complex, PlantModel } from "../../plant/model";
import type { ZeroReport } from "../../plant/report";
import { formatComplex } from "../format-complex";
import { formatNumber } from "../format-number";
import { joinNames, leadingNames } from "../join-names";

/** An input that moves less than this beside the largest is left out of the sentence. */
const SLIGHT = 0.02;
const MOST_NAMES = 4;

/**
 * Which inputs the zero nearest to rest blocks, moving in which proportion, and in which outputs that is felt. Empty where
 * one input or one output leaves nothing to tell, or no direction is unique.
 */
export function blockedMotion(zeros: readonly ZeroReport[], model: PlantModel): string {
  const known = zeros.filter(({ inputDirection, outputDirection }) => inputDirection || outputDirection);
  if (known.length === 0) return "";
  const nearest = known.reduce((best, zero) => (modulus(zero.value) < modulus(best.value) ? zero : best));
  const inputs = model.inputs.length > 1 && nearest.inputDirection ? motionOf(nearest.inputDirection, model) : "";
  const outputs = model.outputs.length > 1 && nearest.outputDirection ? leading(nearest.outputDirection, model.outputs) : "";
  if (inputs === "" && outputs === "") return "";
  const at = `At ${formatComplex(nearest.value)},`;
  if (inputs === "") return ` ${at} it is felt in ${outputs}.`;
  return ` ${at} ${inputs} blocked${outputs === "" ? "" : `, and ${outputs} feel it most`}.`;
}

function motionOf(direction: readonly Complex[], model: PlantModel): string {
  const largest = Math.max(0, ...direction.map(modulus));
  const taking = direction.flatMap((entry, index) => (modulus(entry) > SLIGHT * largest ? [{ entry, index }] : []));
  if (taking.length === 0) return "";
  const names = taking.slice(0, MOST_NAMES).map(({ index }) => model.inputs[index]?.name ?? `input ${index + 1}`);
  if (taking.length === 1) return `${names[0]} alone is`;
  const real = taking.length <= MOST_NAMES && taking.every(({ entry }) => Math.abs(entry.im) <= SLIGHT * modulus(entry));
  if (!real) return `a joint motion of ${joinNames(names)} is`;
  const ratio = taking.map(({ entry }) => formatNumber(entry.re / taking[0].entry.re, 2)).join(" : ");
  return `${joinNames(names)} moving as ${ratio} of their largest acceptable deviations are`;
}

function leading(direction: readonly Complex[], signals: PlantModel["outputs"]): string {
  const names = leadingNames(direction.map(modulus), signals);
  return names.length > 1 ? joinNames(names) : "";
}
