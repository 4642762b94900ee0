import type { NumericalError } from "../errors";
import { expressionWords } from "../words/refusals/expression";

/** What to say at the field that holds the formula. `declared`: a parameter that exists but has no value is not unknown. */
export function expressionMessage({ data }: NumericalError, declared: ReadonlySet<string> = new Set()): string {
  if (data.reason === "unknown-name" && declared.has(String(data.name))) return `The parameter "${data.name}" has no value yet`;
  const words = expressionWords(data).join(" ");
  return typeof data.position === "number" && data.position > 0 ? `${words} (character ${data.position + 1})` : words;
}
