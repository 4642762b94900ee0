import { describe, expect, test } from "vitest";
import { springWords } from "@/components/designs/gains/spring-words";
import { ratePairs, virtualSprings } from "@/control/design/virtual-springs";
import type { PlantModel } from "@/control/plant/model";
import { coupledModel } from "../helpers/coupled-model";

/** Of the mass 12, 2; 2, 8. */
const DETERMINANT = 12 * 8 - 2 * 2;
const INVERSE_MASS = [
  [8 / DETERMINANT, -2 / DETERMINANT],
  [-2 / DETERMINANT, 12 / DETERMINANT],
];

/** Two positions, two rates, inputs that push along the positions: B is the inverse of a mass. */
function pushed(more: Partial<PlantModel> = {}): PlantModel {
  return coupledModel({
    A: [
      [0, 0, 1, 0],
      [0, 0, 0, 1],
      [-40, 12, -0.4, 0],
      [12, -40, 0, -0.4],
    ],
    B: [[0, 0], [0, 0], ...INVERSE_MASS],
    ...more,
  });
}

describe("positions and their rates", () => {
  test("are found where a state is the integral of one other, whatever their units", () => {
    expect(ratePairs(pushed())).toEqual([
      { position: 0, rate: 2, factor: 1 },
      { position: 1, rate: 3, factor: 1 },
    ]);
    const millimetres = pushed({ A: pushed().A.map((row, i) => (i === 0 ? [0, 0, 1000, 0] : row)) });
    expect(ratePairs(millimetres)[0]).toEqual({ position: 0, rate: 2, factor: 1000 });
  });

  test("are none where the state decays by itself, an input reaches it, or the plant is sampled", () => {
    const A = pushed().A;
    const leaky = pushed({ A: A.map((row, i) => (i === 0 ? [-1, 0, 1, 0] : row)) });
    expect(ratePairs(leaky).map(({ position }) => position)).toEqual([1]);
    const driven = pushed({ B: [[1, 0], [0, 0], ...INVERSE_MASS] });
    expect(ratePairs(driven).map(({ position }) => position)).toEqual([1]);
    const sampled = pushed({ timeBase: { kind: "sampled", period: 0.01 } });
    expect(virtualSprings(sampled, [[0, 0, 0, 0]])).toBeNull();
  });
});

describe("a feedback read as springs and dampers", () => {
  const words = (K: number[][], model = pushed()) => {
    const springs = virtualSprings(model, K);
    if (!springs) throw new Error("no pairs");
    return springWords(springs, model.states).join(" ");
  };

  test("has the gains of positions as stiffness and those of rates as damping", () => {
    const K = [
      [100, 5, 20, 1],
      [4, 80, 2, 16],
    ];
    const springs = virtualSprings(pushed(), K);
    expect(springs?.stiffness).toEqual([
      [100, 5],
      [4, 80],
    ]);
    expect(springs?.damping).toEqual([
      [20, 1],
      [2, 16],
    ]);
    expect(springs?.energy).toMatchObject({ dissipates: "always", restores: "always" });
    // |antisymmetric part| = 0.5·√2, |K| = √(100² + 5² + 4² + 80²)
    expect(springs?.energy?.unsymmetric).toBeCloseTo(Math.SQRT1_2 / Math.sqrt(16441), 12);
  });

  test("says where energy is fed in, and where springs push away", () => {
    expect(
      words([
        [100, 0, 20, 0],
        [0, 80, 0, 16],
      ]),
    ).toBe("The dampers take energy out of every motion. The springs pull back in every direction.");
    expect(
      words([
        [-100, 0, 20, 0],
        [0, 80, 0, -16],
      ]),
    ).toBe(
      "The dampers take energy out of some motions and feed it into others. The springs pull back in some directions and push away in others.",
    );
    expect(
      words([
        [-100, 0, -20, 0],
        [0, -80, 0, 0],
      ]),
    ).toBe("The dampers take energy out of no motion. The springs pull back in no direction.");
    expect(
      words([
        [100, 50, 20, 0],
        [-50, 80, 0, 16],
      ]),
    ).toMatch(/48 % of the stiffness is unsymmetric/);
  });

  test("says nothing about energy where the inputs do not push along the positions one for one", () => {
    const K = [
      [100, 0, 20, 0],
      [0, 80, 0, 16],
    ];
    const crossed = pushed({
      B: [
        [0, 0],
        [0, 0],
        [0, 1],
        [1, 0.5],
      ],
    });
    expect(words(K, crossed)).toMatch(/^The inputs do not push along these positions one for one/);
    const backwards = pushed({ B: [[0, 0], [0, 0], ...INVERSE_MASS.map((row) => row.map((entry) => -entry))] });
    expect(virtualSprings(backwards, K)?.energy).toBeNull();
  });

  test("names the states it leaves out", () => {
    const leaky = pushed({ A: pushed().A.map((row, i) => (i === 0 ? [-1, 0, 1, 0] : row)) });
    expect(
      words(
        [
          [1, 2, 3, 4],
          [5, 6, 7, 8],
        ],
        leaky,
      ),
    ).toMatch(/Not read as a spring or a damper: the gains of x1, v1\.$/);
  });
});
