import type { ExpressionReason } from "../../expression/expression-error";
import { numberOf, textOf } from "./facts";
import type { Explainers, Facts } from "./types";

type Words = readonly [sentence: string, nextStep: string];

function named(data: Facts, otherwise: string): string {
  const name = textOf(data, "name");
  return name === null ? otherwise : `"${name}"`;
}

function limitOf(data: Facts): string {
  const limit = numberOf(data, "limit");
  return limit === null ? "the limit" : `the limit of ${limit}`;
}

const REASONS: Readonly<Record<ExpressionReason, (data: Facts) => Words>> = {
  empty: () => ["There is nothing in it.", "Enter a number, or a formula in the plant's parameters."],
  "too-long": (data) => [`It is longer than ${limitOf(data)} characters.`, "Move a part of it into a parameter."],
  "too-deep": (data) => [`Its parentheses are nested deeper than ${limitOf(data)}.`, "Move an inner part into a parameter."],
  "bad-character": (data) => {
    const character = textOf(data, "character");
    return [
      `${character === null ? "It has a character" : `The character "${character}"`} that means nothing here.`,
      "Use digits, parameter names, + − * / ^ and parentheses.",
    ];
  },
  "decimal-comma": () => ["It has a comma inside a number.", "Write the decimal point as a point."],
  "implicit-multiplication": () => ["Two factors stand side by side without a sign.", "Write the * between them."],
  "operand-missing": () => ["A sign has nothing to act on.", "Complete the formula on both sides of the sign."],
  "unbalanced-parenthesis": () => ["A parenthesis is open on one side.", "Close it, or take it away."],
  "unknown-name": (data) => [
    `${named(data, "A name")} is not a parameter of this plant.`,
    "Correct the name, or add it to the parameters with its value and unit.",
  ],
  "unknown-function": (data) => [
    `${named(data, "A name")} is not a function that can be used here.`,
    "Use one of the listed functions, such as sqrt.",
  ],
  "argument-missing": (data) => [`The function ${named(data, "in it")} has no argument.`, "Write its argument in parentheses."],
  "not-allowed": () => [
    "It holds more than a number formula.",
    "Use numbers, parameters, + − * / ^, parentheses and the listed functions.",
  ],
  "not-finite": (data) => [
    `${named(data, "A step")} gives no finite number.`,
    "Look for a division by zero or the root of a negative number.",
  ],
};

/** "k/m at character 3". */
function whereOf(data: Facts): string {
  const text = textOf(data, "text");
  const position = numberOf(data, "position");
  const quoted = text === null ? "The formula" : `The formula, ${text.length > 60 ? `${text.slice(0, 60)}…` : text}`;
  return position === null || text === null
    ? `${quoted}, cannot be read.`
    : `${quoted}, cannot be read from character ${position + 1} on.`;
}

/** What is wrong with a formula and what to do about it, without saying where. */
export function expressionWords(data: Facts): Words {
  const reason = textOf(data, "reason");
  const words = reason !== null && Object.hasOwn(REASONS, reason) ? REASONS[reason as ExpressionReason] : REASONS["not-allowed"];
  return words(data);
}

export const explainExpression: Pick<Explainers, "bad-expression"> = {
  "bad-expression": (data) => {
    const [sentence, nextStep] = expressionWords(data);
    return { title: "A formula cannot be read", sentence: `${whereOf(data)} ${sentence}`, nextStep };
  },
};
