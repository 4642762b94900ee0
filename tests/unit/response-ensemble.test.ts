import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { switchAccelerator } from "@/control/accelerator/accelerator";
import { NumericalError } from "@/control/errors";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import { toFlat } from "@/control/linalg/flat";
import { type EnsemblePlant, respondEnsemble } from "@/control/response/ensemble";
import { holdEquivalent } from "@/control/response/hold-equivalent";
import { matrixExponential } from "@/control/response/matrix-exponential";
import { respondToStep } from "@/control/response/respond-to-step";
import { seededMatrix, seededUniform } from "../helpers/seeded";

const random = seededUniform(20260727);
const [n, m, q] = [5, 2, 2];
const A = Matrix.sub(seededMatrix(random, n, n), Matrix.mul(Matrix.eye(n), 2));
const B = seededMatrix(random, n, m);
const H = seededMatrix(random, q, n);
const K = Matrix.mul(seededMatrix(random, m, n), 0.3);
const F = Matrix.eye(2);
const L = Matrix.mul(seededMatrix(random, n, q), 0.2);

function plant(change: number): EnsemblePlant {
  const varied = (M: Matrix) => toFlat(M).map((entry, k) => entry * (1 + change * Math.sin(k)));
  return { a: varied(A), b: varied(B), c: varied(H), h: varied(H) };
}

function matrices({ a, b, h }: EnsemblePlant) {
  const from = (flat: Float64Array, rows: number) => Matrix.from1DArray(rows, flat.length / rows, Array.from(flat));
  return { A: from(a, n), B: from(b, n), H: from(h, q) };
}

const largest = (values: ArrayLike<number>) => Array.from(values).reduce((most, value) => Math.max(most, Math.abs(value)), 0);
const difference = (one: ArrayLike<number>, other: ArrayLike<number>) => largest(Array.from(one, (value, k) => value - other[k]));
const byParts = (x: { re: number; im: number }, y: { re: number; im: number }) => x.re - y.re || x.im - y.im;

describe("an ensemble of loops", () => {
  const plants = [0, 0.1, -0.1, 0.2].map(plant);
  const request = { law: { K, F, observer: null }, plants, period: null, step: 0.05, samples: 137 };

  test("has the poles and the step responses of each loop by itself, and the band around them", () => {
    const seen: Float64Array[] = [];
    const { re, im, stable, band } = respondEnsemble({ ...request, visit: (values) => seen.push(values.slice()) });
    plants.forEach((one, index) => {
      const { A: a, B: b, H: h } = matrices(one);
      const closed = Matrix.sub(a, b.mmul(K));
      const values = respondToStep({ A: closed, B: b.mmul(F), C: h, D: Matrix.zeros(q, q), step: 0.05, samples: 137 });
      expect(difference(seen[index], values)).toBeLessThanOrEqual(1e-14 * largest(values));
      const found = Array.from({ length: n }, (_, k) => ({ re: re[index * n + k], im: im[index * n + k] })).sort(byParts);
      const poles = eigenvalues(closed).sort(byParts);
      expect(
        difference(
          found.map((p) => p.re),
          poles.map((p) => p.re),
        ),
      ).toBeLessThanOrEqual(1e-13);
      expect(
        difference(
          found.map((p) => p.im),
          poles.map((p) => p.im),
        ),
      ).toBeLessThanOrEqual(1e-13);
    });
    expect(stable).toEqual([true, true, true, true]);
    expect(band?.lower).toEqual(Float64Array.from(seen[0], (_, k) => Math.min(...seen.map((values) => values[k]))));
    expect(band?.upper).toEqual(Float64Array.from(seen[0], (_, k) => Math.max(...seen.map((values) => values[k]))));
  });

  test("with an observer that knows the plant answers a set point as the full state does, and adds the observer's poles", () => {
    const observer = { L, A, B, C: H };
    const first = { ...request, plants: [plants[0]] };
    const full = respondEnsemble(first);
    const observed = respondEnsemble({ ...first, law: { K, F, observer } });
    const [estimated, exact] = [observed, full].map(({ band }) => band?.upper ?? []);
    expect(exact.length).toBe(q * q * request.samples);
    expect(difference(exact, estimated)).toBeLessThanOrEqual(1e-13 * largest(exact));
    const sorted = (values: Float64Array) => Array.from(values).sort((x, y) => x - y);
    const own = eigenvalues(Matrix.sub(A, L.mmul(H))).map(({ re }) => re);
    expect(difference(sorted(observed.re), sorted(Float64Array.from([...full.re, ...own])))).toBeLessThanOrEqual(1e-10);
  });

  test("leaves unstable loops out of the band and says which they are", () => {
    const runaway = { ...plants[0], a: toFlat(Matrix.eye(n)) };
    const all = respondEnsemble({ ...request, plants: [plants[0], runaway] });
    expect(all.stable).toEqual([true, false]);
    expect(all.band).toEqual(respondEnsemble({ ...request, plants: [plants[0]] }).band);
    expect(respondEnsemble({ ...request, plants: [runaway] }).band).toBeNull();
  });

  test("has the same bits with and without the accelerator", () => {
    const before = switchAccelerator(true);
    const fast = respondEnsemble(request);
    switchAccelerator(false);
    const plain = respondEnsemble(request);
    switchAccelerator(before);
    expect(plain).toEqual(fast);
  });

  test("refuses plants of another size, entries that are not finite and steps that are none", () => {
    const refused = (more: object) => {
      try {
        respondEnsemble({ ...request, ...more });
      } catch (error) {
        if (error instanceof NumericalError) return error.code;
      }
      return null;
    };
    expect(refused({ plants: [{ ...plants[0], b: new Float64Array(3) }] })).toBe("shape-mismatch");
    expect(refused({ plants: [{ ...plants[0], h: plants[0].h.map(() => Number.NaN) }] })).toBe("not-finite");
    expect(refused({ step: 0 })).toBe("bad-option");
    expect(refused({ samples: 0.5 })).toBe("bad-option");
    expect(refused({})).toBeNull();
  });
});

describe("respondToStep", () => {
  const D = seededMatrix(random, q, m);

  test.each([0.001, 0.7])("equals the recursion of the hold equivalent at moments %d s apart, stable or not", (step) => {
    const unstable = Matrix.add(A, Matrix.mul(Matrix.eye(n), 2.2));
    for (const plantA of [A, unstable]) {
      const values = respondToStep({ A: plantA, B, C: H, D, step, samples: 50 });
      const held = holdEquivalent({ A: plantA, B, period: step });
      let X = Matrix.zeros(n, m);
      let worst = 0;
      for (let k = 0; k < 50; k++) {
        const Y = Matrix.add(H.mmul(X), D);
        for (let r = 0; r < m; r++)
          for (let i = 0; i < q; i++) worst = Math.max(worst, Math.abs(values[(r * q + i) * 50 + k] - Y.get(i, r)));
        X = Matrix.add(held.A.mmul(X), held.B);
      }
      expect(worst).toBeLessThanOrEqual(1e-13 * largest(values));
    }
  });

  test("gives a sampled system at its own samples", () => {
    const Ad = matrixExponential(Matrix.mul(A, 0.1));
    const values = respondToStep({ A: Ad, B, C: H, D, step: null, samples: 3 });
    const second = Matrix.add(H.mmul(B), D);
    const third = Matrix.add(H.mmul(Ad).mmul(B), second);
    expect(values[0]).toBe(D.get(0, 0));
    expect(values[1]).toBeCloseTo(second.get(0, 0), 14);
    expect(values[5]).toBeCloseTo(third.get(1, 0), 14);
  });

  test("refuses what has no answer", () => {
    const problem = { A, B, C: H, D, step: 0.1, samples: 10 };
    expect(() => respondToStep({ ...problem, step: -1 })).toThrow(NumericalError);
    expect(() => respondToStep({ ...problem, samples: 1e9 })).toThrow(NumericalError);
    expect(() => respondToStep({ ...problem, A: Matrix.mul(Matrix.eye(n), 1e4) })).toThrow(NumericalError);
  });
});
