import type { OpenParameter } from "@/lib/schemas/template";

/** In full, however many digits: a bound that was rounded would be another bound. */
const exact = (value: number) => String(value).replace("-", "\u2212");

/** "20 to 80 kg" */
export const rangeText = ({ lowest, highest, unit }: OpenParameter) => `${exact(lowest)} to ${exact(highest)} ${unit}`.trim();

/** What is wrong with a value while it is typed; undefined where nothing is. Empty is said only when it is sent. */
export function parameterProblem(parameter: OpenParameter, value: number | null): string | undefined {
  if (value === null || (parameter.lowest <= value && value <= parameter.highest)) return undefined;
  const { name, unit, lowest, highest } = parameter;
  const [word, bound] = value < lowest ? ["below", lowest] : ["above", highest];
  return `${name} lies ${word} the allowed ${exact(bound)} ${unit}`.trim();
}
