import fc from "fast-check";
import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { discretiseCost } from "@/control/discrete/discretise-cost";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import { symmetricEigenvalues } from "@/control/linalg/symmetric-eigenvalues";
import { balanceDynamics } from "@/control/response/balance-dynamics";
import { holdEquivalent } from "@/control/response/hold-equivalent";
import { flatExponential, matrixExponential } from "@/control/response/matrix-exponential";
import { type ResponseRequest, respond } from "@/control/response/respond";
import { tailBound } from "@/control/response/tail-bound";
import { timesVector } from "@/control/response/times-vector";
import { transitionPower } from "@/control/response/walk-sampled";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const seeds = fc.integer({ min: 1, max: 2 ** 31 - 1 });

/** A random stable plant: slowest real part -0.3, or largest radius 0.9 when sampled. */
function randomRequest(seed: number, sampled = false): ResponseRequest {
  const random = seededUniform(seed);
  const whole = (low: number, high: number) => low + Math.floor(random() * (high - low + 1));
  const [n, m, p, q] = [whole(1, 7), whole(1, 3), whole(1, 3), whole(1, 3)];
  const raw = seededMatrix(random, n, n);
  const poles = eigenvalues(raw);
  const A = sampled
    ? Matrix.mul(raw, 0.9 / Math.max(...poles.map(({ re, im }) => Math.hypot(re, im))))
    : Matrix.sub(raw, Matrix.mul(Matrix.eye(n), 0.3 + Math.max(...poles.map(({ re }) => re))));
  return {
    plant: {
      A,
      B: seededMatrix(random, n, m),
      C: seededMatrix(random, p, n),
      D: seededMatrix(random, p, m),
      H: seededMatrix(random, q, n),
      J: seededMatrix(random, q, m),
    },
    period: sampled ? 0.01 : null,
    K: Matrix.zeros(m, n),
    F: seededMatrix(random, m, q),
    observer: { kind: "full", L: Matrix.zeros(n, p) },
    experiments: {
      amplitudes: Array.from({ length: q }, () => 2),
      initialState: Array.from({ length: n }, () => 2 * random() - 1),
      inputDisturbance: Array.from({ length: m }, () => 1),
    },
    room: Array.from({ length: m }, () => ({ up: 3, down: 0.5 })),
    horizon: null,
  };
}

/** Largest of a number made from each value, at least zero: one expectation instead of thousands. */
function worst(values: ArrayLike<number>, of: (value: number, k: number) => number): number {
  return Array.from(values, of).reduce((most, value) => (value > most || Number.isNaN(value) ? value : most), 0);
}

function largestOf(values: ArrayLike<number>): number {
  return worst(values, Math.abs);
}

describe("matrixExponential", () => {
  test("exp(A) exp(-A) = I within the product of both sizes", () => {
    fc.assert(
      fc.property(seeds, fc.integer({ min: 1, max: 10 }), (seed, n) => {
        const A = Matrix.mul(seededMatrix(seededUniform(seed), n, n), 2);
        const [up, down] = [matrixExponential(A), matrixExponential(Matrix.mul(A, -1))];
        const error = Matrix.sub(up.mmul(down), Matrix.eye(n)).norm();
        expect(error).toBeLessThanOrEqual(20 * n * Number.EPSILON * up.norm() * down.norm());
      }),
    );
  });

  test("scaling of the states by powers of two changes exp(A) by exactly those powers", () => {
    fc.assert(
      fc.property(seeds, fc.integer({ min: 2, max: 8 }), (seed, n) => {
        const random = seededUniform(seed);
        const A = seededMatrix(random, n, n);
        const unit = Array.from({ length: n }, () => 2 ** Math.floor(40 * random() - 20));
        const scaled = new Matrix(A.to2DArray().map((row, i) => row.map((entry, j) => (entry * unit[j]) / unit[i])));
        const plain = matrixExponential(A);
        const back = matrixExponential(scaled)
          .to2DArray()
          .map((row, i) => row.map((entry, j) => (entry * unit[i]) / unit[j]));
        const error = Matrix.sub(new Matrix(back), plain).norm() / plain.norm();
        expect(error).toBeLessThanOrEqual(20 * n * Number.EPSILON);
      }),
    );
  });
});

describe("respond", () => {
  test("twice the start gives exactly twice the response, and two starts add up", () => {
    fc.assert(
      fc.property(seeds, seeds, fc.boolean(), (seed, other, sampled) => {
        const request = { ...randomRequest(seed, sampled), horizon: 5 };
        const random = seededUniform(other);
        const a = request.experiments.initialState;
        const b = a.map(() => 2 * random() - 1);
        const initial = (initialState: number[]) =>
          respond({ ...request, experiments: { ...request.experiments, initialState } }).records.find(
            ({ kind, loop }) => kind === "initial" && loop === "observer",
          )?.values ?? [];
        const [ra, rb] = [initial([...a]), initial(b)];
        const doubled = initial(a.map((x) => 2 * x));
        expect(doubled.length).toBe(ra.length);
        expect(worst(doubled, (value, k) => Math.abs(value - 2 * ra[k]))).toBe(0);
        const sum = initial(a.map((x, i) => x + b[i]));
        const size = Math.max(largestOf(ra), largestOf(rb));
        expect(worst(sum, (value, k) => Math.abs(value - ra[k] - rb[k]))).toBeLessThanOrEqual(1e-13 * size);
      }),
      { numRuns: 40 },
    );
  });

  test("a continuous loop passes through the samples of its hold equivalent", () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const request = randomRequest(seed);
        const period = 0.05;
        const held = holdEquivalent({ A: request.plant.A, B: request.plant.B, period });
        const continuous = respond({ ...request, observer: null, horizon: 400 * period });
        const sampled = respond({
          ...request,
          observer: null,
          plant: { ...request.plant, ...held },
          period,
          horizon: 400 * period,
        });
        continuous.records.forEach(({ values, step }, i) => {
          expect(step).toBe(period);
          const other = sampled.records[i].values;
          expect(other.length).toBe(values.length);
          const size = largestOf(values);
          expect(worst(values, (value, k) => Math.abs(value - other[k]))).toBeLessThanOrEqual(1e-12 * size);
        });
      }),
      { numRuns: 30 },
    );
  });

  test("the final values are the static gain, with and without samples", () => {
    fc.assert(
      fc.property(seeds, fc.boolean(), (seed, sampled) => {
        const request = randomRequest(seed, sampled);
        const { A, B, H, J } = request.plant;
        const inside = sampled ? Matrix.sub(Matrix.eye(A.rows), A) : Matrix.mul(A, -1);
        const rest = inside;
        const gain = Matrix.add(H.mmul(inverse(rest)).mmul(B), J).mmul(request.F ?? Matrix.eye(1));
        for (const { source, commanded } of respond(request).figures) {
          commanded.forEach(({ final }, i) => {
            const scale = H.norm() * inverse(rest).norm() * B.norm() + 1;
            expect(Math.abs(final - 2 * gain.get(i, source))).toBeLessThanOrEqual(1e-12 * scale * scale);
          });
        }
      }),
      { numRuns: 40 },
    );
  });

  test("no sample of a fine record contradicts peak, settling, overshoot or effort", () => {
    fc.assert(
      fc.property(seeds, fc.boolean(), (seed, sampled) => {
        const request = randomRequest(seed, sampled);
        const evidence = respond(request);
        const {
          commanded: q,
          outputs: p,
          states: n,
        } = { commanded: request.plant.H.rows, outputs: request.plant.C.rows, states: request.plant.A.rows };
        for (const figures of evidence.figures) {
          const record = evidence.records.find(
            ({ kind, loop, source }) => kind === "step" && loop === figures.loop && source === figures.source,
          );
          if (!record) throw new Error("no record");
          const { values, samples, step } = record;
          const row = (signal: number) => values.slice(signal * samples, (signal + 1) * samples);
          const signals = [...figures.commanded, ...figures.outputs];
          signals.forEach(({ final, peak, settling, overshoot }, i) => {
            const slack = 1e-12 * (peak + 1);
            expect(largestOf(row(i))).toBeLessThanOrEqual(peak + slack);
            const late = (k: number) => settling !== null && k * step >= settling - 1e-12;
            const beyond = (value: number, k: number) => (late(k) ? Math.abs(value - final) : 0);
            expect(worst(row(i), beyond)).toBeLessThanOrEqual(0.02 * Math.abs(final) + slack);
            const over = (value: number) => (overshoot === null ? 0 : (value / final - 1) * 100 - overshoot);
            expect(worst(row(i), over)).toBeLessThanOrEqual(1e-8);
          });
          const estimates = figures.loop === "observer" ? n : 0;
          figures.effort.forEach(({ peak, overLimit }, j) => {
            const u = row(q + p + n + estimates + j);
            const used = Math.max(0, ...u.map((value) => Math.max(value / 3, -value / 0.5)));
            expect(largestOf(u)).toBeLessThanOrEqual(peak * (1 + 1e-12));
            expect(used).toBeLessThanOrEqual((overLimit ?? 0) * (1 + 1e-12));
          });
        }
      }),
      { numRuns: 40 },
    );
  });
});

function inverse(M: Matrix): Matrix {
  const n = M.rows;
  const work = M.to2DArray().map((row, i) => [...row, ...Array.from({ length: n }, (_, j) => (i === j ? 1 : 0))]);
  for (let k = 0; k < n; k++) {
    const pivot = work.slice(k).reduce((best, row, i) => (Math.abs(row[k]) > Math.abs(work[best][k]) ? k + i : best), k);
    [work[k], work[pivot]] = [work[pivot], work[k]];
    const scale = work[k][k];
    work[k] = work[k].map((entry) => entry / scale);
    for (let i = 0; i < n; i++) {
      const factor = work[i][k];
      if (i !== k) work[i] = work[i].map((entry, j) => entry - factor * work[k][j]);
    }
  }
  return new Matrix(work.map((row) => row.slice(n)));
}

describe("discretiseCost", () => {
  // Abscissas and weights of Gauss's rule with eight points on [-1, 1]: Abramowitz & Stegun, table 25.4 (from memory).
  const rule = [
    [0.1834346424956498, 0.362683783378362],
    [0.525532409916329, 0.3137066458778873],
    [0.7966664774136267, 0.2223810344533745],
    [0.9602898564975363, 0.1012285362903763],
  ].flatMap(([x, w]) => [
    [-x, w],
    [x, w],
  ]);

  test("is the integral of the cost along held motions, symmetric and semidefinite", () => {
    fc.assert(
      fc.property(seeds, (seed) => {
        const random = seededUniform(seed);
        const [n, m] = [1 + Math.floor(5 * random()), 1 + Math.floor(3 * random())];
        const [A, B] = [seededMatrix(random, n, n), seededMatrix(random, n, m)];
        const factor = seededMatrix(random, 1 + Math.floor((n + m) * random()), n + m);
        const cost = factor.transpose().mmul(factor);
        const weights = { Q: cost.subMatrix(0, n - 1, 0, n - 1), R: cost.subMatrix(n, n + m - 1, n, n + m - 1) };
        const period = 0.5 + random();
        const sampled = discretiseCost({ A, B, ...weights, S: cost.subMatrix(0, n - 1, n, n + m - 1), period });
        const whole = Matrix.zeros(n + m, n + m);
        whole.setSubMatrix(A, 0, 0);
        whole.setSubMatrix(B, 0, n);
        const integral = Matrix.zeros(n + m, n + m);
        for (let panel = 0; panel < 4; panel++) {
          for (const [x, w] of rule) {
            const motion = matrixExponential(Matrix.mul(whole, ((panel + (x + 1) / 2) * period) / 4));
            integral.add(
              motion
                .transpose()
                .mmul(cost)
                .mmul(motion)
                .mul((w * period) / 8),
            );
          }
        }
        const found = Matrix.zeros(n + m, n + m);
        found.setSubMatrix(sampled.Qd, 0, 0);
        found.setSubMatrix(sampled.Sd, 0, n);
        found.setSubMatrix(sampled.Sd.transpose(), n, 0);
        found.setSubMatrix(sampled.Rd, n, n);
        expect(Matrix.sub(found, integral).norm() / integral.norm()).toBeLessThanOrEqual(1e-13);
        expect(found.isSymmetric()).toBe(true);
        expect(symmetricEigenvalues(found)[0]).toBeGreaterThanOrEqual(-4 * (n + m) * Number.EPSILON * found.norm());
      }),
      { numRuns: 60 },
    );
  });
});

describe("tailBound", () => {
  test("no motion of a stable loop ever leaves it, with rates, couplings and units spread widely", () => {
    fc.assert(
      fc.property(seeds, fc.boolean(), (seed, sampled) => {
        const random = seededUniform(seed);
        const n = 1 + Math.floor(6 * random());
        const raw = Array.from({ length: n }, (_, i) =>
          Array.from({ length: n }, (__, j) => (j < i ? 0 : i === j ? -(10 ** (6 * random() - 3)) : 10 ** (4 * random() - 2))),
        );
        const a = sampled ? matrixExponential(Matrix.mul(new Matrix(raw), 0.01)) : new Matrix(raw);
        const { matrix } = balanceDynamics(Float64Array.from(a.to1DArray()), n);
        const rows = Float64Array.from({ length: 2 * n }, () => 10 ** (4 * random() - 2) * (random() < 0.5 ? -1 : 1));
        const bound = tailBound(matrix, n, rows, sampled);
        if (!bound) throw new Error("no bound");
        const start = Float64Array.from({ length: n }, () => 2 * random() - 1);
        const limits = bound.gains.map((gain) => gain * bound.size(start));
        for (let k = 0; k < 24; k++) {
          const time = 2 ** (k - 8);
          const phi = sampled
            ? transitionPower(matrix, n, 1 + 3 * k * k)
            : flatExponential(
                matrix.map((x) => x * time),
                n,
              );
          const state = new Float64Array(n);
          timesVector(phi, start, n, state);
          for (const [i, limit] of limits.entries()) {
            const value = state.reduce((sum, entry, j) => sum + entry * rows[i * n + j], 0);
            expect(Math.abs(value)).toBeLessThanOrEqual(limit);
          }
        }
      }),
      { numRuns: 200 },
    );
  });
});
