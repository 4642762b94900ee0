import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { NumericalErrorCode } from "@/control/errors";
import type { PlantModel } from "@/control/plant/model";
import { explainRefusal } from "@/control/words/explain-refusal";
import { smallPlant } from "../helpers/small-plant";

const plain = smallPlant({
  A: [
    [0, 1],
    [-9800, -1.8],
  ],
  B: [[0], [1]],
  C: [[1, 0]],
});
const gantry: PlantModel = {
  ...plain,
  states: [
    { name: "th", unit: "rad", axis: 0, scale: null },
    { name: "om", unit: "rad/s", axis: 0, scale: null },
  ],
  inputs: [{ name: "F1cmd", unit: "N", axis: 0, scale: null, lower: null, upper: null }],
  outputs: [{ name: "enc1", unit: "m", axis: 0, scale: null }],
};
const pole = { re: -0.91, im: 99.03 };

/** Facts as the core gives them, and what the words must name. */
const CASES: Record<NumericalErrorCode, { data: Record<string, unknown>; names: string[] }> = {
  "shape-mismatch": { data: { matrix: "B", expected: [2, 1], given: [3, 1] }, names: ["input matrix B", "2 × 1", "3 × 1"] },
  "not-finite": { data: { matrix: "A", row: 1, column: 0 }, names: ["row om", "column th"] },
  "too-large": { data: { what: "response", limit: 1e308 }, names: ["A response", "1e308"] },
  "no-convergence": { data: { routine: "francis-iteration", limit: 60 }, names: ["limit"] },
  singular: { data: { matrix: "A", row: 0 }, names: ["plant matrix A", "row th"] },
  "not-symmetric": { data: { matrix: "Q", row: 1, column: 0 }, names: ["state weight", "row om", "column th"] },
  "not-positive-definite": { data: { matrix: "R", index: 0 }, names: ["input weight", "F1cmd"] },
  "not-positive-semidefinite": { data: { matrix: "Q", eigenvalue: -0.5 }, names: ["state weight", "−0.5"] },
  "not-stabilizable": { data: { pole, state: 0, distance: 0 }, names: ["15.8 Hz", "−0.91 ± 99.03 i", "th", "F1cmd"] },
  "not-detectable": { data: { pole, state: 0, distance: 0 }, names: ["15.8 Hz", "th", "enc1"] },
  "not-controllable": { data: { pole, state: 1, distance: 1e-17 }, names: ["15.8 Hz", "om", "1e−17"] },
  "not-observable": { data: { pole, state: 1, distance: 1e-17 }, names: ["15.8 Hz", "om"] },
  "not-stable": { data: { pole: { re: 0.5, im: 0 }, state: 1 }, names: ["growth with time constant 2 s", "om"] },
  "unweighted-boundary-mode": { data: { pole: { re: 0, im: 2 }, state: 0 }, names: ["undamped oscillation", "th"] },
  "on-stability-boundary": { data: { distance: 2e-9 }, names: ["2e−9"] },
  "not-stabilising": { data: { pole: { re: 3, im: 0 } }, names: ["growth with time constant 0.333 s"] },
  inaccurate: { data: { residual: 1e-3, bound: 1e-12 }, names: ["0.001", "1e−12"] },
  "pole-count": { data: { expected: 2, given: 3 }, names: ["2 poles", "3 are given", "Take 1 away"] },
  "poles-not-conjugate": { data: { index: 1, pole }, names: ["−0.91 + 99.03 i", "entry 2"] },
  "pole-multiplicity": {
    data: { pole: { re: -1, im: 0 }, multiplicity: 3, rank: 1 },
    names: ["−1", "3 times", "1 independent input"],
  },
  "too-sensitive": {
    data: { poleError: 0.25, pole: { re: -7, im: 0 }, limit: 1 / 16 },
    names: ["wanted pole −7", "25 %", "6.3 %", "another input"],
  },
  "unstable-pole": { data: { index: 0, pole: { re: 1, im: 0 } }, names: ["1", "left of the imaginary axis"] },
  "period-missing": { data: {}, names: ["sample time"] },
  "bad-option": { data: { option: "inputs", index: 0, given: -1 }, names: ["F1cmd", "−1"] },
  "bad-expression": { data: { text: "k*/m", position: 2, reason: "operand-missing" }, names: ["k*/m", "character 3"] },
};
const codes = Object.keys(CASES) as NumericalErrorCode[];

describe("every refusal has a title, a sentence and one change to try, in the plant's own names", () => {
  test.each(codes)("%s", (code) => {
    const words = explainRefusal(code, CASES[code].data, gantry);
    const all = `${words.title} ${words.sentence} ${words.nextStep}`;
    for (const name of CASES[code].names) expect(all).toContain(name);
    expect(words.title.length).toBeLessThanOrEqual(60);
    expect(words.sentence).toMatch(/^[A-Z].*\.$/);
    expect(words.nextStep).toMatch(/^[A-Z].*\.$/);
    expect(all).not.toMatch(/undefined|null|NaN|object Object/);
    expect(all).not.toContain(code);
  });
});

test("facts that are missing or of the wrong kind never throw and never show", () => {
  const junk = fc.dictionary(
    fc.constantFrom(
      "pole",
      "state",
      "index",
      "matrix",
      "row",
      "column",
      "expected",
      "given",
      "reason",
      "text",
      "option",
      "what",
      "limit",
    ),
    fc.oneof(fc.anything(), fc.constant({ re: Number.NaN, im: 1 }), fc.constant("__proto__"), fc.constant(1e9)),
  );
  fc.assert(
    fc.property(fc.constantFrom(...codes), junk, (code, data) => {
      const { title, sentence, nextStep } = explainRefusal(code, data, gantry);
      for (const text of [title, sentence, nextStep]) expect(text).not.toMatch(/undefined|NaN|\[object/);
      expect(sentence.length).toBeGreaterThan(10);
    }),
    { numRuns: 2000, seed: 7 },
  );
});

test("a code that is not known yet is told as not computed, with its numbers", () => {
  const words = explainRefusal("from-the-future" as NumericalErrorCode, { effort: 3.5 }, gantry);
  expect(words.title).toBe("Not computed");
  expect(words.sentence).toContain("effort 3.5");
});

test("a sampled plant is told about the unit circle, not the imaginary axis", () => {
  const sampled = { ...gantry, timeBase: { kind: "sampled", period: 0.01 } } as const;
  expect(explainRefusal("unstable-pole", { pole: { re: 1.2, im: 0 } }, sampled).sentence).toContain("unit circle");
});

test("noise is told as noise, not as a weight", () => {
  const words = explainRefusal("not-positive-definite", { matrix: "measurement noise", index: 0 }, gantry);
  expect(words.title).toBe("Noise not positive");
  expect(words.sentence).toContain("enc1");
  expect(words.sentence).not.toContain("cost");
});

test("what refuses an observer is told in its outputs, noise and estimate, not in inputs, weights and loop", () => {
  const of = (code: NumericalErrorCode, data: Record<string, unknown>) => {
    const { sentence, nextStep } = explainRefusal(code, { ...data, of: "observer" }, gantry);
    return `${sentence} ${nextStep}`;
  };
  expect(of("pole-multiplicity", { pole: { re: -1, im: 0 }, multiplicity: 2, rank: 1 })).toMatch(
    /enc1, 1 independent output, allows it once/,
  );
  expect(of("unweighted-boundary-mode", { pole: { re: 0, im: 2 }, state: 0 })).toMatch(/process noise never stirs.*\bth\b/);
  expect(of("on-stability-boundary", { distance: 2e-9 })).toMatch(/With this noise the best observer.*more process noise/);
  expect(of("unstable-pole", { index: 0, pole: { re: 1, im: 0 } })).toContain("the estimate would not come to rest");
  expect(of("too-sensitive", {})).toContain("another sensor");
  expect(of("inaccurate", { residual: 1, bound: 0 })).toContain("poles or noise levels of the observer");
});

test("advice fits the mode: what decays by itself can be left alone, what does not needs an input or a sensor", () => {
  const next = (code: NumericalErrorCode, re: number) => explainRefusal(code, { pole: { re, im: 0 }, state: 0 }, gantry).nextStep;
  expect(next("not-controllable", -1)).toContain("Design by weights");
  expect(next("not-controllable", 0)).toContain("Add an input");
  expect(next("not-observable", -1)).toContain("by noise");
  expect(next("not-observable", 0)).toContain("Add a sensor");
  expect(next("not-stabilizable", -1)).toContain("smaller degree of stability");
});
