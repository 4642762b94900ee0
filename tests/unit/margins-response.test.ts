import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { NumericalError } from "@/control/errors";
import { complexSingularValues, singularRoom } from "@/control/linalg/complex-singular-values";
import { angleOf, circlePoint } from "@/control/margins/angle";
import { frequencyGrid } from "@/control/margins/frequency-grid";
import { frequencyResponse, responseSingularValues } from "@/control/margins/frequency-response";
import { peakGain } from "@/control/margins/peak-gain";
import { scaledBound } from "@/control/margins/scaled-bound";
import { variationBound } from "@/control/margins/variation-bound";
import type { Rows } from "@/control/plant/model";
import type { System } from "@/control/plant/scale-plant";
import { explainRefusal } from "@/control/words/explain-refusal";
import { seededMatrix, seededUniform } from "../helpers/seeded";
import { smallPlant } from "../helpers/small-plant";

function system(A: Rows, B: Rows, C: Rows, D: Rows): System {
  const matrix = (rows: Rows) => new Matrix(rows.map((row) => [...row]));
  return { A: matrix(A), B: matrix(B), C: matrix(C), D: matrix(D) };
}

function constant(D: Rows): System {
  const gain = new Matrix(D.map((row) => [...row]));
  return { A: Matrix.zeros(0, 0), B: Matrix.zeros(0, gain.columns), C: Matrix.zeros(gain.rows, 0), D: gain };
}

function codeOf(action: () => unknown): string {
  try {
    action();
  } catch (error) {
    if (error instanceof NumericalError) return error.code;
    throw error;
  }
  return "no error";
}

test("at a pole on the axis the response says unbounded and holds zeros, not NaN; beside it it is large and right", () => {
  const oscillator = system(
    [
      [0, 1],
      [-2, 0],
    ],
    [[0], [1]],
    [[1, 0]],
    [[0]],
  );
  const { re, im, unbounded } = frequencyResponse(oscillator, null, [0, Math.SQRT2, 1.5]);
  expect(unbounded).toEqual([1]);
  expect([re[1], im[1]]).toEqual([0, 0]);
  expect(re[0]).toBeCloseTo(0.5, 15);
  expect(re[2]).toBeCloseTo(1 / (2 - 2.25), 13);
});

test("an integrator that no output sees leaves the response at rest finite", () => {
  const hidden = system(
    [
      [0, 1],
      [0, -1],
    ],
    [[0], [1]],
    [[0, 3]],
    [[0]],
  );
  const { re, unbounded } = frequencyResponse(hidden, null, [0]);
  expect(unbounded).toEqual([]);
  expect(re[0]).toBeCloseTo(3, 15);
});

test("a sampled delay of three steps turns by three times the angle and keeps its size, up to half the sampling rate", () => {
  const delay = system(
    [
      [0, 0, 0],
      [1, 0, 0],
      [0, 1, 0],
    ],
    [[1], [0], [0]],
    [[0, 0, 1]],
    [[0]],
  );
  const period = 0.25;
  const { frequencies, re, im } = frequencyResponse(delay, period, [0, 1, 5, Math.PI / period]);
  frequencies.forEach((w, k) => {
    expect(re[k]).toBeCloseTo(Math.cos(3 * w * period), 14);
    expect(im[k]).toBeCloseTo(-Math.sin(3 * w * period), 14);
  });
  expect(codeOf(() => frequencyResponse(delay, period, [Math.PI / period + 0.1]))).toBe("bad-option");
  expect(peakGain(delay, period).value).toBeCloseTo(1, 12);
});

test("negative and infinite frequencies and a period that is none are refused", () => {
  const lag = system([[-1]], [[1]], [[1]], [[0]]);
  for (const w of [-1, Number.NaN, Number.POSITIVE_INFINITY])
    expect(codeOf(() => frequencyResponse(lag, null, [w]))).toBe("bad-option");
  for (const period of [0, -1, Number.NaN]) expect(codeOf(() => frequencyResponse(lag, period, [0]))).toBe("bad-option");
});

test("a refused frequency is named in words", () => {
  const plant = smallPlant({ A: [[-1]], B: [[1]], C: [[1]] });
  const { sentence } = explainRefusal("bad-option", { option: "frequency", given: -3 }, plant);
  expect(sentence).toContain("A frequency");
});

test("the default grid rises, spans a decade beyond poles and zeros, and is dense around a light damping", () => {
  const light = system(
    [
      [0, 1],
      [-100, -0.002],
    ],
    [[0], [1]],
    [[5, 1]],
    [[0]],
  );
  const grid = frequencyGrid(light);
  expect(grid.length).toBeGreaterThan(100);
  expect(grid.length).toBeLessThan(600);
  expect(grid[0]).toBeLessThanOrEqual(0.5);
  expect(grid[grid.length - 1]).toBeGreaterThanOrEqual(100);
  expect(grid.every((w, k) => k === 0 || w > grid[k - 1])).toBe(true);
  const peak = peakGain(light).value;
  const drawn = responseSingularValues(frequencyResponse(light));
  expect(Math.max(...drawn) / peak).toBeGreaterThan(0.99);
});

test("the grid of a sampled system ends at half its sampling rate, and one without poles still has one", () => {
  const grid = frequencyGrid(system([[0.9]], [[1]], [[1]], [[0]]), 0.1);
  expect(grid[grid.length - 1]).toBe(Math.PI / 0.1);
  expect(frequencyGrid(constant([[2]])).length).toBeGreaterThan(50);
});

test("singular values of the response and of the identity plus it are those of the matrices themselves", () => {
  const G = constant([
    [3, 0],
    [0, -5],
  ]);
  const response = frequencyResponse(G, null, [1]);
  expect([...responseSingularValues(response)]).toEqual([5, 3]);
  expect([...responseSingularValues(response, true)]).toEqual([4, 4]);
  expect(codeOf(() => responseSingularValues(frequencyResponse(constant([[1, 2]]), null, [1]), true))).toBe("shape-mismatch");
});

test("complex singular values: a unitary times diag(3, 1, 1e-9), wide and tall, huge and tiny", () => {
  const phase = [circlePoint(0.3), circlePoint(2), circlePoint(1.2)];
  const values = [3, 1, 1e-9];
  for (const factor of [1, 2 ** 900, 2 ** -900]) {
    for (const [rows, columns] of [
      [3, 3],
      [3, 5],
      [5, 3],
    ]) {
      const re = new Float64Array(rows * columns);
      const im = new Float64Array(rows * columns);
      phase.forEach((point, k) => {
        re[((k + 1) % 3) * columns + k] = point.re * values[k] * factor;
        im[((k + 1) % 3) * columns + k] = point.im * values[k] * factor;
      });
      const found = complexSingularValues(re, im, singularRoom(rows, columns));
      for (const [k, value] of values.entries()) expect(found[k] / factor / value).toBeCloseTo(1, 13);
    }
  }
});

test("the plain sine, cosine and angle agree with the platform's to 15 digits", () => {
  for (let k = 0; k <= 64; k++) {
    const angle = (k * Math.PI) / 64;
    const { re, im } = circlePoint(angle);
    expect(re).toBeCloseTo(Math.cos(angle), 14);
    expect(im).toBeCloseTo(Math.sin(angle), 14);
    expect(angleOf({ re, im })).toBeCloseTo(angle, 14);
    expect(angleOf({ re: re * 1e-200, im: -im * 1e-200 })).toBeCloseTo(-angle, 14);
  }
});

test("peak gain: nothing, a constant, feed-through larger than all else, feed-through smaller", () => {
  expect(peakGain(constant([[0, 0]]))).toMatchObject({ value: 0, frequency: 0 });
  expect(peakGain(constant([[3, 4]])).value).toBeCloseTo(5, 14);
  expect(peakGain(system([[-1]], [[1]], [[0]], [[0]]))).toMatchObject({ value: 0 });
  expect(peakGain(system([[-1]], [[-1]], [[1]], [[2]]))).toMatchObject({ value: 2, frequency: null });
  expect(peakGain(system([[-1]], [[1]], [[1]], [[2]]))).toMatchObject({ value: 3, frequency: 0 });
  expect(
    peakGain(
      system(
        [
          [-1, 2],
          [0, -1],
        ],
        [[1], [0]],
        [[0, 1]],
        [[0]],
      ),
    ),
  ).toMatchObject({ value: 0 });
});

test("a hump a hair above a feed-through that is everywhere else the largest is found", () => {
  // 1 + ε s/(s² + s + 1) exceeds 1 by about ε near s = i only; beside it the size of 1 is all there is.
  for (const excess of [1e-3, 1e-6]) {
    const { value, frequency } = peakGain(
      system(
        [
          [-1, -1],
          [1, 0],
        ],
        [[1], [0]],
        [[excess, 0]],
        [[1]],
      ),
    );
    expect((value - 1) / excess).toBeCloseTo(1, 6);
    expect(frequency).toBeCloseTo(1, 2);
  }
});

test("a system with a pole that does not decay has no peak: the pole is named", () => {
  const cases: [Rows, number | null, { re: number; im: number }][] = [
    [[[0.25]], null, { re: 0.25, im: 0 }],
    [
      [
        [0, 2],
        [-2, 0],
      ],
      null,
      { re: 0, im: 2 },
    ],
    [[[-1.5]], 0.1, { re: -1.5, im: 0 }],
    [[[1]], 0.1, { re: 1, im: 0 }],
  ];
  for (const [A, period, pole] of cases) {
    const B = A.map(() => [1]);
    const C = [A.map(() => 1)];
    expect(() => peakGain(system(A, B, C, [[0]]), period)).toThrow(
      expect.objectContaining({ code: "not-stabilising", data: { pole: { re: pole.re, im: expect.closeTo(pole.im, 12) } } }),
    );
  }
});

test("the scaled bound: rank one is exact, a triangle costs only its diagonal, lower and upper enclose", () => {
  const random = seededUniform(5);
  for (const k of [2, 3, 5]) {
    const u = seededMatrix(random, k, 1);
    const v = seededMatrix(random, 1, k);
    const M = { re: Float64Array.from(u.mmul(v).to1DArray()), im: new Float64Array(k * k) };
    let exact = 0;
    for (let i = 0; i < k; i++) exact += Math.abs(u.get(i, 0) * v.get(0, i));
    const { lower, upper } = scaledBound(M, k);
    expect(upper / exact).toBeCloseTo(1, 8);
    expect(lower).toBeLessThanOrEqual(exact * (1 + 1e-12));
    expect(lower / exact).toBeCloseTo(1, 5);
  }
  const triangle = { re: Float64Array.from([2, 100, 0, 1]), im: Float64Array.from([0, 5, 0, 1]) };
  expect(scaledBound(triangle, 2).upper).toBeCloseTo(2, 6);
  expect(scaledBound({ re: new Float64Array(4), im: new Float64Array(4) }, 2)).toMatchObject({ lower: 0, upper: 0 });
});

test("a variation that is shown meets the scaled bound for two and three channels, and never passes it", () => {
  const random = seededUniform(11);
  for (let run = 0; run < 30; run++) {
    const k = 2 + (run % 5);
    const M = {
      re: Float64Array.from(seededMatrix(random, k, k).to1DArray()),
      im: Float64Array.from(seededMatrix(random, k, k).to1DArray()),
    };
    const { upper } = scaledBound(M, k);
    const shown = variationBound(M, k);
    expect(shown).toBeLessThanOrEqual(upper * (1 + 1e-12));
    expect(shown / upper).toBeGreaterThan(k <= 3 ? 0.999999 : 0.9);
  }
});

test("next to the boundary the bracket of a peak is wide enough for what rounding does there", () => {
  // A slow light pole beside a fast one: rounding of the size of the fast one moves the slow pole by 1e-6 of its damping.
  const slow = 2 ** -9;
  const damping = 1e-7 * slow;
  const turn = (A: Rows): Rows => {
    const T = new Matrix([
      [1, 0.25, 0, 0.5],
      [0, 1, 0.25, 0],
      [0, 0, 1, 0.25],
      [0, 0, 0, 1],
    ]);
    const back = new Matrix([
      [1, -0.25, 0.0625, -0.515625],
      [0, 1, -0.25, 0.0625],
      [0, 0, 1, -0.25],
      [0, 0, 0, 1],
    ]);
    return T.mmul(new Matrix(A.map((row) => [...row])))
      .mmul(back)
      .to2DArray();
  };
  const A = turn([
    [-damping, slow, 0, 0],
    [-slow, -damping, 0, 0],
    [0, 0, -1, 32],
    [0, 0, -32, -1],
  ]);
  const { lower, value, upper } = peakGain(system(A, [[1], [0], [0], [0]], [[1, -0.25, 0.0625, -0.515625]], [[0]]));
  expect(lower).toBeLessThanOrEqual(value);
  expect(upper).toBeGreaterThanOrEqual(1 / (2 * damping));
  expect(value * 2 * damping).toBeCloseTo(1, 4);
});
