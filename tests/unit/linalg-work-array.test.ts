import { expect, test } from "vitest";
import { computeDesign } from "@/control/design/compute-design";
import { defaultRecipe } from "@/control/design/default-recipe";
import { workArray, workCopy } from "@/control/linalg/work-array";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import { coupledAxes } from "../bench/coupled-axes";

test("arrays for work are zero, of the length asked for and share no entry, across the end of their memory", () => {
  const lengths = Array.from({ length: 3_000 }, (_, k) => (k * 37) % 130);
  const arrays = lengths.map((length, k) => {
    const array = workArray(length);
    expect(array.length).toBe(length);
    expect(array.every((entry) => Object.is(entry, 0))).toBe(true);
    return array.fill(k + 1);
  });
  arrays.forEach((array, k) => {
    expect(array.every((entry) => entry === k + 1)).toBe(true);
  });
});

test("a large one has memory of its own", () => {
  const array = workArray(5_000);
  expect(array.length).toBe(5_000);
  expect(array.buffer.byteLength).toBe(40_000);
});

test("a copy holds the same numbers and is no view", () => {
  const given = Float64Array.of(1, -0, Number.NaN, Number.POSITIVE_INFINITY);
  const copy = workCopy(given);
  expect([...copy]).toEqual([...given]);
  copy[0] = 2;
  expect(given[0]).toBe(1);
});

test("the samples of a design are sent without anybody else's memory", () => {
  const { model } = evaluatePlant(coupledAxes(2, false));
  if (!model) throw new Error("the plant has a value");
  const { responses } = computeDesign(model, defaultRecipe(model));
  if (responses.state !== "computed") throw new Error("the loop settles");
  expect(responses.value.records.length).toBeGreaterThan(3);
  for (const { values } of responses.value.records) expect(values.buffer.byteLength).toBe(values.byteLength);
});
