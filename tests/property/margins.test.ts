import fc from "fast-check";
import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { designLqr } from "@/control/lqr/design-lqr";
import { frequencyResponse, responseSingularValues } from "@/control/margins/frequency-response";
import { loopRobustness } from "@/control/margins/loop-robustness";
import { openLoop } from "@/control/margins/open-loop";
import { peakGain } from "@/control/margins/peak-gain";
import type { System } from "@/control/plant/scale-plant";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const RUNS = { numRuns: 60, seed: 20260, endOnFailure: true };
const EXACT = 1e-9;

const sizes = fc.record({
  seed: fc.integer({ min: 1, max: 1e9 }),
  n: fc.integer({ min: 1, max: 8 }),
  m: fc.integer({ min: 1, max: 3 }),
  p: fc.integer({ min: 1, max: 3 }),
  through: fc.constantFrom(0, 0, 1),
  sampled: fc.boolean(),
});
type Sizes = { seed: number; n: number; m: number; p: number; through: number; sampled: boolean };

/** Stable: the rows of A cannot reach beyond the boundary, by Geršgorin's disks. */
function stable({ seed, n, m, p, through, sampled }: Sizes): { system: System; period: number | null } {
  const random = seededUniform(seed);
  const A = seededMatrix(random, n, n);
  if (sampled) A.mul(0.99 / n);
  else for (let i = 0; i < n; i++) A.set(i, i, A.get(i, i) - n);
  const D = seededMatrix(random, p, m).mul(through);
  return { system: { A, B: seededMatrix(random, n, m), C: seededMatrix(random, p, n), D }, period: sampled ? 0.1 : null };
}

function regulated({ seed, n, m }: Sizes): System {
  const random = seededUniform(seed);
  const A = seededMatrix(random, n, n);
  const B = seededMatrix(random, n, m);
  const G = seededMatrix(random, n, n);
  const stateWeight = G.transpose().mmul(G).add(Matrix.eye(n));
  stateWeight.add(stateWeight.transpose()).mul(0.5);
  const { K } = designLqr({ A, B, stateWeight, inputWeight: Matrix.eye(m), timeBase: { kind: "continuous" } });
  return openLoop({ A, B, C: Matrix.eye(n), D: Matrix.zeros(n, m) }, K, null, "inputs");
}

test("an optimal regulator with equal input weights has sensitivity peak 1, 60 degrees and gains from 1/2 to infinity", () => {
  fc.assert(
    fc.property(sizes, (given) => {
      const { sensitivity, channels, together } = loopRobustness(regulated(given));
      expect(Math.abs(sensitivity.value - 1)).toBeLessThan(EXACT);
      for (const { gainUp, gainDown, phase, disk } of channels) {
        expect(gainUp.value).toBeNull();
        expect(gainDown.value ?? 0).toBeLessThanOrEqual(0.5);
        expect(phase.value ?? Math.PI).toBeGreaterThanOrEqual(Math.PI / 3 - EXACT);
        // |S| ≤ 1 keeps S - 1/2 within 3/2.
        expect(disk?.size ?? 2).toBeGreaterThanOrEqual(2 / 3 - EXACT);
      }
      expect(together?.size ?? 2).toBeGreaterThanOrEqual(2 / 3 - 1e-6);
      expect(together?.lower ?? 0).toBeLessThanOrEqual(Math.min(...channels.map(({ disk }) => disk?.upper ?? 2)) * (1 + 1e-6));
    }),
    RUNS,
  );
});

test("no sample on a grid lies above the bracket of the peak, and the peak is attained where it says", () => {
  fc.assert(
    fc.property(sizes, (given) => {
      const { system, period } = stable(given);
      const { value, upper, frequency } = peakGain(system, period);
      for (const sample of responseSingularValues(frequencyResponse(system, period)))
        expect(sample).toBeLessThanOrEqual(upper * (1 + 1e-12));
      const [there] = responseSingularValues(frequencyResponse(system, period, [frequency ?? 0]));
      if (frequency !== null) expect(Math.abs(there - value)).toBeLessThanOrEqual(1e-12 * value);
    }),
    RUNS,
  );
});

test("powers of two in states, inputs, outputs and time move peaks and their frequencies by just those powers", () => {
  fc.assert(
    fc.property(sizes, fc.array(fc.integer({ min: -30, max: 30 }), { minLength: 11, maxLength: 11 }), (given, exponents) => {
      const { system, period } = stable({ ...given, sampled: false });
      const [time, input, output, ...units] = exponents.map((e) => 2 ** e);
      const { A, B, C, D } = system;
      const scaled = {
        A: new Matrix(A.to2DArray().map((row, i) => row.map((x, j) => (x * time * units[j]) / units[i]))),
        B: new Matrix(B.to2DArray().map((row, i) => row.map((x) => (x * time * input) / units[i]))),
        C: new Matrix(C.to2DArray().map((row) => row.map((x, j) => x * units[j] * output))),
        D: Matrix.mul(D, input * output),
      };
      const plain = peakGain(system, period);
      const moved = peakGain(scaled, period);
      expect(Math.abs(moved.value / (input * output) / plain.value - 1)).toBeLessThan(1e-12);
    }),
    RUNS,
  );
});

test("a system and its transpose have the same peak", () => {
  fc.assert(
    fc.property(sizes, (given) => {
      const { system, period } = stable(given);
      const { A, B, C, D } = system;
      const turned = { A: A.transpose(), B: C.transpose(), C: B.transpose(), D: D.transpose() };
      expect(Math.abs(peakGain(turned, period).value / peakGain(system, period).value - 1)).toBeLessThan(EXACT);
    }),
    RUNS,
  );
});

test("a loop and its transpose bear the same, channel by channel and together", () => {
  fc.assert(
    fc.property(sizes, (given) => {
      const { A, B, C, D } = regulated(given);
      const loop = loopRobustness({ A, B, C, D });
      const turned = loopRobustness({ A: A.transpose(), B: C.transpose(), C: B.transpose(), D: D.transpose() });
      for (const [k, { gainDown, phase, disk }] of loop.channels.entries()) {
        const other = turned.channels[k];
        expect(Math.abs((other.gainDown.value ?? 0) - (gainDown.value ?? 0))).toBeLessThan(EXACT);
        expect(Math.abs((other.phase.value ?? 0) - (phase.value ?? 0))).toBeLessThan(EXACT);
        expect(Math.abs((other.disk?.size ?? 0) - (disk?.size ?? 0))).toBeLessThan(EXACT);
      }
      expect(Math.abs((turned.together?.size ?? 0) - (loop.together?.size ?? 0))).toBeLessThan(1e-6);
    }),
    RUNS,
  );
});

test("the same loop gives the same bits", () => {
  fc.assert(
    fc.property(sizes, (given) => {
      const loop = regulated(given);
      expect(loopRobustness(loop)).toEqual(loopRobustness(loop));
    }),
    { ...RUNS, numRuns: 15 },
  );
});
