import {
  create,
  isConstantNode,
  isFunctionNode,
  isOperatorNode,
  isParenthesisNode,
  isSymbolNode,
  type MathNode,
  parseDependencies,
} from "mathjs/number";
import { expressionError } from "./expression-error";
import { DEPTH_LIMIT, tokenize } from "./tokens";

export type Operator = "+" | "-" | "*" | "/" | "^";
export type Tree =
  | { readonly kind: "number"; readonly value: number }
  | { readonly kind: "name"; readonly name: string }
  | { readonly kind: "call"; readonly name: string; readonly argument: Tree }
  | { readonly kind: "negative"; readonly operand: Tree }
  | { readonly kind: "binary"; readonly operator: Operator; readonly left: Tree; readonly right: Tree };

const OPERATORS: ReadonlyMap<string, Operator> = new Map([
  ["add", "+"],
  ["subtract", "-"],
  ["multiply", "*"],
  ["divide", "/"],
  ["pow", "^"],
]);

let parser: ((text: string) => MathNode) | null = null;

/** The parser is made when the first formula comes and never evaluates anything: only its `parse` is ever held. */
function parse(text: string): MathNode {
  parser ??= create(parseDependencies).parse;
  try {
    return parser(text);
  } catch (error) {
    if (error instanceof SyntaxError) throw expressionError(text, 0, "not-allowed");
    throw error;
  }
}

/**
 * Structure of a formula as plain data: numbers, names, one-argument functions, signs and + - * / ^, nothing else.
 * `-2^2` is -(2^2) and `2^3^2` is 2^(3^2), as in print.
 *
 * Throws    bad-expression
 */
export function parseTree(text: string): Tree {
  tokenize(text);
  return toTree(text, parse(text.replaceAll("\u2212", "-").replaceAll("\u00a0", " ")), 1);
}

/** Long sums and products nest on their left only and do not count as depth. */
function toTree(text: string, node: MathNode, depth: number): Tree {
  if (depth > DEPTH_LIMIT) throw expressionError(text, 0, "too-deep", { limit: DEPTH_LIMIT });
  if (isParenthesisNode(node)) return toTree(text, node.content, depth + 1);
  if (isConstantNode(node) && typeof node.value === "number") return { kind: "number", value: node.value };
  if (isSymbolNode(node)) return { kind: "name", name: node.name };
  if (isFunctionNode(node) && isSymbolNode(node.fn) && node.args.length === 1) {
    return { kind: "call", name: node.fn.name, argument: toTree(text, node.args[0], depth + 1) };
  }
  if (isOperatorNode(node) && !node.implicit) {
    const fn: string = node.fn;
    const operands: readonly MathNode[] = node.args;
    if (operands.length === 1 && fn === "unaryMinus") return { kind: "negative", operand: toTree(text, operands[0], depth + 1) };
    if (operands.length === 1 && fn === "unaryPlus") return toTree(text, operands[0], depth + 1);
    const operator = OPERATORS.get(fn);
    if (operands.length === 2 && operator) {
      return { kind: "binary", operator, left: toTree(text, operands[0], depth), right: toTree(text, operands[1], depth + 1) };
    }
  }
  throw expressionError(text, 0, "not-allowed");
}
