import type { NumericalErrorCode } from "../../errors";
import type { PlantModel } from "../../plant/model";
import type { Part } from "../../plant/report";
import { explainRefusal } from "../explain-refusal";

export type Tone = "met" | "caution" | "not-met";
/** One verdict of the checks: a headline that stands alone, and the sentence that gives its reasons. */
export type Finding = { readonly key: string; readonly tone: Tone; readonly headline: string; readonly sentence: string };

/** The finding of a part, or the reason why there is none. */
export function findingOf<T>(key: string, model: PlantModel, part: Part<T>, say: (value: T) => Omit<Finding, "key">): Finding {
  if (part.state === "computed") return { key, ...say(part.value) };
  const { title, sentence, nextStep } = explainRefusal(part.code as NumericalErrorCode, part.data, model);
  return { key, tone: "not-met", headline: title, sentence: `${sentence} ${nextStep}` };
}

export function plural(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`;
}
