import { computeDesign } from "@/control/design/compute-design";
import { checkPlant } from "@/control/plant/check-plant";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import { CreatePlant } from "@/lib/schemas/plant";
import { Recipe } from "@/lib/schemas/recipe";
import gantry from "../demo/cross-beam-gantry.json";
import tanks from "../demo/heated-tanks.json";
import stage from "../demo/levitation-stage.json";
import platform from "../demo/tethered-platform.json";
import ladle from "../demo/tilting-ladle.json";
import web from "../demo/web-line.json";

const BUDGET_MS = 400;

/** Runs work until the budget is spent; the median and 95th percentile in milliseconds. */
function measure(work: () => void) {
  work();
  const times: number[] = [];
  for (const end = performance.now() + BUDGET_MS; performance.now() < end; ) {
    const began = performance.now();
    work();
    times.push(performance.now() - began);
  }
  times.sort((a, b) => a - b);
  return { median: times[Math.floor(times.length / 2)], p95: times[Math.floor(times.length * 0.95)], runs: times.length };
}

function report(name: string, work: () => void) {
  const { median, p95, runs } = measure(work);
  console.log(`${name.padEnd(64)} ${median.toFixed(2).padStart(9)} ${p95.toFixed(2).padStart(9)} ${String(runs).padStart(6)}`);
}

/** Times what a person waits for: the checks of a plant and a whole design with its observer and responses. */
export function timeDemoPlants(): void {
  console.log(`${"milliseconds".padEnd(64)} ${"median".padStart(9)} ${"p95".padStart(9)} ${"runs".padStart(6)}`);
  for (const { name, content, designs } of [gantry, platform, stage, web, tanks, ladle]) {
    const { model } = evaluatePlant(CreatePlant.parse({ name, content }).content);
    if (!model) throw new Error(`The plant ${name} has faults.`);
    report(`checks of ${name}, ${model.states.length} states`, () => checkPlant(model));
    for (const design of designs) {
      const recipe = Recipe.parse(design.recipe);
      report(`  design "${design.name}"`, () => computeDesign(model, recipe));
    }
  }
}
