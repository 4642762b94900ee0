import type { NumericalError } from "../errors";
import type { ExpressionReason } from "../expression/expression-error";

type Facts = { readonly name: string; readonly limit: string; readonly character: string; readonly names: string };

const MESSAGES: Record<ExpressionReason, (facts: Facts) => string> = {
  empty: () => "Enter a number or an expression",
  "too-long": ({ limit }) => `At most ${limit} characters`,
  "too-deep": ({ limit }) => `Parentheses may be nested ${limit} deep at most`,
  "bad-character": ({ character }) => `"${character}" has no meaning here`,
  "decimal-comma": () => "Write the decimal point as a point, or paste the cells so that the comma can be read as one",
  "implicit-multiplication": () => "Write the multiplication sign: 2*k, not 2k",
  "operand-missing": () => "A number or a name is missing beside an operator",
  "unbalanced-parenthesis": () => "A parenthesis has no partner",
  "unknown-name": ({ name }) => `There is no parameter named "${name}"`,
  "unknown-function": ({ name }) => `"${name}" is not a function we know`,
  "argument-missing": ({ name }) => `"${name}" needs its argument in parentheses`,
  "not-allowed": () => "Only numbers, parameters, + - * / ^, parentheses and functions of one argument can stand here",
  "not-finite": ({ name }) => `The result is not a finite number (at "${name}")`,
  "bad-name": () => "A name starts with a letter and holds letters, digits and underscores, at most 40",
  "reserved-name": ({ name }) => `"${name}" already has a meaning in expressions; choose another name`,
  "duplicate-name": ({ name }) => `The name "${name}" is taken by another parameter`,
  cycle: ({ names }) => `These parameters define one another in a circle: ${names}`,
  "too-many-parameters": ({ limit }) => `At most ${limit} parameters`,
};

/** One sentence for the cell that holds the expression. */
export function expressionMessage({ data }: NumericalError): string {
  const say = MESSAGES[data.reason as ExpressionReason];
  const names = Array.isArray(data.names) ? data.names.join(", ") : "";
  const facts = {
    name: String(data.name ?? ""),
    limit: String(data.limit ?? ""),
    character: String(data.character ?? ""),
    names,
  };
  const message = say ? say(facts) : "This cannot be read as an expression";
  return typeof data.position === "number" && data.position > 0 ? `${message} (character ${data.position + 1})` : message;
}
