import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { frobeniusNorm } from "../../control/linalg/norms";
import type { Complex } from "../../control/plant/model";
import { chainPlans } from "../../control/poles/chain-plan";
import { placePoles } from "../../control/poles/place-poles";
import { groupPoles } from "../../control/poles/wanted-poles";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const real = (...values: number[]): Complex[] => values.map((re) => ({ re, im: 0 }));
const pairs = (count: number, re: number, im: number): Complex[] =>
  Array.from({ length: count }, () => [
    { re, im },
    { re, im: -im },
  ]).flat();

describe("poles repeated beyond the rank of B, where dependent eigenvectors are allowed", () => {
  test("two coupled double integrators with two inputs come to rest in two samples, not in four", () => {
    const h = 0.1;
    const A = new Matrix([
      [1, h, 0.01, 0],
      [0, 1, 0, 0],
      [0, 0, 1, h],
      [0, 0, 0, 1],
    ]);
    const B = new Matrix([
      [0.005, 0],
      [h, 0],
      [0, 0.005],
      [0, h],
    ]);
    const { K, method, poleError } = placePoles({ A, B, poles: real(0, 0, 0, 0), allowDefective: true });
    const closed = Matrix.sub(A, B.mmul(K));
    expect(frobeniusNorm(closed.mmul(closed))).toBeLessThan(64 * Number.EPSILON * frobeniusNorm(closed) ** 2);
    expect(method).toContain("chains");
    expect(poleError).toBeLessThan(1e-6);
  });

  test("errors are those of the shortest chains: the square root of rounding for two, the cube root for three", () => {
    const random = seededUniform(3);
    const A = seededMatrix(random, 6, 6);
    const B = seededMatrix(random, 6, 2);
    const twos = placePoles({ A, B, poles: real(-1, -1, -1, -1, -2, -3), allowDefective: true });
    const threes = placePoles({ A, B, poles: real(-1, -1, -1, -1, -1, -1), allowDefective: true });
    expect(twos.poleError).toBeLessThan(1e-5);
    expect(threes.poleError).toBeGreaterThan(twos.poleError);
    expect(threes.poleError).toBeLessThan(1e-3);
    for (const { conditioning, poleShiftPerGainDigit } of [twos, threes]) {
      expect([conditioning, poleShiftPerGainDigit]).toEqual([null, null]);
    }
  });

  test("a repeated pair, and a plant whose second input has but one state to itself", () => {
    const random = seededUniform(8);
    const A = seededMatrix(random, 6, 6);
    const B = seededMatrix(random, 6, 2);
    expect(placePoles({ A, B, poles: pairs(3, -1, 1), allowDefective: true }).poleError).toBeLessThan(1e-5);
    const chain = {
      A: new Matrix([
        [0, 1, 0, 0],
        [0, 0, 1, 0],
        [1, 0, 0, 0],
        [0, 0, 0, 3],
      ]),
      B: new Matrix([
        [0, 0],
        [0, 0],
        [1, 0],
        [0, 1],
      ]),
    };
    const { poleError, method } = placePoles({ ...chain, poles: real(-1, -1, -1, -1), allowDefective: true });
    expect(method).toContain("chains");
    expect(poleError).toBeLessThan(1e-3);
  });

  test("two runs give the same bits", () => {
    const random = seededUniform(4);
    const problem = { A: seededMatrix(random, 5, 5), B: seededMatrix(random, 5, 2), poles: real(-1, -1, -1, -2, -2) };
    const gain = () => placePoles({ ...problem, allowDefective: true }).K.to1DArray();
    expect(gain()).toEqual(gain());
  });
});

describe("a plan of chains", () => {
  const plans = (poles: Complex[], rank: number) => chainPlans(groupPoles(poles, poles.length), rank);

  test("starts with the most even chains, as many as there are inputs", () => {
    expect(plans(real(-1, -1, -1, -2), 2)[0]).toEqual([[0, 1], [2], [3]]);
    expect(plans(real(-1, -2, -1, -1), 3)[0]).toEqual([[0], [2], [3], [1]]);
  });

  test("ends with one chain, and names each place once in every plan", () => {
    const all = plans(real(-1, -1, -1, -1, -1), 3);
    expect(all.at(-1)).toEqual([[0, 1, 2, 3, 4]]);
    for (const plan of all) expect(plan.flat().toSorted()).toEqual([0, 1, 2, 3, 4]);
    expect(new Set(all.map((plan) => JSON.stringify(plan))).size).toBe(all.length);
  });
});
