import { expect, test } from "vitest";
import { computeDesign } from "@/control/design/compute-design";
import { defaultRecipe } from "@/control/design/default-recipe";
import { workArray, workCopy, workScope } from "@/control/linalg/work-array";
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

test("a scope gives its arrays back as zeros, inner scopes and failures too, and leaves those from before it alone", () => {
  const outside = workArray(7).fill(3);
  const lengths = Array.from({ length: 400 }, (_, k) => (k * 53) % 1_500);
  const fillAll = () =>
    lengths.map((length) => {
      const array = workArray(length);
      expect(array.every((entry) => Object.is(entry, 0))).toBe(true);
      return array.fill(5);
    });
  workScope(() => {
    const before = workArray(40).fill(2);
    for (let round = 0; round < 3; round++) {
      const arrays = workScope(fillAll);
      expect(arrays.every((array) => array.every((entry) => entry === 0))).toBe(true);
    }
    const fail = () => {
      fillAll();
      throw new Error("half way");
    };
    expect(() => workScope(fail)).toThrow("half way");
    fillAll();
    expect(before.every((entry) => entry === 2)).toBe(true);
  });
  workScope(fillAll);
  expect(outside.every((entry) => entry === 3)).toBe(true);
});

test("scopes that need more than is kept still have zeros of their own", () => {
  const arrays = workScope(() => {
    const taken = Array.from({ length: 300 }, () => workArray(8_000));
    taken.forEach((array, k) => {
      array.fill(k + 1);
    });
    expect(taken.every((array, k) => array.every((entry) => entry === k + 1))).toBe(true);
    return taken.length;
  });
  expect(arrays).toBe(300);
});

test("what a design gives stays as it was while others are computed", () => {
  const designOf = (axes: number) => {
    const { model } = evaluatePlant(coupledAxes(axes, true));
    if (!model) throw new Error("the plant has a value");
    const poles = model.states.map((_, k) => ({ kind: "real" as const, value: -20 - 3 * k }));
    return computeDesign(model, { ...defaultRecipe(model), observer: { kind: "poles", poles } });
  };
  const first = designOf(2);
  const kept = structuredClone(first);
  designOf(1);
  designOf(2);
  expect(first.observer.state).toBe("computed");
  expect(first).toEqual(kept);
});
