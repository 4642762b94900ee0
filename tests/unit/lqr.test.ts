import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { weightsFromDeviations } from "../../control/lqr/accepted-deviations";
import { designLqr } from "../../control/lqr/design-lqr";
import { growthFactor } from "../../control/lqr/growth-factor";
import { solveRiccati } from "../../control/riccati/solve-riccati";

const EPS = Number.EPSILON;
const continuous = { kind: "continuous" } as const;
const integrators = {
  A: new Matrix([
    [0, 1],
    [0, 0],
  ]),
  B: new Matrix([[0], [1]]),
  stateWeight: Matrix.eye(2),
  inputWeight: Matrix.eye(1),
};

describe("designLqr", () => {
  test("without a degree of stability is the Riccati solution itself", () => {
    const { A, B, stateWeight: Q, inputWeight: R } = integrators;
    expect(designLqr({ ...integrators, timeBase: continuous })).toEqual(solveRiccati({ A, B, Q, R }));
    expect(designLqr({ ...integrators, timeBase: { kind: "sampled", period: 0.1 } })).toEqual(
      solveRiccati({ A, B, Q, R, sampled: true }),
    );
  });

  test("a scalar plant with degree α: k = a + α + √((a + α)² + 1) (by hand)", () => {
    const scalar = { A: new Matrix([[0.5]]), B: Matrix.eye(1), stateWeight: Matrix.eye(1), inputWeight: Matrix.eye(1) };
    const { K, closedLoopPoles, stabilityDistance } = designLqr({ ...scalar, degreeOfStability: 1.5, timeBase: continuous });
    expect(Math.abs(K.get(0, 0) - (2 + Math.sqrt(5)))).toBeLessThanOrEqual(2 * EPS * 4.3);
    expect(closedLoopPoles[0].re).toBeCloseTo(0.5 - 2 - Math.sqrt(5), 14);
    expect(stabilityDistance).toBe(-closedLoopPoles[0].re);
  });

  test.each([0.5, 2, 10])("every pole is faster than the degree %d, continuous and sampled", (degreeOfStability) => {
    const plain = designLqr({ ...integrators, degreeOfStability, timeBase: continuous });
    for (const { re } of plain.closedLoopPoles) expect(re).toBeLessThan(-degreeOfStability);
    const period = 0.05;
    const A = new Matrix([
      [1, period],
      [0, 1],
    ]);
    const B = new Matrix([[period * period * 0.5], [period]]);
    const sampled = designLqr({ ...integrators, A, B, degreeOfStability, timeBase: { kind: "sampled", period } });
    for (const { re, im } of sampled.closedLoopPoles)
      expect(Math.sqrt(re * re + im * im)).toBeLessThan(Math.exp(-degreeOfStability * period));
  });

  test("a stable mode out of reach that is slower than the degree is refused with its own pole", () => {
    const slow = {
      A: new Matrix([
        [-0.5, 0],
        [0, -3],
      ]),
      B: new Matrix([[0], [1]]),
      stateWeight: Matrix.eye(2),
      inputWeight: Matrix.eye(1),
    };
    expect(designLqr({ ...slow, degreeOfStability: 0.25, timeBase: continuous }).stabilityDistance).toBe(0.5);
    const attempt = () => designLqr({ ...slow, degreeOfStability: 1, timeBase: continuous });
    expect(attempt).toThrow(
      expect.objectContaining({
        code: "not-stabilizable",
        data: expect.objectContaining({ pole: { re: -0.5, im: 0 }, state: 0 }),
      }),
    );
  });

  test("a cross weight that cancels the coupling of the double integrator's cost is honoured", () => {
    const crossWeight = new Matrix([[0], [0.5]]);
    const { A, B, stateWeight: Q, inputWeight: R } = integrators;
    const { K } = designLqr({ ...integrators, crossWeight, timeBase: continuous });
    expect(K.to2DArray()).toEqual(solveRiccati({ A, B, Q, R, S: crossWeight }).K.to2DArray());
    // k1 = 1; k2² = q2 + 2 k1 - 0 with the cross weight folded in: k2 = √3 still, X22 = k2 - 0.5.
    expect(K.get(0, 0)).toBe(1);
    expect(K.get(0, 1)).toBeCloseTo(Math.sqrt(3), 15);
  });

  test.each([-1, Number.NaN, Number.POSITIVE_INFINITY])("a degree of stability of %d is refused", (degreeOfStability) => {
    const attempt = () => designLqr({ ...integrators, degreeOfStability, timeBase: continuous });
    expect(attempt).toThrow(expect.objectContaining({ code: "bad-option" }));
  });

  test("a sampled plant without a period is refused", () => {
    const attempt = () => designLqr({ ...integrators, timeBase: { kind: "sampled", period: 0 } });
    expect(attempt).toThrow(expect.objectContaining({ code: "period-missing" }));
  });
});

test("growthFactor agrees with the exponential to 1e-12 and is exactly one at zero", () => {
  expect(growthFactor(0)).toBe(1);
  for (let x = 0.01; x <= 30; x += 0.37) expect(Math.abs(growthFactor(x) / Math.exp(x) - 1)).toBeLessThan(1e-12);
});

describe("weightsFromDeviations", () => {
  test("weighs each signal by one over its squared deviation, and null by nothing", () => {
    const { state, input } = weightsFromDeviations([0.5, null, 4], [2, 0.25]);
    expect(state.to2DArray()).toEqual([
      [4, 0, 0],
      [0, 0, 0],
      [0, 0, 0.0625],
    ]);
    expect(input.to2DArray()).toEqual([
      [0.25, 0],
      [0, 16],
    ]);
  });

  test.each([
    ["states", [1, 0], [1], 1],
    ["states", [-1], [1], 0],
    ["states", [1e-200], [1], 0],
    ["inputs", [1], [1, Number.POSITIVE_INFINITY], 1],
    ["inputs", [1], [Number.NaN], 0],
  ])("refuses an impossible deviation among the %s, with its index", (option, states, inputs, index) => {
    expect(() => weightsFromDeviations(states, inputs)).toThrow(
      expect.objectContaining({ code: "bad-option", data: expect.objectContaining({ option, index }) }),
    );
  });
});
