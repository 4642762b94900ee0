import type { PlantContent, SignalContent } from "./content";
import { caution, error, type PlantProblem } from "./plant-problem";

const LISTS = ["states", "inputs", "outputs", "disturbances", "commanded"] as const;
type List = (typeof LISTS)[number];
const ONE: Record<List, string> = {
  states: "state",
  inputs: "input",
  outputs: "output",
  disturbances: "disturbance",
  commanded: "commanded quantity",
};

function listProblems(list: List, signals: readonly SignalContent[], axisCount: number): PlantProblem[] {
  const found: PlantProblem[] = [];
  const seen = new Map<string, number>();
  signals.forEach(({ name, unit, axis }, index) => {
    const at = `/${list}/${index}`;
    const first = seen.get(name.trim());
    if (name.trim() === "") found.push(error(`${at}/name`, `Name this ${ONE[list]}`));
    else if (first !== undefined) found.push(error(`${at}/name`, `"${name}" already names ${ONE[list]} ${first + 1}`));
    else seen.set(name.trim(), index);
    if (unit.trim() === "") found.push(error(`${at}/unit`, `${name || "It"} needs a unit; write 1 for a pure number`));
    if (axis !== null && axis >= axisCount) found.push(error(`${at}/axis`, `There is no axis ${axis + 1}`));
  });
  return found;
}

function axisProblems(axes: PlantContent["axes"]): PlantProblem[] {
  const found: PlantProblem[] = [];
  axes.forEach(({ name, tag }, index) => {
    if (axes.findIndex((other) => other.name === name) < index)
      found.push(error(`/axes/${index}/name`, `"${name}" already names an axis`));
    if (axes.findIndex((other) => other.tag === tag) < index)
      found.push(error(`/axes/${index}/tag`, `The tag "${tag}" is taken`));
  });
  return found;
}

function limitProblems({ inputs, operatingPoint }: PlantContent): PlantProblem[] {
  const found: PlantProblem[] = [];
  inputs.forEach(({ name, lower, upper }, index) => {
    const at = `/inputs/${index}`;
    if (lower !== null && upper !== null && lower >= upper) {
      found.push(error(`${at}/upper`, `The upper limit of ${name} must lie above its lower limit`));
    }
    const held = operatingPoint?.inputs[index] ?? 0;
    if ((lower !== null && held < lower) || (upper !== null && held > upper)) {
      found.push(caution(`${at}/lower`, `The operating point holds ${name} at ${held}, outside its limits`));
    }
  });
  return found;
}

function operatingPointProblems({ operatingPoint, states, inputs, outputs }: PlantContent): PlantProblem[] {
  if (!operatingPoint) return [];
  const wanted = { states: states.length, inputs: inputs.length, outputs: outputs.length };
  return (["states", "inputs", "outputs"] as const)
    .filter((list) => operatingPoint[list].length !== wanted[list])
    .map((list) => error(`/operatingPoint/${list}`, `The operating point needs ${wanted[list]} values for the ${list}`));
}

/** Names, units, axes, limits and the operating point of a plant, judged at each field. */
export function signalProblems(content: PlantContent): PlantProblem[] {
  const commanded = content.commanded ?? [];
  return [
    ...axisProblems(content.axes),
    ...LISTS.flatMap((list) => listProblems(list, list === "commanded" ? commanded : content[list], content.axes.length)),
    ...limitProblems(content),
    ...operatingPointProblems(content),
    ...commanded.flatMap(({ amplitude, name }, index) =>
      amplitude === 0 ? [error(`/commanded/${index}/amplitude`, `A step of ${name} needs an amplitude other than zero`)] : [],
    ),
  ];
}
