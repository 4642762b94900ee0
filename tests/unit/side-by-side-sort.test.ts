import { describe, expect, test } from "vitest";
import { type Picked, pickedWords, togglePicked } from "@/components/designs/picked-revisions";
import type { Fact } from "@/components/side-by-side/compared-rows";
import { nextSorting, sortedPlaces, sortingWords } from "@/components/side-by-side/sort-designs";

const KEY = "observer settling";
const figure = (size: number, text = `${size} s`): Fact[] => [
  {
    ...{ section: "Figures", key: "settling", label: "settling, 2 %", text, exact: text, size },
    sort: { key: KEY, words: "settling, 2 %, with the observer" },
  },
];
const least = { key: KEY, order: "least" } as const;
const most = { key: KEY, order: "most" } as const;

describe("designs put in order by a figure", () => {
  test("stand least first or most first; without the figure they stand last either way", () => {
    const facts = [figure(3), [], figure(1), figure(2)];
    expect(sortedPlaces(facts, least)).toEqual([2, 3, 0, 1]);
    expect(sortedPlaces(facts, most)).toEqual([0, 3, 2, 1]);
  });
  test("keep the order they were chosen in where they read alike", () => {
    const facts = [figure(3.604, "3.6 s"), figure(1), figure(3.601, "3.6 s"), [], []];
    expect(sortedPlaces(facts, least)).toEqual([1, 0, 2, 3, 4]);
    expect(sortedPlaces(facts, most)).toEqual([0, 2, 1, 3, 4]);
  });
  test("are left alone by a name that no figure has, such as one of an old address", () => {
    expect(sortedPlaces([figure(3), figure(1)], { key: "comfort", order: "least" })).toBeNull();
    expect(sortedPlaces([[], []], least)).toBeNull();
  });
});

describe("the order in words", () => {
  test("names the figure, the direction, every design in order, and those without", () => {
    expect(sortingWords(["B", "A", "C"], [figure(1), figure(2), []], least)).toBe(
      "Sorted by settling, 2 %, with the observer, least first: B, A; C has no such figure and stands last.",
    );
    expect(sortingWords(["A", "B", "C", "D"], [figure(2), figure(1), [], []], most)).toBe(
      "Sorted by settling, 2 %, with the observer, most first: A, B; C and D have no such figure and stand last.",
    );
  });
  test("is nothing where nothing is sorted", () => {
    expect(sortingWords(["A"], [[]], least)).toBeNull();
  });
});

test("a figure pressed again turns the order round, then goes back to the one chosen; another starts with its least", () => {
  expect(nextSorting(null, KEY)).toEqual(least);
  expect(nextSorting(least, KEY)).toEqual(most);
  expect(nextSorting(most, KEY)).toBeNull();
  expect(nextSorting(most, "observer rise")).toEqual({ key: "observer rise", order: "least" });
});

describe("revisions chosen to stand side by side", () => {
  const one = (number: number): Picked => ({ id: `id ${number}`, name: "Stiff", number });
  const six = [1, 2, 3, 4, 5, 6].map(one);
  test("keep the order they were chosen in, and leave it when they are pressed again", () => {
    expect(togglePicked([one(2)], one(1))).toEqual([one(2), one(1)]);
    expect(togglePicked([one(2), one(1)], { ...one(2) })).toEqual([one(1)]);
  });
  test("are six at most", () => {
    expect(togglePicked(six, one(7))).toEqual(six);
    expect(togglePicked(six, one(3))).toHaveLength(5);
  });
  test("are counted in words", () => {
    expect([[], six.slice(0, 1), six.slice(0, 3), six].map(pickedWords)).toEqual([
      ...["Choose two to six designs, or revisions of one, to compare.", "1 chosen, one more is needed."],
      ...["3 chosen.", "6 chosen, as many as fit."],
    ]);
  });
});
