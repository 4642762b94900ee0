import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { checkPlant } from "@/control/plant/check-plant";
import type { Rows, TimeBase } from "@/control/plant/model";
import { assignLeast } from "@/control/structure/assign-least";
import { relativeGainAtRest } from "@/control/structure/relative-gain-at-rest";
import { seededUniform } from "../helpers/seeded";
import { smallPlant } from "../helpers/small-plant";

const CONTINUOUS = { kind: "continuous" } as const;
function gains(A: Rows, B: Rows, H: Rows, timeBase: TimeBase = CONTINUOUS) {
  const matrix = (rows: Rows) => new Matrix(rows.map((row) => [...row]));
  const { array, limit } = relativeGainAtRest(matrix(A), matrix(B), matrix(H), Matrix.zeros(H.length, B[0].length), timeBase);
  return { array: array?.to2DArray() ?? null, limit };
}

const IDENTITY = [
  [1, 0],
  [0, 1],
];

test("two integrators behind a mixing of the inputs have the relative gains of the mixing", () => {
  const B = [
    [2, 1],
    [1, 3],
  ];
  const zero = [
    [0, 0],
    [0, 0],
  ];
  const { array, limit } = gains(zero, B, IDENTITY);
  expect(limit).toBe(true);
  expect(array?.[0][0]).toBeCloseTo(6 / 5, 14);
  expect(array?.[0][1]).toBeCloseTo(-1 / 5, 14);
  // Sampled, the same with poles at 1.
  expect(gains(IDENTITY, B, IDENTITY, { kind: "sampled", period: 0.1 }).array?.[0][0]).toBeCloseTo(6 / 5, 14);
});

test("one channel that integrates and one that does not are weighed by their leading powers", () => {
  // [2/s, 1/(s + 1); 3/s, 4/(s + 1)] behaves as [2/s, 1; 3/s, 4]: 8/5 on the diagonal.
  const A = [
    [0, 0],
    [0, -1],
  ];
  const H = [
    [2, 1],
    [3, 4],
  ];
  const { array, limit } = gains(A, IDENTITY, H);
  expect(limit).toBe(true);
  expect(array?.[0][0]).toBeCloseTo(8 / 5, 13);
  expect(array?.[1][0]).toBeCloseTo(-3 / 5, 13);
});

test("a chain 1/s² across a diagonal of 1/s leaves the diagonal pairing alone", () => {
  const chain = [
    [0, 1],
    [0, 0],
  ];
  expect(gains(chain, IDENTITY, IDENTITY)).toEqual({ array: IDENTITY, limit: true });
});

test("a commanded rate, whose gains vanish at rest, is weighed by what remains of them", () => {
  // z1 is the rate of a spring-held mass: s (2 u1 + u2) / (s² + s + 1); z2 = (u1 + 3 u2) / (s + 1).
  const A = [
    [0, 1, 0],
    [-1, -1, 0],
    [0, 0, -1],
  ];
  const B = [
    [0, 0],
    [2, 1],
    [1, 3],
  ];
  const H = [
    [0, 1, 0],
    [0, 0, 1],
  ];
  const { array, limit } = gains(A, B, H);
  expect(limit).toBe(true);
  expect(array?.[0][0]).toBeCloseTo(6 / 5, 13);
});

test("two masses on a spring move as one towards rest: relative gains grow without bound, and the words say so", () => {
  const A = [
    [0, 0, 1, 0],
    [0, 0, 0, 1],
    [-1, 1, 0, 0],
    [1, -1, 0, 0],
  ];
  const B = [
    [0, 0],
    [0, 0],
    [1, 0],
    [0, 1],
  ];
  const H = [
    [1, 0, 0, 0],
    [0, 1, 0, 0],
  ];
  expect(gains(A, B, H)).toEqual({ array: null, limit: true });
  const { coupling } = checkPlant(smallPlant({ A, B, C: H }));
  expect(coupling).toMatchObject({ value: { relativeGain: null, relativeGainBasis: "no-limit" } });
});

test("the least assignment of whole numbers is that of every order tried", () => {
  const random = seededUniform(9);
  const orders = [
    [0, 1, 2],
    [0, 2, 1],
    [1, 0, 2],
    [1, 2, 0],
    [2, 0, 1],
    [2, 1, 0],
  ];
  for (let round = 0; round < 60; round++) {
    const cost = Array.from({ length: 3 }, () => Array.from({ length: 3 }, () => Math.floor(7 * random()) - 3));
    const { rows, columns } = assignLeast(cost);
    const least = Math.min(...orders.map((order) => order.reduce((sum, j, i) => sum + cost[i][j], 0)));
    expect([...rows, ...columns].reduce((sum, x) => sum + x, 0)).toBe(least);
    for (let i = 0; i < 3; i++) for (let j = 0; j < 3; j++) expect(rows[i] + columns[j]).toBeLessThanOrEqual(cost[i][j]);
  }
});
