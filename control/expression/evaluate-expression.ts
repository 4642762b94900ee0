import { expressionError } from "./expression-error";
import { type Operator, parseTree, type Tree } from "./parse-tree";
import { parsePlainNumber } from "./plain-number";
import { CONSTANTS, FUNCTIONS } from "./reserved-names";
import { tokenize } from "./tokens";

/**
 * Value of a formula in named parameters.
 *
 * Shapes    text of at most 200 characters, nested at most 32 deep: numbers, + - * / ^, parentheses, parameters, pi, e and
 *           the functions of `names.ts`; no implicit multiplication
 * Units     angles in rad; none are checked
 * Throws    bad-expression with the place and the reason; every step in between must be finite, too
 * Accuracy  each operation rounded once (functions as the engine gives them); never -0
 */
export function evaluateExpression(text: string, parameters: ReadonlyMap<string, number>): number {
  const plain = parsePlainNumber(text);
  if (plain !== null) return plain;
  const tree = parseTree(text);
  return evaluate({ text, parameters }, tree) + 0;
}

/** Names of the parameters that a formula uses, each once, in order of appearance. Throws bad-expression as the value would. */
export function parameterNamesIn(text: string): string[] {
  if (parsePlainNumber(text) !== null) return [];
  const names = tokenize(text).filter(({ kind, text: name }) => kind === "name" && !CONSTANTS.has(name));
  return [...new Set(names.map(({ text: name }) => name))];
}

type Context = { readonly text: string; readonly parameters: ReadonlyMap<string, number> };

function evaluate(context: Context, tree: Tree): number {
  switch (tree.kind) {
    case "number":
      return finite(context, tree.value, String(tree.value));
    case "name":
      return named(context, tree.name);
    case "negative":
      return -evaluate(context, tree.operand);
    case "call":
      return call(context, tree.name, evaluate(context, tree.argument));
    case "binary":
      return finite(context, apply(tree.operator, evaluate(context, tree.left), evaluate(context, tree.right)), tree.operator);
  }
}

function named(context: Context, name: string): number {
  const value = CONSTANTS.get(name) ?? context.parameters.get(name);
  if (value === undefined) throw expressionError(context.text, placeOf(context.text, name), "unknown-name", { name });
  return finite(context, value, name);
}

function call(context: Context, name: string, argument: number): number {
  const fn = FUNCTIONS.get(name);
  if (!fn) throw expressionError(context.text, placeOf(context.text, name), "unknown-function", { name });
  return finite(context, fn(argument), name);
}

function apply(operator: Operator, left: number, right: number): number {
  switch (operator) {
    case "+":
      return left + right;
    case "-":
      return left - right;
    case "*":
      return left * right;
    case "/":
      return left / right;
    case "^":
      return left ** right;
  }
}

function finite(context: Context, value: number, name: string): number {
  if (!Number.isFinite(value)) throw expressionError(context.text, placeOf(context.text, name), "not-finite", { name });
  return value;
}

/** First place of a name or operator in the text; the structure itself carries no places. */
function placeOf(text: string, name: string): number {
  return tokenize(text).find((token) => token.text === name)?.at ?? 0;
}
