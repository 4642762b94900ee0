import { NumericalError } from "../errors";
import { evaluateExpression, parameterNamesIn } from "../expression/evaluate-expression";
import { isReservedName } from "../expression/reserved-names";
import type { ParameterContent } from "./content";
import { expressionMessage } from "./expression-message";
import { error, type PlantProblem } from "./plant-problem";

const MOST = 64;
const NAME = /^[A-Za-z_][A-Za-z0-9_]{0,39}$/;

function nameProblem(name: string, index: number, parameters: readonly ParameterContent[]): string | null {
  if (name === "") return "Give the parameter a name";
  if (!NAME.test(name)) return "A name starts with a letter and holds letters, digits and underscores";
  if (isReservedName(name)) return `"${name}" already has a meaning in expressions; choose another name`;
  const first = parameters.findIndex((other) => other.name === name);
  return first < index ? `The name "${name}" is taken by parameter ${first + 1}` : null;
}

/** Names an expression uses, or null where it cannot be read at all (that is reported when it is evaluated). */
function namesIn(expression: string): readonly string[] | null {
  try {
    return parameterNamesIn(expression);
  } catch (cause) {
    if (cause instanceof NumericalError) return null;
    throw cause;
  }
}

/**
 * Values of the named parameters in dependency order. A parameter that cannot be evaluated is reported at its own field
 * and left out, and those that depend on it say so, so that one slip does not hide the others.
 *
 * Units     each value in its parameter's own unit; none is converted
 * Accuracy  at most 64 passes over at most 64 parameters
 */
export function parameterValues(parameters: readonly ParameterContent[]): {
  values: Map<string, number>;
  problems: PlantProblem[];
} {
  const values = new Map<string, number>();
  if (parameters.length > MOST) return { values, problems: [error("/parameters", `At most ${MOST} parameters`)] };
  const problems: PlantProblem[] = [];
  const declared = new Set(parameters.map(({ name }) => name));
  const pending = new Map<number, readonly string[]>();
  parameters.forEach(({ name, expression }, index) => {
    const wrong = nameProblem(name, index, parameters);
    if (wrong) problems.push(error(`/parameters/${index}/name`, wrong));
    else
      pending.set(
        index,
        (namesIn(expression) ?? []).filter((used) => declared.has(used)),
      );
  });
  for (let progress = true; progress; ) {
    progress = false;
    for (const [index, needs] of pending) {
      if (!needs.every((used) => values.has(used))) continue;
      pending.delete(index);
      progress = true;
      evaluateOne(parameters[index], index, values, problems);
    }
  }
  for (const [index, needs] of pending) {
    const missing = needs.filter((used) => !values.has(used)).join(", ");
    problems.push(
      error(`/parameters/${index}/expression`, `Waits for ${missing}, which has no value of its own or comes round in a circle`),
    );
  }
  return { values, problems };
}

function evaluateOne(
  { name, expression }: ParameterContent,
  index: number,
  values: Map<string, number>,
  problems: PlantProblem[],
) {
  try {
    values.set(name, evaluateExpression(expression, values));
  } catch (cause) {
    if (!(cause instanceof NumericalError)) throw cause;
    problems.push(error(`/parameters/${index}/expression`, expressionMessage(cause)));
  }
}
