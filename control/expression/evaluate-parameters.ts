import { NumericalError } from "../errors";
import { evaluateExpression, parameterNamesIn } from "./evaluate-expression";
import { expressionError } from "./expression-error";
import { isReservedName } from "./reserved-names";

export const PARAMETER_LIMIT = 64;

const NAME = /^[A-Za-z_][A-Za-z0-9_]{0,39}$/;

export type ParameterDefinition = { readonly name: string; readonly expression: string };

/**
 * Values of named parameters, each defined by a formula that may use the others in any order.
 *
 * Shapes    at most 64 definitions → a map in order of dependency
 * Throws    bad-expression: as `evaluateExpression`, with `parameter`; bad-name, reserved-name, duplicate-name, too-many-parameters;
 *           cycle, with the names that define one another in `names`
 * Accuracy  as `evaluateExpression`
 */
export function evaluateParameters(definitions: readonly ParameterDefinition[]): Map<string, number> {
  if (definitions.length > PARAMETER_LIMIT) throw expressionError("", 0, "too-many-parameters", { limit: PARAMETER_LIMIT });
  const byName = new Map<string, ParameterDefinition>();
  for (const definition of definitions) {
    const { name, expression } = definition;
    const problem = !NAME.test(name)
      ? "bad-name"
      : isReservedName(name)
        ? "reserved-name"
        : byName.has(name)
          ? "duplicate-name"
          : null;
    if (problem) throw expressionError(expression, 0, problem, { name, parameter: name });
    byName.set(name, definition);
  }
  const values = new Map<string, number>();
  for (const definition of definitions) visit(definition, byName, values, []);
  return values;
}

/** Depth-first; the path is at most as long as the list of definitions. */
function visit(
  { name, expression }: ParameterDefinition,
  byName: ReadonlyMap<string, ParameterDefinition>,
  values: Map<string, number>,
  path: readonly string[],
): void {
  if (values.has(name)) return;
  const here = [...path, name];
  for (const used of inDefinition(name, () => parameterNamesIn(expression))) {
    const next = byName.get(used);
    if (!next) continue; // evaluateExpression names the unknown one with its place
    if (here.includes(used)) {
      throw expressionError(expression, 0, "cycle", { name: used, names: here.slice(here.indexOf(used)), parameter: name });
    }
    visit(next, byName, values, here);
  }
  values.set(
    name,
    inDefinition(name, () => evaluateExpression(expression, values)),
  );
}

/** Adds to a refusal which definition it is about. */
function inDefinition<T>(parameter: string, work: () => T): T {
  try {
    return work();
  } catch (error) {
    if (error instanceof NumericalError) throw new NumericalError(error.code, { ...error.data, parameter });
    throw error;
  }
}
