import { expressionError } from "./expression-error";
import { CONSTANTS, FUNCTIONS, isReservedName } from "./reserved-names";

export const LENGTH_LIMIT = 200;
export const DEPTH_LIMIT = 32;

export type Token = {
  readonly kind: "number" | "name" | "call" | "operator" | "open" | "close";
  readonly text: string;
  readonly at: number;
};

const SPACE = /[ \t\u00a0]*/y;
const NUMBER = /(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?/y;
const NAME = /[A-Za-z_][A-Za-z0-9_]*/y;
const OPERATORS = "+-*/^";

function match(pattern: RegExp, text: string, at: number): string {
  pattern.lastIndex = at;
  return pattern.exec(text)?.[0] ?? "";
}

/**
 * Splits a formula into its parts and refuses, with the place, whatever is no formula. What passes holds only numbers, names,
 * + - * / ^ and balanced parentheses in an order that makes sense, so that nothing else ever reaches the parser.
 *
 * Shapes    text → at least one token; U+2212 counts as a minus sign
 * Throws    bad-expression
 */
export function tokenize(text: string): Token[] {
  if (text.length > LENGTH_LIMIT)
    throw expressionError(text.slice(0, LENGTH_LIMIT), LENGTH_LIMIT, "too-long", { limit: LENGTH_LIMIT });
  const tokens = split(text);
  if (tokens.length === 0) throw expressionError(text, 0, "empty");
  requireOrder(text, tokens);
  return tokens;
}

function split(text: string): Token[] {
  const ascii = text.replaceAll("\u2212", "-");
  const tokens: Token[] = [];
  let at = match(SPACE, ascii, 0).length;
  while (at < ascii.length) {
    const token = tokenAt(text, ascii, at);
    tokens.push(token);
    at += token.text.length;
    at += match(SPACE, ascii, at).length;
  }
  return tokens;
}

function tokenAt(text: string, ascii: string, at: number): Token {
  const number = match(NUMBER, ascii, at);
  if (number) return { kind: "number", text: number, at };
  const name = match(NAME, ascii, at);
  if (name) {
    const after = at + name.length;
    const opens = ascii[after + match(SPACE, ascii, after).length] === "(";
    return { kind: opens ? "call" : "name", text: name, at };
  }
  const character = String.fromCodePoint(ascii.codePointAt(at) ?? 0);
  if (character === "(") return { kind: "open", text: character, at };
  if (character === ")") return { kind: "close", text: character, at };
  if (OPERATORS.includes(character)) return { kind: "operator", text: character, at };
  throw expressionError(text, at, character === "," ? "decimal-comma" : "bad-character", { character });
}

function requireOrder(text: string, tokens: readonly Token[]): void {
  const opened: number[] = [];
  let wanted: "operand" | "operator" = "operand";
  for (const token of tokens) {
    const { kind, at } = token;
    if (wanted === "operand") {
      if (kind === "operator" && token.text !== "+" && token.text !== "-") throw expressionError(text, at, "operand-missing");
      if (kind === "close") throw expressionError(text, at, opened.length > 0 ? "operand-missing" : "unbalanced-parenthesis");
      if (kind === "call" && !FUNCTIONS.has(token.text)) throw noFunction(text, token);
      if (kind === "name" && FUNCTIONS.has(token.text)) throw expressionError(text, at, "argument-missing", { name: token.text });
      // words such as `mod` or `true` mean something to the parser and never name a parameter
      if (kind === "name" && isReservedName(token.text) && !CONSTANTS.has(token.text)) {
        throw expressionError(text, at, "unknown-name", { name: token.text });
      }
      if (kind === "open") opened.push(at);
      if (opened.length > DEPTH_LIMIT) throw expressionError(text, at, "too-deep", { limit: DEPTH_LIMIT });
      if (kind === "number" || kind === "name") wanted = "operator";
    } else {
      if (kind === "close") {
        if (opened.pop() === undefined) throw expressionError(text, at, "unbalanced-parenthesis");
      } else if (kind === "operator") wanted = "operand";
      else throw expressionError(text, at, "implicit-multiplication");
    }
  }
  if (wanted === "operand") throw expressionError(text, text.length, "operand-missing");
  if (opened.length > 0) throw expressionError(text, opened[opened.length - 1], "unbalanced-parenthesis");
}

/** `pi(2)` and `e(2)` are meant as products; any other name before a parenthesis is taken for a function. */
function noFunction(text: string, { text: name, at }: Token): Error {
  if (CONSTANTS.has(name)) return expressionError(text, at + name.length, "implicit-multiplication");
  return expressionError(text, at, "unknown-function", { name });
}
