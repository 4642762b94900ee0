import "server-only";
import type { Issue } from "@/lib/errors";
import { pointerTo } from "@/lib/schemas/issues";
import type { PlantContent } from "@/lib/schemas/plant";
import type { TemplateContent } from "@/lib/schemas/template";

/**
 * The template's plant with its open parameters filled in, and what is wrong with the values.
 * A value left out takes the suggested one.
 */
export function fillIn({ plant, openParameters }: TemplateContent, values: Readonly<Record<string, number>>) {
  const issues: Issue[] = [];
  const known = new Set(openParameters.map(({ name }) => name));
  for (const name of Object.keys(values)) {
    if (!known.has(name))
      issues.push({ pointer: pointerTo(["values", name]), detail: `The template has no open parameter "${name}"` });
  }
  const filled = new Map<string, number>();
  for (const { name, unit, lowest, highest, suggested } of openParameters) {
    const value = Object.hasOwn(values, name) ? values[name] : suggested;
    filled.set(name, value);
    if (value < lowest || value > highest) {
      issues.push({ pointer: pointerTo(["values", name]), detail: `${name} must lie between ${lowest} and ${highest} ${unit}` });
    }
  }
  const parameters = plant.parameters.map((parameter) => {
    const value = filled.get(parameter.name);
    return value === undefined ? parameter : { ...parameter, expression: String(value) };
  });
  return { content: { ...plant, parameters } satisfies PlantContent, issues };
}

/** Each open parameter must be one of the plant's, and named once. */
export function openParameterIssues({ plant, openParameters }: TemplateContent): Issue[] {
  const declared = new Set(plant.parameters.map(({ name }) => name));
  return openParameters.flatMap(({ name }, index): Issue[] => {
    const pointer = `/content/openParameters/${index}/name`;
    if (!declared.has(name)) return [{ pointer, detail: `The plant has no parameter "${name}"` }];
    const first = openParameters.findIndex((other) => other.name === name);
    return first < index ? [{ pointer, detail: `"${name}" is open already, in line ${first + 1}` }] : [];
  });
}
