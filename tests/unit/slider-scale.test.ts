import { expect, test } from "vitest";
import { placeOf, SLIDER_END, STEPS_PER_DECADE, valueAt } from "@/components/designs/recipe/slider-scale";

test("the middle of a slider is the value it started from, to the last digit", () => {
  for (const middle of [0.1 + 0.2, 1 / 3, 4e-7, 12345.678]) {
    expect(placeOf(middle, middle)).toBe(0);
    expect(valueAt(0, middle)).toBe(middle);
  }
});

test("every step is the same factor, and a place gives back the value that has it", () => {
  expect(valueAt(STEPS_PER_DECADE, 0.04)).toBe(0.4);
  expect(valueAt(-STEPS_PER_DECADE, 0.04)).toBe(0.004);
  for (let place = -SLIDER_END; place <= SLIDER_END; place++) expect(placeOf(valueAt(place, 0.04), 0.04)).toBe(place);
});

test("a value beyond the ends stands at the end", () => {
  expect(placeOf(1e9, 1)).toBe(SLIDER_END);
  expect(placeOf(1e-9, 1)).toBe(-SLIDER_END);
});
