import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { discretiseCost } from "@/control/discrete/discretise-cost";
import { holdEquivalent } from "@/control/response/hold-equivalent";
import { matrixExponential } from "@/control/response/matrix-exponential";

function expectClose(actual: Matrix, wanted: readonly (readonly number[])[], relative: number) {
  const truth = new Matrix(wanted.map((row) => [...row]));
  expect(Matrix.sub(actual, truth).norm() / truth.norm()).toBeLessThanOrEqual(relative);
}

function exponentialOf(rows: number[][]): Matrix {
  return matrixExponential(new Matrix(rows));
}

describe("matrixExponential on published matrices", () => {
  // Ward, SIAM J. Numer. Anal. 14 (1977) 600-610, test 2: eigenvalues 20, 30 and 40; digits recomputed with 100 of them.
  test("Ward's second example, symmetric with norm e^40, is right to the last place", () => {
    const a = [29.87942128909879, 0.7815750847907159, -2.289519314033932];
    const b = [0.7815750847907159, 25.72656945571064, 8.680737820540138];
    const c = [-2.289519314033932, 8.680737820540138, 34.39400925519054];
    expectClose(
      exponentialOf([a, b, c]),
      [
        [5496313853692405.0, -1.8231880972009064e16, -3.0475770808580148e16],
        [-1.8231880972009064e16, 6.060522870222131e16, 1.0129184293024866e17],
        [-3.0475770808580148e16, 1.0129184293024866e17, 1.6929441124085002e17],
      ],
      3e-16,
    );
  });

  // Ward, test 4: a shift with 1e-10 in the corner, on which truncated series lose digits.
  test("Ward's fourth example, a shift of order 10 with 1e-10 in its corner, keeps the corner's effect", () => {
    const shift: number[][] = Array.from({ length: 10 }, (_, i) => Array.from({ length: 10 }, (__, j) => (j === i + 1 ? 1 : 0)));
    shift[9][0] = 1e-10;
    const exponential = exponentialOf(shift);
    const factorials = Array.from({ length: 20 }, (_, k) =>
      Array.from({ length: k }, (__, j) => j + 1).reduce((x, y) => x * y, 1),
    );
    for (let j = 0; j < 10; j++) expect(exponential.get(0, j) * factorials[j]).toBeCloseTo(1, 15);
    for (let i = 1; i < 10; i++) expect((exponential.get(i, 0) * factorials[10 - i]) / 1e-10).toBeCloseTo(1, 14);
  });

  // Moler, A balancing act for the matrix exponential, 2012 (from memory): the older scaling lost every digit of it.
  test("the badly scaled matrix of the balancing act keeps all digits of every entry", () => {
    const a = 2e10;
    const b = 4e8 / 6;
    const c = 200 / 3;
    const exponential = exponentialOf([
      [0, 1e-8, 0],
      [-(a + b), -3, a],
      [c, 0, -c],
    ]);
    const published = [
      [0.446849468283175, 1.54044157383952e-9, 0.462811453558774],
      [-5743067.77947947, -0.0152830038686819, -4526542.71278401],
      [0.447722977849494, 1.54270484519591e-9, 0.463480648837651],
    ];
    published.forEach((row, i) => {
      for (const [j, entry] of row.entries()) expect(exponential.get(i, j) / entry).toBeCloseTo(1, 13);
    });
  });

  // Edelman & Strang, Pascal matrices, Amer. Math. Monthly 111 (2004) 189-197: exp of 1, 2, 3, ... below the diagonal.
  test("whole numbers below the diagonal give Pascal's triangle of order 20 without an error", () => {
    const n = 20;
    const exponential = exponentialOf(
      Array.from({ length: n }, (_, i) => Array.from({ length: n }, (__, j) => (i === j + 1 ? i : 0))),
    );
    let row: number[] = Array.from({ length: n }, (_, j) => (j === 0 ? 1 : 0));
    for (let i = 0; i < n; i++) {
      expect(exponential.getRow(i)).toEqual(row);
      row = row.map((entry, j) => entry + (j > 0 ? row[j - 1] : 0));
    }
  });

  // Higham, Functions of Matrices, SIAM 2008, chapter 10 (from memory): a rotation needs no less than its angle in squarings.
  test.each([1, 1000, 123456])("a rotation by %d radians keeps 15 digits", (angle) => {
    const [c, s] = [Math.cos(angle), Math.sin(angle)];
    expectClose(
      exponentialOf([
        [0, angle],
        [-angle, 0],
      ]),
      [
        [c, s],
        [-s, c],
      ],
      3e-16,
    );
  });

  // Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 9.3: the derivative of the exponential stands in the corner of
  // a block triangular matrix. A Jordan block is the smallest case.
  test.each([-3, 0, 2.5])("a Jordan block with %d has e^x and its derivative", (x) => {
    const exponential = exponentialOf([
      [x, 1],
      [0, x],
    ]);
    expect(exponential.get(0, 0)).toBe(exponential.get(0, 1));
    expect(exponential.get(1, 1) / Math.exp(x)).toBeCloseTo(1, 15);
    expect(exponential.get(1, 0)).toBe(0);
  });
});

describe("holdEquivalent on published plants", () => {
  // Astrom & Wittenmark, Computer-Controlled Systems, 3rd ed. 1997, chapter 2, harmonic oscillator (from memory).
  test.each([0.1, 1, 50])("the oscillator w²/(s² + w²) sampled every %d s turns by wh", (h) => {
    const w = 1.5;
    const { A, B } = holdEquivalent({
      A: new Matrix([
        [0, w],
        [-w, 0],
      ]),
      B: new Matrix([[0], [w]]),
      period: h,
    });
    const [c, s] = [Math.cos(w * h), Math.sin(w * h)];
    expectClose(
      A,
      [
        [c, s],
        [-s, c],
      ],
      3e-16,
    );
    expectClose(B, [[2 * Math.sin((w * h) / 2) ** 2], [s]], 3e-16);
  });

  // Franklin, Powell & Workman, Digital Control of Dynamic Systems, 3rd ed. 1998, section 4.3 (from memory): a/(s + a) with a
  // hold is (1 - e^-aT)/(z - e^-aT).
  test.each([1e-9, 0.3, 30])("a lag with a T = %d keeps its gain of one at rest", (aT) => {
    const { A, B } = holdEquivalent({ A: new Matrix([[-aT * 4]]), B: new Matrix([[aT * 4]]), period: 0.25 });
    expect(A.get(0, 0)).toBeCloseTo(Math.exp(-aT), 15);
    expect(B.get(0, 0) / -Math.expm1(-aT)).toBeCloseTo(1, 15);
  });

  // Van Loan, IEEE Trans. Automatic Control 23 (1978) 395-404: the held input's effect is A⁻¹(e^Ah - I)B where A can be inverted.
  test("two coupled lags obey A Γ = (Φ - I) B", () => {
    const A = new Matrix([
      [-3, 1],
      [2, -4],
    ]);
    const B = new Matrix([[1], [0.5]]);
    const held = holdEquivalent({ A, B, period: 0.37 });
    expectClose(A.mmul(held.B), Matrix.sub(held.A, Matrix.eye(2)).mmul(B).to2DArray(), 4e-16);
    // eigenvalues -2 and -5 with the vectors [1; 1] and [1; -2]
    const [slow, fast] = [Math.exp(-0.74), Math.exp(-1.85)];
    expectClose(
      held.A,
      [
        [(2 * slow + fast) / 3, (slow - fast) / 3],
        [(2 * slow - 2 * fast) / 3, (slow + 2 * fast) / 3],
      ],
      3e-16,
    );
  });
});

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
