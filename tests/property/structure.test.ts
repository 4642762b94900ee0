import fc from "fast-check";
import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import type { Complex } from "@/control/plant/model";
import { controllabilityReport, observabilityReport } from "@/control/structure/controllability-report";
import { distanceToUncontrollability } from "@/control/structure/distance-to-uncontrollability";
import { gramians } from "@/control/structure/gramians";
import { hankelValues } from "@/control/structure/hankel-values";
import { relativeGainArray } from "@/control/structure/relative-gain-array";
import { transmissionZeros } from "@/control/structure/transmission-zeros";

const RUNS = { numRuns: 150, seed: 20240, endOnFailure: true };

/** Entries in steps of 1/8, with zeros often enough for hidden parts to occur. */
const entry = fc.oneof(
  { weight: 2, arbitrary: fc.constant(0) },
  { weight: 3, arbitrary: fc.integer({ min: -24, max: 24 }).map((x) => x / 8) },
);
const matrix = (rows: number, columns: number) =>
  fc.array(entry, { minLength: rows * columns, maxLength: rows * columns }).map((flat) => {
    const M = Matrix.zeros(rows, columns);
    for (const [k, x] of flat.entries()) M.set(Math.floor(k / columns), k % columns, x);
    return M;
  });
const pair = fc
  .tuple(fc.integer({ min: 1, max: 7 }), fc.integer({ min: 1, max: 3 }))
  .chain(([n, m]) => fc.record({ A: matrix(n, n), B: matrix(n, m) }));
const square = fc
  .tuple(fc.integer({ min: 1, max: 6 }), fc.integer({ min: 1, max: 3 }))
  .chain(([n, m]) => fc.record({ A: matrix(n, n), B: matrix(n, m), C: matrix(m, n), D: matrix(m, m) }));

/** A product of reflections with vectors of small integers: orthogonal to rounding. */
const orthogonal = (n: number) =>
  fc
    .array(fc.array(fc.integer({ min: -3, max: 3 }), { minLength: n, maxLength: n }), { minLength: 1, maxLength: 3 })
    .map((vectors) =>
      vectors.reduce((Q, v) => {
        const length = v.reduce((sum, x) => sum + x * x, 0);
        if (length === 0) return Q;
        const column = Matrix.columnVector(v);
        return Q.mmul(Matrix.sub(Matrix.eye(n), column.mmul(column.transpose()).mul(2 / length)));
      }, Matrix.eye(n)),
    );

test("what inputs reach in (A, B) is what outputs see in (A', B'), bit for bit", () => {
  fc.assert(
    fc.property(pair, ({ A, B }) => {
      expect(observabilityReport(A.transpose(), B.transpose())).toEqual(controllabilityReport(A, B));
    }),
    RUNS,
  );
});

test("powers of two in the units of states, inputs and time do not change the rank", () => {
  fc.assert(
    fc.property(pair, fc.array(fc.integer({ min: -20, max: 20 }), { minLength: 12, maxLength: 12 }), ({ A, B }, exponents) => {
      const [time, ...units] = exponents.map((e) => 2 ** e);
      const scaledA = Matrix.zeros(A.rows, A.rows);
      const scaledB = Matrix.zeros(B.rows, B.columns);
      for (let i = 0; i < A.rows; i++) {
        for (let j = 0; j < A.rows; j++) scaledA.set(i, j, (time * A.get(i, j) * units[j]) / units[i]);
        for (let j = 0; j < B.columns; j++) scaledB.set(i, j, (time * B.get(i, j) * units[10 - j]) / units[i]);
      }
      expect(controllabilityReport(scaledA, scaledB).rank).toBe(controllabilityReport(A, B).rank);
    }),
    RUNS,
  );
});

test("turning the states does not change the rank", () => {
  const turned = pair.chain(({ A, B }) => fc.record({ A: fc.constant(A), B: fc.constant(B), Q: orthogonal(A.rows) }));
  fc.assert(
    fc.property(turned, ({ A, B, Q }) => {
      const report = controllabilityReport(Q.transpose().mmul(A).mmul(Q), Q.transpose().mmul(B));
      expect(report.rank).toBe(controllabilityReport(A, B).rank);
    }),
    RUNS,
  );
});

test("an input more never lowers the rank, and the weakest direction has length one", () => {
  const wider = pair.chain(({ A, B }) => fc.record({ A: fc.constant(A), B: fc.constant(B), extra: matrix(A.rows, 1) }));
  fc.assert(
    fc.property(wider, ({ A, B, extra }) => {
      const report = controllabilityReport(A, B);
      const both = controllabilityReport(A, B.clone().addColumn(B.columns, extra.to1DArray()));
      expect(both.rank).toBeGreaterThanOrEqual(report.rank);
      expect(Math.hypot(...report.weakestDirection)).toBeCloseTo(1, 12);
    }),
    RUNS,
  );
});

/** Smallest singular value of the system matrix at s, by the determinant's size: zero exactly at the zeros of a square system. */
function determinantAt({ A, B, C, D }: { A: Matrix; B: Matrix; C: Matrix; D: Matrix }, s: number): number {
  const n = A.rows;
  const m = B.columns;
  const P = Matrix.zeros(n + m, n + m);
  P.setSubMatrix(Matrix.sub(A, Matrix.eye(n).mul(s)), 0, 0);
  P.setSubMatrix(B, 0, n);
  P.setSubMatrix(C, n, 0);
  P.setSubMatrix(D, n, n);
  return determinant(P.to2DArray());
}

function determinant(rows: number[][]): number {
  let product = 1;
  for (let k = 0; k < rows.length; k++) {
    let best = k;
    for (let i = k; i < rows.length; i++) if (Math.abs(rows[i][k]) > Math.abs(rows[best][k])) best = i;
    if (rows[best][k] === 0) return 0;
    if (best !== k) {
      [rows[best], rows[k]] = [rows[k], rows[best]];
      product = -product;
    }
    product *= rows[k][k];
    for (let i = k + 1; i < rows.length; i++) {
      const factor = rows[i][k] / rows[k][k];
      for (let j = k; j < rows.length; j++) rows[i][j] -= factor * rows[k][j];
    }
  }
  return product;
}

test("the determinant of the system matrix is its leading coefficient times the product over the zeros", () => {
  fc.assert(
    fc.property(square, (system) => {
      const zeros = transmissionZeros(system);
      const product = (s: number) => zeros.reduce((whole, z) => times(whole, { re: s - z.re, im: -z.im }), { re: 1, im: 0 });
      // Two points far from most zeros: their quotients must agree. A system that loses rank everywhere has no say here.
      const [p, q] = [9.7, -11.3];
      const [atP, atQ] = [determinantAt(system, p), determinantAt(system, q)];
      fc.pre(Math.abs(atP) > 1e-6 && Math.abs(atQ) > 1e-6);
      const [leftP, leftQ] = [product(p), product(q)];
      fc.pre(Math.hypot(leftP.re, leftP.im) > 1e-3 && Math.hypot(leftQ.re, leftQ.im) > 1e-3);
      // Multiple zeros are off by a root of rounding each, but their product is not.
      expect((leftP.re / leftQ.re) * (atQ / atP)).toBeCloseTo(1, 7);
    }),
    RUNS,
  );
});

test("zeros do not depend on powers of two in the units, and scale with time", () => {
  fc.assert(
    fc.property(square, fc.array(fc.integer({ min: -6, max: 6 }), { minLength: 13, maxLength: 13 }), (system, exponents) => {
      const units = exponents.map((e) => 2 ** e);
      const { A, B, C, D } = system;
      const [n, m] = [A.rows, B.columns];
      const scaled = { A: A.clone(), B: B.clone(), C: C.clone(), D: D.clone() };
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) scaled.A.set(i, j, (4 * A.get(i, j) * units[j]) / units[i]);
        for (let j = 0; j < m; j++) scaled.B.set(i, j, (4 * B.get(i, j) * units[6 + j]) / units[i]);
      }
      for (let k = 0; k < m; k++) {
        for (let j = 0; j < n; j++) scaled.C.set(k, j, C.get(k, j) * units[j] * units[9 + k]);
        for (let j = 0; j < m; j++) scaled.D.set(k, j, D.get(k, j) * units[6 + j] * units[9 + k]);
      }
      expectSameZeros(
        transmissionZeros(scaled).map(({ re, im }) => ({ re: re / 4, im: im / 4 })),
        transmissionZeros(system),
      );
    }),
    RUNS,
  );
});

test("zeros do not depend on the choice of states", () => {
  const turned = square.chain((system) => fc.record({ system: fc.constant(system), Q: orthogonal(system.A.rows) }));
  fc.assert(
    fc.property(turned, ({ system: { A, B, C, D }, Q }) => {
      const other = transmissionZeros({ A: Q.transpose().mmul(A).mmul(Q), B: Q.transpose().mmul(B), C: C.mmul(Q), D });
      expectSameZeros(other, transmissionZeros({ A, B, C, D }));
    }),
    RUNS,
  );
});

test("rows and columns of a relative gain array sum to one", () => {
  const invertible = fc
    .integer({ min: 2, max: 5 })
    .chain((n) => matrix(n, n))
    .filter((G) => Math.abs(determinant(G.to2DArray())) > 0.1);
  fc.assert(
    fc.property(invertible, (G) => {
      const gain = relativeGainArray(G);
      for (let i = 0; i < gain.rows; i++) {
        expect(gain.getRow(i).reduce((sum, x) => sum + x, 0)).toBeCloseTo(1, 8);
        expect(gain.getColumn(i).reduce((sum, x) => sum + x, 0)).toBeCloseTo(1, 8);
      }
    }),
    RUNS,
  );
});

/** Same count and the same polynomial: multiple zeros are off by a root of rounding each, their polynomial is not. */
function expectSameZeros(found: readonly Complex[], expected: readonly Complex[]): void {
  expect(found.length).toBe(expected.length);
  const sizes = expected.map(({ re, im }) => Math.hypot(re, im));
  for (const s of [3.7, -5.3, 0.9]) {
    const along = (zeros: readonly Complex[]) =>
      zeros.reduce((whole, z) => times(whole, { re: s - z.re, im: -z.im }), { re: 1, im: 0 }).re;
    const scale = sizes.reduce((whole, size) => whole * (Math.abs(s) + size), 1);
    expect(Math.abs(along(found) - along(expected)) / scale).toBeLessThan(1e-7);
  }
}

function times(x: Complex, y: Complex): Complex {
  return { re: x.re * y.re - x.im * y.im, im: x.re * y.im + x.im * y.re };
}

const zerosOf = (system: { A: Matrix; B: Matrix; C: Matrix; D: Matrix }) =>
  transmissionZeros(system).map(({ re, im }): Complex => ({ re, im }));

test("a plant and its dual have the same zeros", () => {
  fc.assert(
    fc.property(square, ({ A, B, C, D }) => {
      const zeros = zerosOf({ A, B, C, D });
      const dual = zerosOf({ A: A.transpose(), B: C.transpose(), C: B.transpose(), D: D.transpose() });
      expect(dual).toHaveLength(zeros.length);
      const open = [...dual];
      for (const { re, im } of zeros) {
        const distances = open.map((other) => Math.hypot(other.re - re, other.im - im));
        const nearest = Math.min(...distances);
        expect(nearest).toBeLessThan(1e-9 * (1 + Math.hypot(re, im)));
        open.splice(distances.indexOf(nearest), 1);
      }
    }),
    RUNS,
  );
});

test("turning the states neither moves the distance to uncontrollability nor the Hankel values", () => {
  const turned = pair.chain(({ A, B }) => fc.record({ A: fc.constant(A), B: fc.constant(B), Q: orthogonal(A.rows) }));
  fc.assert(
    fc.property(turned, ({ A, B, Q }) => {
      const inside = { A: Q.transpose().mmul(A).mmul(Q), B: Q.transpose().mmul(B) };
      const given = distanceToUncontrollability(A, B, 600);
      const other = distanceToUncontrollability(inside.A, inside.B, 600);
      const rounding = 1e-13 * (1 + A.norm("frobenius") + B.norm("frobenius"));
      expect(other.lower).toBeLessThanOrEqual(given.upper + rounding);
      expect(given.lower).toBeLessThanOrEqual(other.upper + rounding);
      const settled = (M: Matrix) => Matrix.sub(M, Matrix.eye(A.rows).mul(24));
      const C = B.transpose();
      const plain = hankelValues({ A: settled(A), B, C, timeBase: "continuous" });
      const moved = hankelValues({ A: settled(inside.A), B: inside.B, C: C.mmul(Q), timeBase: "continuous" });
      const limit = 1e-13 * (1 + (plain.values[0] ?? 0));
      for (const [k, value] of plain.values.entries()) expect(Math.abs(moved.values[k] - value)).toBeLessThan(limit);
    }),
    { ...RUNS, numRuns: 60 },
  );
});

test("the observability gramian is the controllability gramian of the dual plant", () => {
  fc.assert(
    fc.property(pair, fc.constantFrom("continuous" as const, "sampled" as const), ({ A, B }, timeBase) => {
      const settled = timeBase === "continuous" ? Matrix.sub(A, Matrix.eye(A.rows).mul(24)) : Matrix.mul(A, 1 / 32);
      const C = B.transpose();
      const plain = gramians({ A: settled, B, C, timeBase });
      const dual = gramians({ A: settled.transpose(), B: C.transpose(), C: B.transpose(), timeBase });
      const limit = 2 ** -50 * (1 + plain.controllability.norm("frobenius"));
      for (let i = 0; i < A.rows; i++) {
        for (let j = 0; j < A.rows; j++) {
          expect(Math.abs(dual.observability.get(i, j) - plain.controllability.get(i, j))).toBeLessThan(limit);
          expect(plain.controllability.get(i, j)).toBe(plain.controllability.get(j, i));
        }
      }
    }),
    { ...RUNS, numRuns: 80 },
  );
});

test("powers of two in the units of the states change the gramians by those powers", () => {
  fc.assert(
    fc.property(pair, fc.array(fc.integer({ min: -20, max: 20 }), { minLength: 8, maxLength: 8 }), ({ A, B }, exponents) => {
      const n = A.rows;
      const units = exponents.slice(0, n).map((e) => 2 ** e);
      const D = Matrix.diag(units);
      const inverse = Matrix.diag(units.map((unit) => 1 / unit));
      const settled = Matrix.sub(A, Matrix.eye(n).mul(24));
      const C = B.transpose();
      const plain = gramians({ A: settled, B, C, timeBase: "continuous" }).controllability;
      const scaled = { A: inverse.mmul(settled).mmul(D), B: inverse.mmul(B), C: C.mmul(D), timeBase: "continuous" } as const;
      const other = gramians(scaled).controllability;
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) {
          const back = other.get(i, j) * units[i] * units[j];
          const size = Math.sqrt(plain.get(i, i) * plain.get(j, j));
          expect(Math.abs(back - plain.get(i, j))).toBeLessThanOrEqual(2 ** -50 * size);
        }
      }
    }),
    { ...RUNS, numRuns: 80 },
  );
});
