import { NumericalError } from "../errors";

/** Why a formula was refused: `reason` in the data of bad-expression. */
export type ExpressionReason =
  | "empty"
  | "too-long" // limit
  | "too-deep" // limit
  | "bad-character" // character
  | "decimal-comma"
  | "implicit-multiplication"
  | "operand-missing"
  | "unbalanced-parenthesis"
  | "unknown-name" // name
  | "unknown-function" // name
  | "argument-missing" // name: a function without its parenthesis
  | "not-allowed" // what the parser read but the product does not evaluate
  | "not-finite"; // name: the function, operator or parameter that gave no finite number

export type ExpressionFacts = {
  readonly name?: string;
  readonly character?: string;
  readonly limit?: number;
};

/** `position` counts characters of `text` from 0. */
export function expressionError(
  text: string,
  position: number,
  reason: ExpressionReason,
  facts: ExpressionFacts = {},
): NumericalError {
  return new NumericalError("bad-expression", { text, position, reason, ...facts });
}
