import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import type { SignalFigures } from "@/control/design/evidence";
import { holdEquivalent } from "@/control/response/hold-equivalent";
import { matrixExponential } from "@/control/response/matrix-exponential";
import { respond } from "@/control/response/respond";

function expectClose(actual: Matrix, wanted: readonly (readonly number[])[], relative: number) {
  const truth = new Matrix(wanted.map((row) => [...row]));
  expect(Matrix.sub(actual, truth).norm() / truth.norm()).toBeLessThanOrEqual(relative);
}

describe("matrixExponential", () => {
  // Moler & Van Loan, Nineteen dubious ways, twenty-five years later, SIAM Review 45 (2003) 3-49, section 3: eigenvalues -1 and -17.
  // Condition of the exponential about 440, so 440 ε.
  test("the matrix on which the Taylor series fails comes out to 1e-13", () => {
    const e1 = Math.exp(-1);
    const e17 = Math.exp(-17);
    const exact = [
      [-2 * e1 + 3 * e17, (3 * e1 - 3 * e17) / 2],
      [-4 * e1 + 4 * e17, 3 * e1 - 2 * e17],
    ];
    expectClose(
      matrixExponential(
        new Matrix([
          [-49, 24],
          [-64, 31],
        ]),
      ),
      exact,
      1e-13,
    );
    expect(
      matrixExponential(
        new Matrix([
          [-49, 24],
          [-64, 31],
        ]),
      ).get(0, 0),
    ).toBeCloseTo(-0.735759, 6); // as printed there
  });

  // Higham, SIAM J. Matrix Anal. Appl. 26 (2005) 1179-1193; Al-Mohy & Higham 31 (2009) 970-989, section 1: overscaling.
  test.each([1e2, 1e6, 1e10, 1e30])("a large one-way coupling of %d costs no digits", (b) => {
    const exponential = matrixExponential(
      new Matrix([
        [1, b],
        [0, -1],
      ]),
    );
    expect(exponential.get(0, 0) / Math.E).toBeCloseTo(1, 14);
    expect(exponential.get(0, 1) / (b * Math.sinh(1))).toBeCloseTo(1, 14);
    expect(exponential.get(1, 1) * Math.E).toBeCloseTo(1, 14);
    expect(exponential.get(1, 0)).toBe(0);
  });

  // Ward, Numerical computation of the matrix exponential with accuracy estimate, SIAM J. Numer. Anal. 14 (1977) 600-610,
  // example 1; digits recomputed in higher precision.
  test("the defective matrix of Ward's first example comes out to 1e-14", () => {
    const exact = [
      [147.86662244637003, 183.7651386463684, 71.79703239999643],
      [127.78108552318213, 183.7651386463684, 91.88256932318416],
      [127.78108552318204, 163.67960172318047, 111.96810624637124],
    ];
    expectClose(
      matrixExponential(
        new Matrix([
          [4, 2, 0],
          [1, 4, 1],
          [1, 1, 4],
        ]),
      ),
      exact,
      1e-13,
    );
  });

  // Laub, SIAM Review 52 (2010) 779-781.
  test("a companion matrix with eigenvalues -1.0001 and -39 keeps 14 digits", () => {
    const root = Math.sqrt(400 - 39);
    const [s1, s2] = [-20 + root, -20 - root];
    const [e1, e2] = [Math.exp(s1), Math.exp(s2)];
    const exact = [
      [(s1 * e2 - s2 * e1) / (s1 - s2), (e1 - e2) / (s1 - s2)],
      [(s1 * s2 * (e2 - e1)) / (s1 - s2), (s1 * e1 - s2 * e2) / (s1 - s2)],
    ];
    expectClose(
      matrixExponential(
        new Matrix([
          [0, 1],
          [-39, -40],
        ]),
      ),
      exact,
      1e-14,
    );
  });

  test("a nilpotent shift gives its finite series exactly", () => {
    const N = new Matrix([
      [0, 6, 0, 0],
      [0, 0, 6, 0],
      [0, 0, 0, 6],
      [0, 0, 0, 0],
    ]);
    expect(matrixExponential(N).to2DArray()).toEqual([
      [1, 6, 18, 36],
      [0, 1, 6, 18],
      [0, 0, 1, 6],
      [0, 0, 0, 1],
    ]);
  });
});

describe("holdEquivalent", () => {
  // Astrom & Wittenmark, Computer-Controlled Systems, 3rd ed. 1997, examples 2.1 to 2.3.
  test("the double integrator is [1 h; 0 1], [h²/2; h]", () => {
    const { A, B } = holdEquivalent({
      A: new Matrix([
        [0, 1],
        [0, 0],
      ]),
      B: new Matrix([[0], [1]]),
      period: 0.1,
    });
    expect(A.to2DArray()).toEqual([
      [1, 0.1],
      [0, 1],
    ]);
    expectClose(B, [[0.005], [0.1]], 1e-16);
  });

  test("the motor 1/(s(s+1)) is [e^-h 0; 1-e^-h 1], [1-e^-h; h-1+e^-h]", () => {
    for (const h of [1e-3, 0.1, 1, 10]) {
      const { A, B } = holdEquivalent({
        A: new Matrix([
          [-1, 0],
          [1, 0],
        ]),
        B: new Matrix([[1], [0]]),
        period: h,
      });
      expectClose(
        A,
        [
          [Math.exp(-h), 0],
          [-Math.expm1(-h), 1],
        ],
        1e-15,
      );
      expectClose(B, [[-Math.expm1(-h)], [h < 0.01 ? h * h * (1 / 2 - h / 6 + (h * h) / 24) : h + Math.expm1(-h)]], 1e-12);
    }
  });
});

/** One loop without feedback: the plant itself is stable and its step response is what is wanted. */
function stepOf(A: number[][], B: number[][], H: number[][], J: number[][] = [[0]]): SignalFigures {
  const zero = Matrix.zeros(1, A.length);
  const evidence = respond({
    plant: { A: new Matrix(A), B: new Matrix(B), C: new Matrix(H), D: new Matrix(J), H: new Matrix(H), J: new Matrix(J) },
    period: null,
    K: zero,
    F: Matrix.eye(1),
    observer: null,
    experiments: { amplitudes: [1], initialState: A.map(() => 0), inputDisturbance: [0] },
    room: [{ up: null, down: null }],
    horizon: null,
  });
  return evidence.figures[0].commanded[0];
}

/** Where a function changes sign between two places, by halving. */
function rootOf(f: (t: number) => number, low: number, high: number): number {
  let [a, b] = [low, high];
  for (let k = 0; k < 100; k++) {
    const middle = (a + b) / 2;
    if (f(a) > 0 === f(middle) > 0) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

describe("figures of closed forms", () => {
  test("a first-order lag rises in ln 9 and settles in ln 50 time constants, approaching its peak only", () => {
    const { rise, settling, overshoot, peak, peakAt } = stepOf([[-4]], [[4]], [[1]]);
    expect(rise).toBeCloseTo(Math.log(9) / 4, 13);
    expect(settling).toBeCloseTo(Math.log(50) / 4, 13);
    expect({ overshoot, peak, peakAt }).toEqual({ overshoot: 0, peak: 1, peakAt: null });
  });

  // Franklin, Powell & Emami-Naeini, Feedback Control of Dynamic Systems, section 3.4: overshoot e^(-πζ/√(1-ζ²)) at t = π/ω_d;
  // 16.3 % at ζ = 0.5 and 4.3 % at ζ = 0.707 (from memory).
  test.each([0.02, 0.1, 0.3, 0.5, 0.7, 0.9])(
    "a second-order loop with damping %d overshoots and settles as its closed form",
    (damping) => {
      const w = 3;
      const wd = w * Math.sqrt(1 - damping * damping);
      const step = (t: number) => 1 - Math.exp(-damping * w * t) * (Math.cos(wd * t) + ((damping * w) / wd) * Math.sin(wd * t));
      const figures = stepOf(
        [
          [0, 1],
          [-w * w, -2 * damping * w],
        ],
        [[0], [w * w]],
        [[1, 0]],
      );
      expect(figures.overshoot).toBeCloseTo(100 * Math.exp((-Math.PI * damping) / Math.sqrt(1 - damping * damping)), 10);
      expect(figures.peakAt).toBeCloseTo(Math.PI / wd, 6);
      expect(figures.rise).toBeCloseTo(
        rootOf((t) => step(t) - 0.9, 0, Math.PI / wd) - rootOf((t) => step(t) - 0.1, 0, Math.PI / wd),
        11,
      );
      const lastExtreme =
        Array.from({ length: 400 }, (_, k) => (k * Math.PI) / wd).findLast((t) => Math.abs(step(t) - 1) > 0.02) ?? 0;
      const exit = rootOf((t) => Math.abs(step(t) - 1) - 0.02, lastExtreme, lastExtreme + Math.PI / wd);
      expect(figures.settling).toBeCloseTo(exit, 9);
    },
  );

  test("the textbook figures 16.3 % and 4.3 % come out", () => {
    expect(
      stepOf(
        [
          [0, 1],
          [-1, -1],
        ],
        [[0], [1]],
        [[1, 0]],
      ).overshoot,
    ).toBeCloseTo(16.3, 1);
    expect(
      stepOf(
        [
          [0, 1],
          [-1, -Math.SQRT2],
        ],
        [[0], [1]],
        [[1, 0]],
      ).overshoot,
    ).toBeCloseTo(4.3, 1);
  });

  test("a double pole, which has one eigenvector only, settles where 1 - (1 + t) e^-t enters the band", () => {
    const figures = stepOf(
      [
        [-1, 1],
        [0, -1],
      ],
      [[0], [1]],
      [[1, 0]],
    );
    expect(figures.settling).toBeCloseTo(
      rootOf((t) => (1 + t) * Math.exp(-t) - 0.02, 2, 20),
      11,
    );
    expect(figures.overshoot).toBe(0);
  });

  test("(1 - s)/(1 + s)² first goes 2/√e - 1 the wrong way, at t = 1/2", () => {
    const { undershoot, overshoot, settling } = stepOf(
      [
        [0, 1],
        [-1, -2],
      ],
      [[0], [1]],
      [[1, -1]],
    );
    expect(undershoot).toBeCloseTo(100 * (2 * Math.exp(-0.5) - 1), 10);
    expect(overshoot).toBe(0);
    expect(settling).toBeCloseTo(
      rootOf((t) => (1 + 2 * t) * Math.exp(-t) - 0.02, 3, 20),
      10,
    );
  });

  test("a direct path jumps at once: (s + 2)/(s + 1) starts at 1 and ends at 2", () => {
    const { rise, settling, final, peakAt } = stepOf([[-1]], [[1]], [[1]], [[1]]);
    expect(final).toBe(2);
    expect(rise).toBeCloseTo(Math.log(1 / 0.2), 12);
    expect(settling).toBeCloseTo(Math.log(1 / 0.04), 12);
    expect(peakAt).toBeNull();
  });

  /** w² / (s² + 2 ζ w s + w²) */
  const secondOrder = (damping: number, w = 1) =>
    stepOf(
      [
        [0, 1],
        [-w * w, -2 * damping * w],
      ],
      [[0], [w * w]],
      [[1, 0]],
    );

  // Overshoot by damping: Ogata, Modern Control Engineering, 5th ed. 2010, figure 5-11; Dorf & Bishop, Modern Control Systems,
  // table of percent overshoot (both from memory).
  test.each([
    [0.1, 72.9],
    [0.2, 52.7],
    [0.3, 37.2],
    [0.4, 25.4],
    [0.6, 9.5],
    [0.7, 4.6],
    [0.8, 1.5],
  ])("damping %d overshoots by %d %% in the tables", (damping, percent) => {
    expect(secondOrder(damping).overshoot).toBeCloseTo(percent, 1);
  });

  // Rise time from 10 to 90 % in units of 1/w: Nise, Control Systems Engineering, figure 4.16 (from memory).
  test.each([
    [0.1, 1.104],
    [0.2, 1.203],
    [0.3, 1.321],
    [0.4, 1.463],
    [0.5, 1.638],
    [0.6, 1.854],
    [0.7, 2.126],
    [0.8, 2.467],
    [0.9, 2.883],
  ])("damping %d rises in %d / w in the table", (damping, rise) => {
    expect(Math.abs((secondOrder(damping).rise ?? 0) - rise)).toBeLessThanOrEqual(1.5e-3);
    expect((secondOrder(damping, 250).rise ?? 0) * 250).toBeCloseTo(secondOrder(damping).rise ?? 0, 12);
  });

  // Nise, Control Systems Engineering, example 4.5 (from memory): 100/(s² + 15 s + 100).
  test("Nise's example peaks after 0.475 s, 2.838 % beyond, and rises in 0.23 s", () => {
    const { overshoot, peakAt, rise } = secondOrder(0.75, 10);
    expect(overshoot).toBeCloseTo(2.838, 3);
    expect(peakAt).toBeCloseTo(0.475, 3);
    expect(rise).toBeCloseTo(0.23, 2);
  });

  // Step overshoot of Butterworth's low-pass filters: Zverev, Handbook of Filter Synthesis, Wiley 1967 (from memory).
  test.each([
    [[1, Math.SQRT2, 1], 4.32],
    [[1, 2, 2, 1], 8.15],
    [[1, 2.613125929752753, 3.414213562373095, 2.613125929752753, 1], 10.83],
  ])("the Butterworth polynomial %j overshoots by %d %%", (polynomial, percent) => {
    const n = polynomial.length - 1;
    const A: number[][] = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (__, j) => (j === i + 1 ? 1 : 0)));
    for (let j = 0; j < n; j++) A[n - 1][j] = -polynomial[n - j];
    const B = A.map((_, i) => [i === n - 1 ? 1 : 0]);
    expect(stepOf(A, B, [A.map((_, j) => (j === 0 ? 1 : 0))]).overshoot).toBeCloseTo(percent, 2);
  });

  // The spike 4 (e^-1000t - e^-2000t) on a slow rise has its top near ln 2 / 1000.
  test("a spike a thousand times shorter than the rest is not missed", () => {
    const spike = stepOf(
      [
        [-1, 0, 0],
        [0, -1000, 0],
        [0, 0, -2000],
      ],
      [[1], [1000], [2000]],
      [[0.5, -4, 4]],
    );
    const value = (t: number) => 0.5 * (1 - Math.exp(-t)) + 4 * (Math.exp(-1000 * t) - Math.exp(-2000 * t));
    const slope = (t: number) => 0.5 * Math.exp(-t) - 4000 * Math.exp(-1000 * t) + 8000 * Math.exp(-2000 * t);
    const at = rootOf(slope, 1e-4, 2e-3);
    expect(spike.peakAt).toBeCloseTo(at, 9);
    expect(spike.overshoot).toBeCloseTo(200 * value(at) - 100, 8);
  });

  // Two slow, nearly equal lags lift the response by 1e-5 long after it has risen.
  test("a peak of 0.001 % a hundred time constants later is not missed", () => {
    const late = stepOf(
      [
        [-1, 0, 0],
        [0, -0.01, 0],
        [0, 0, -0.0101],
      ],
      [[1], [0.01], [0.0101]],
      [[1, -0.003, 0.003]],
    );
    const value = (t: number) => 1 - Math.exp(-t) + 0.003 * (Math.exp(-0.01 * t) - Math.exp(-0.0101 * t));
    const slope = (t: number) => Math.exp(-t) - 0.00003 * Math.exp(-0.01 * t) + 0.0000303 * Math.exp(-0.0101 * t);
    const at = rootOf(slope, 50, 300);
    expect(late.peakAt).toBeCloseTo(at, 3);
    expect(late.overshoot).toBeCloseTo(100 * (value(at) - 1), 9);
  });

  // 1/(s + 1)^8, one eigenvector for eight eigenvalues: 1 - e^-t (1 + t + ... + t^7/7!).
  test("eight equal lags rise and settle where the incomplete gamma function says", () => {
    const A = Array.from({ length: 8 }, (_, i) => Array.from({ length: 8 }, (__, j) => (i === j ? -1 : i === j + 1 ? 1 : 0)));
    const B = A.map((_, i) => [i === 0 ? 1 : 0]);
    const { rise, settling, overshoot } = stepOf(A, B, [A.map((_, j) => (j === 7 ? 1 : 0))]);
    const missing = (t: number) => Math.exp(-t) * [7, 6, 5, 4, 3, 2, 1].reduce((sum, k) => 1 + (t / k) * sum, 1);
    const reached = (part: number) => rootOf((t) => missing(t) - (1 - part), 1, 40);
    expect(overshoot).toBe(0);
    expect(rise).toBeCloseTo(reached(0.9) - reached(0.1), 11);
    expect(settling).toBeCloseTo(reached(0.98), 11);
  });
});
