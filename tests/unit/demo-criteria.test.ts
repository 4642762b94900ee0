import { expect, test } from "vitest";
import { computeDesign } from "@/control/design/compute-design";
import { judgeCriteria } from "@/control/design/criteria";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import gantry from "@/lib/commands/demo/cross-beam-gantry.json";
import tanks from "@/lib/commands/demo/heated-tanks.json";
import stage from "@/lib/commands/demo/levitation-stage.json";
import platform from "@/lib/commands/demo/tethered-platform.json";
import ladle from "@/lib/commands/demo/tilting-ladle.json";
import web from "@/lib/commands/demo/web-line.json";
import { Criteria } from "@/lib/schemas/criteria";
import { CreatePlant } from "@/lib/schemas/plant";
import { Recipe } from "@/lib/schemas/recipe";

const judged = [gantry, platform, web, stage, tanks, ladle].map(({ name, content, criteria, designs }) => {
  const { model } = evaluatePlant(CreatePlant.parse({ name, content }).content);
  if (!model) throw new Error(`${name} has faults`);
  const verdicts = designs.map(({ recipe }) => {
    const { responses } = computeDesign(model, Recipe.parse(recipe));
    return judgeCriteria(Criteria.parse(criteria), responses.state === "computed" ? responses.value : null, model);
  });
  return { name, verdicts };
});

test("each criterion of a demo plant has a figure for each of its designs, and some design meets it", () => {
  for (const { name, verdicts } of judged) {
    const each = verdicts.flat();
    expect(each.filter(({ value }) => value === null).map(({ criterion }) => [name, criterion])).toEqual([]);
    for (const place of verdicts[0].keys())
      expect([name, place, verdicts.some((one) => one[place].met)]).toEqual([name, place, true]);
  }
});

test("some demo designs miss one, so that both verdicts are there to be seen", () => {
  const missing = judged.filter(({ verdicts }) => verdicts.some((one) => one.some(({ met }) => !met)));
  expect(missing.map(({ name }) => name.split(" ")[0])).toEqual(["LX-2", "TP-3", "DH-5"]);
});
