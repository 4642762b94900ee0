import { describe, expect, test } from "vitest";
import { computeDesign } from "@/control/design/compute-design";
import { type Criterion, judgeCriteria } from "@/control/design/criteria";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { ResponseEvidence } from "@/control/design/evidence";
import { coupledModel } from "../helpers/coupled-model";

const model = coupledModel();
function stepsOf(recipe = defaultRecipe(model)): ResponseEvidence {
  const { responses } = computeDesign(model, recipe);
  if (responses.state === "refused") throw new Error("refused");
  return responses.value;
}
const steps = stepsOf();
const judged = (criterion: Criterion, from: ResponseEvidence | null = steps, of = model) =>
  judgeCriteria([criterion], from, of)[0];

describe("a criterion without a signal", () => {
  test("is judged by the worst that the summary shows", () => {
    const { worstSettling, worstOvershoot, worstCrossPeak, peakEffort } = steps.summary.fullState;
    expect(judged({ kind: "settling", signal: null, limit: 1 }).value).toBe(worstSettling);
    expect(judged({ kind: "overshoot", signal: null, limit: 1 }).value).toBe(worstOvershoot);
    expect(judged({ kind: "cross-peak", signal: null, limit: 1 }).value).toBe(100 * (worstCrossPeak?.peak ?? 0));
    const worstEffort = Math.max(...peakEffort.map(({ overLimit }) => overLimit ?? 0));
    expect(judged({ kind: "effort", signal: null, limit: 1 }).value).toBe(100 * worstEffort);
  });
});

describe("a criterion of one signal", () => {
  test("is judged by that signal alone", () => {
    for (const [place, { name }] of model.commanded.entries()) {
      const step = steps.figures.find(({ source }) => source === place);
      expect(judged({ kind: "settling", signal: name, limit: 1 }).value).toBe(step?.commanded[place].settling);
      const other = 1 - place;
      const peak = step?.commanded[other].peak ?? Number.NaN;
      expect(judged({ kind: "cross-peak", signal: name, limit: 1 }).value).toBe((100 * peak) / model.commanded[other].amplitude);
    }
    const F2 = steps.figures.map(({ effort }) => 100 * (effort[1].overLimit ?? 0));
    expect(judged({ kind: "effort", signal: "F2", limit: 1 }).value).toBe(Math.max(...F2));
  });

  test("that the plant does not have, or an input without a limit, is not met and says why", () => {
    expect(judged({ kind: "settling", signal: "z9", limit: 1 })).toMatchObject({ value: null, met: false, reason: "no-signal" });
    const free = coupledModel({ inputs: model.inputs.map((input) => ({ ...input, lower: null, upper: null })) });
    expect(judged({ kind: "effort", signal: "F1", limit: 1 }, steps, free)).toMatchObject({ met: false, reason: "no-signal" });
  });
});

test("a value at its limit is met, one beyond is not", () => {
  const { value } = judged({ kind: "settling", signal: null, limit: 1 });
  if (value === null) throw new Error("no value");
  expect(judged({ kind: "settling", signal: null, limit: value }).met).toBe(true);
  expect(judged({ kind: "settling", signal: null, limit: value * (1 - 1e-12) }).met).toBe(false);
});

test("without responses, or where a step does not come to rest, nothing is met", () => {
  expect(judged({ kind: "settling", signal: null, limit: 1 }, null)).toMatchObject({ met: false, reason: "no-response" });
  const restless = {
    ...steps,
    figures: steps.figures.map((step) => ({ ...step, commanded: step.commanded.map((line) => ({ ...line, settling: null })) })),
  };
  expect(judged({ kind: "settling", signal: null, limit: 1 }, restless)).toMatchObject({ met: false, reason: "never" });
});

test("with an observer the loop that is judged is the one with the observer", () => {
  const observed = stepsOf({
    ...defaultRecipe(model),
    observer: { kind: "noise", process: square(4, 1e-4), measurement: square(2, 1e-12) },
  });
  const slower = {
    ...observed,
    figures: observed.figures.map((step) =>
      step.loop === "observer"
        ? { ...step, commanded: step.commanded.map((line) => ({ ...line, settling: line.settling && line.settling + 1 })) }
        : step,
    ),
  };
  const before = judged({ kind: "settling", signal: null, limit: 1 }, observed).value ?? 0;
  expect(judged({ kind: "settling", signal: null, limit: 1 }, slower).value).toBe(before + 1);
});

function square(size: number, value: number): number[][] {
  return Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, j) => (i === j ? value : 0)));
}
