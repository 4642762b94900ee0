import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import * as core from "@/control/index";
import { CORE_CALLS } from "@/lib/commands/fuzz/core-calls";
import { isExactlyStable } from "@/lib/commands/fuzz/exact-stability";
import { hostileProblem } from "@/lib/commands/fuzz/hostile-problem";
import { strayNumber } from "@/lib/commands/fuzz/stray-number";
import { watchFuzz } from "@/lib/commands/fuzz/watch-fuzz.mjs";

/** Eleven matrices each; `npm run fuzz:core` goes on for a million matrices. */
const PLANTS = 1_200;

/** Speak of what others computed: tried beside those, on their results and refusals. */
const SPOKEN = ["describeChecks", "describeMode", "explainRefusal"];

/** Takes no numbers; `tests/property/accelerator.test.ts` tries it. */
const SWITCHES = ["switchAccelerator"];

test("every function that the core exports is tried on hostile plants: a new one needs a line in lib/commands/fuzz/core-calls.ts", () => {
  const functions = Object.entries(core).flatMap(([name, value]) => (typeof value === "function" ? [name] : []));
  const tried = [...Object.keys(CORE_CALLS), ...SPOKEN, ...SWITCHES, "NumericalError"];
  expect(functions.filter((name) => !tried.includes(name))).toEqual([]);
  expect(Object.keys(CORE_CALLS).filter((name) => !functions.includes(name))).toEqual([]);
});

test("13,000 sparse, defective, badly scaled, huge and tiny matrices bring no hang, no stray number, no odd error and no gain that fails", async () => {
  const { findings, answered } = await watchFuzz({ from: 1, cases: PLANTS, threads: 1 });
  expect(findings).toEqual([]);
  // Refusing everything would find nothing either.
  for (const name of Object.keys(CORE_CALLS)) expect(answered[name] ?? 0, name).toBeGreaterThan(PLANTS / 20);
}, 400_000);

test("the same seed gives the same plant", () => {
  for (const seed of [1, 77, 4_711]) expect(hostileProblem(seed)).toEqual(hostileProblem(seed));
});

const loop = (rows: number[][], sampled = false) => {
  const A = new Matrix(rows);
  return isExactlyStable(A, Matrix.zeros(A.rows, 1), Matrix.zeros(1, A.rows), sampled);
};

test("the judge of gains tells stability exactly, without the core", () => {
  expect(loop([[-1]])).toBe(true);
  expect(loop([[0]])).toBe(false);
  expect(loop([[-5e-324]])).toBe(true);
  // s³ + s² + s + 1 has a pair on the axis; one unit in the last place decides.
  const companion = (last: number) =>
    loop([
      [0, 1, 0],
      [0, 0, 1],
      [-1, -1, -last],
    ]);
  expect(companion(1)).toBe(false);
  expect(companion(1 + Number.EPSILON)).toBe(true);
  expect(companion(1 - Number.EPSILON / 2)).toBe(false);
  // z² - c: the roots are ±√c.
  const pair = (c: number) =>
    loop(
      [
        [0, c],
        [1, 0],
      ],
      true,
    );
  expect(pair(1)).toBe(false);
  expect(pair(-1)).toBe(false);
  expect(pair(1 - Number.EPSILON / 2)).toBe(true);
  expect(pair(1 + Number.EPSILON)).toBe(false);
  // The gain takes part: 3 - 2 K with K = 2 and K = 1.5.
  const [A, B] = [new Matrix([[3]]), new Matrix([[2]])];
  expect(isExactlyStable(A, B, new Matrix([[2]]), false)).toBe(true);
  expect(isExactlyStable(A, B, new Matrix([[1.5]]), false)).toBe(false);
});

test("the judge of results finds a stray number at any depth", () => {
  expect(strayNumber({ a: [1, { b: new Matrix([[1, Number.NaN]]) }] })).toBe("/a/1/b/1");
  expect(strayNumber({ samples: { 0: Float64Array.of(1, Number.POSITIVE_INFINITY) } })).toBe("/samples/0/1");
  expect(strayNumber({ a: [1, null, "NaN", undefined, true], f: () => Number.NaN })).toBeNull();
});
