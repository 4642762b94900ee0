import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { discretiseCost } from "@/control/discrete/discretise-cost";
import { matrixExponential } from "@/control/response/matrix-exponential";

function expectClose(actual: Matrix, wanted: readonly (readonly number[])[], relative: number) {
  const truth = new Matrix(wanted.map((row) => [...row]));
  expect(Matrix.sub(actual, truth).norm() / truth.norm()).toBeLessThanOrEqual(relative);
}

const doubleIntegrator = {
  A: new Matrix([
    [0, 1],
    [0, 0],
  ]),
  B: new Matrix([[0], [1]]),
};

describe("discretiseCost", () => {
  // Astrom & Wittenmark, Computer-Controlled Systems, 3rd ed. 1997, section 11.1, sampling of the loss function: the integrals
  // written out for the double integrator (the method from memory, the polynomials by hand).
  test.each([0.01, 0.5, 3])("the double integrator sampled every %d s costs what its polynomials say", (h) => {
    const [q1, q2, r] = [3, 0.5, 2];
    const { Ad, Bd, Qd, Sd, Rd } = discretiseCost({
      ...doubleIntegrator,
      Q: Matrix.diag([q1, q2]),
      R: new Matrix([[r]]),
      period: h,
    });
    expect(Ad.to2DArray()).toEqual([
      [1, h],
      [0, 1],
    ]);
    expectClose(Bd, [[(h * h) / 2], [h]], 2e-16);
    expectClose(
      Qd,
      [
        [q1 * h, (q1 * h ** 2) / 2],
        [(q1 * h ** 2) / 2, (q1 * h ** 3) / 3 + q2 * h],
      ],
      3e-16,
    );
    expectClose(Sd, [[(q1 * h ** 3) / 6], [(q1 * h ** 4) / 8 + (q2 * h ** 2) / 2]], 3e-16);
    expectClose(Rd, [[(q1 * h ** 5) / 20 + (q2 * h ** 3) / 3 + r * h]], 3e-16);
  });

  // Franklin, Powell & Workman, Digital Control of Dynamic Systems, 3rd ed. 1998, section 9.4.4, equivalent discrete weights of
  // a continuous cost (from memory); a first-order lag has them in closed form.
  test.each([0.05, 1, 40])("the lag x' = -x + u sampled every %d s has the closed form of its three integrals", (h) => {
    const { Qd, Sd, Rd } = discretiseCost({
      A: new Matrix([[-1]]),
      B: new Matrix([[1]]),
      Q: new Matrix([[1]]),
      R: new Matrix([[0]]),
      period: h,
    });
    const fall = -Math.expm1(-h); // 1 - e^-h
    const fallTwice = -Math.expm1(-2 * h) / 2;
    expect(Qd.get(0, 0) / fallTwice).toBeCloseTo(1, 15);
    expect(Sd.get(0, 0) / ((fall * fall) / 2)).toBeCloseTo(1, 14);
    const input =
      h < 0.1 ? h ** 3 / 3 - h ** 4 / 4 + (7 * h ** 5) / 60 - h ** 6 / 24 + (31 * h ** 7) / 2520 : h - 2 * fall + fallTwice;
    expect(Rd.get(0, 0) / input).toBeCloseTo(1, h < 0.1 ? 8 : 14);
  });

  // Van Loan, Computing integrals involving the matrix exponential, IEEE Trans. Automatic Control 23 (1978) 395-404, theorem 1:
  // exp([-A' Qc; 0 A] h) = [. G; 0 F] gives the integral as F'G. Two other ways to the same numbers.
  test("the block exponential of 1978 gives the same weights", () => {
    const A = new Matrix([
      [0, 1, 0],
      [-2, -0.3, 1],
      [0, 0, -5],
    ]);
    const B = new Matrix([[0], [0], [5]]);
    const Q = new Matrix([
      [4, 1, 0],
      [1, 2, 0],
      [0, 0, 0],
    ]);
    const period = 0.4;
    const { Ad, Qd, Sd, Rd } = discretiseCost({ A, B, Q, R: new Matrix([[0.1]]), S: new Matrix([[0.2], [0], [0]]), period });
    const whole = Matrix.zeros(4, 4);
    whole.setSubMatrix(A, 0, 0);
    whole.setSubMatrix(B, 0, 3);
    const weights = Matrix.zeros(4, 4);
    weights.setSubMatrix(Q, 0, 0);
    weights.set(3, 3, 0.1);
    weights.set(0, 3, 0.2);
    weights.set(3, 0, 0.2);
    const block = Matrix.zeros(8, 8);
    block.setSubMatrix(whole.transpose().mul(-period), 0, 0);
    block.setSubMatrix(Matrix.mul(weights, period), 0, 4);
    block.setSubMatrix(Matrix.mul(whole, period), 4, 4);
    const exponential = matrixExponential(block);
    const F = exponential.subMatrix(4, 7, 4, 7);
    const integral = F.transpose().mmul(exponential.subMatrix(0, 3, 4, 7));
    expectClose(Ad, F.subMatrix(0, 2, 0, 2).to2DArray(), 1e-15);
    expectClose(Qd, integral.subMatrix(0, 2, 0, 2).to2DArray(), 1e-14);
    expectClose(Sd, integral.subMatrix(0, 2, 3, 3).to2DArray(), 1e-14);
    expectClose(Rd, integral.subMatrix(3, 3, 3, 3).to2DArray(), 1e-14);
  });

  test("indefinite weights and periods that are not above zero are refused", () => {
    const plant = { ...doubleIntegrator, R: new Matrix([[1]]), period: 0.1 };
    const codeOf = (more: object) => {
      try {
        discretiseCost({ ...plant, Q: Matrix.eye(2), ...more });
      } catch (error) {
        return error instanceof Error ? error.message : "";
      }
      return "none";
    };
    expect(codeOf({})).toBe("none");
    expect(codeOf({ Q: Matrix.diag([1, -1]) })).toBe("not-positive-semidefinite");
    expect(codeOf({ S: new Matrix([[2], [0]]) })).toBe("not-positive-semidefinite");
    expect(codeOf({ period: 0 })).toBe("bad-option");
    expect(codeOf({ period: Number.NaN })).toBe("bad-option");
    expect(codeOf({ B: new Matrix([[0, 1]]) })).toBe("shape-mismatch");
    expect(
      codeOf({
        A: new Matrix([
          [1e5, 0],
          [0, 1],
        ]),
      }),
    ).toBe("too-large");
  });
});
