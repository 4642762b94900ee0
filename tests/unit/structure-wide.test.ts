import { expect, test } from "vitest";
import type { Wide } from "@/control/linalg/double-double";
import { wideDifference, wideQuotient, wideRoot, wideSum, wideTimes } from "@/control/linalg/wide-number";
import { wideFactor } from "@/control/structure/wide-factor";
import { wideRoots } from "@/control/structure/wide-roots";
import { wideSingularValues } from "@/control/structure/wide-singular-values";
import { seededUniform } from "../helpers/seeded";

const whole = (x: number) => ({ hi: x, lo: 0 });
const wide = (entries: readonly number[]): Wide => ({ hi: Float64Array.from(entries), lo: new Float64Array(entries.length) });

test("wide numbers keep what a double loses: (1 + 2⁻⁶⁰) - 1, 1/3 · 3, √2 · √2", () => {
  const sum = wideSum(whole(1), whole(2 ** -60));
  expect(wideDifference(sum, whole(1))).toEqual(whole(2 ** -60));
  const third = wideQuotient(whole(1), whole(3));
  const back = wideDifference(wideTimes(third, whole(3)), whole(1));
  expect(Math.abs(back.hi)).toBeLessThan(2 ** -102);
  const root = wideRoot(whole(2));
  const square = wideDifference(wideTimes(root, root), whole(2));
  expect(Math.abs(square.hi)).toBeLessThan(2 ** -101);
  expect(wideRoot(whole(0))).toEqual(whole(0));
});

test("close eigenvalues of a small matrix are told apart, equal ones come out equal, pairs exactly conjugate", () => {
  // Upper triangular, coupled by one.
  const chain = (...values: number[]) =>
    wide(values.flatMap((value, i) => values.map((_, j) => (j === i ? value : j === i + 1 ? 1 : 0))));
  expect(wideRoots(chain(3), 1)).toEqual([{ re: 3, im: 0 }]);
  expect(wideRoots(chain(2, 2, 2), 3)).toEqual(Array.from({ length: 3 }, () => ({ re: 2, im: 0 })));
  const near = wideRoots(chain(1, 1 + 2 ** -20, 1 + 2 ** -18), 3).map(({ re }) => re);
  for (const [k, value] of [1, 1 + 2 ** -20, 1 + 2 ** -18].entries()) {
    expect(near.toSorted((x, y) => x - y)[k]).toBeCloseTo(value, 13);
  }
  const [one, other] = wideRoots(wide([1, 2 ** -30, -(2 ** -30), 1]), 2);
  expect(one).toEqual({ re: other.re, im: -other.im });
  expect(Math.abs(one.im)).toBe(2 ** -30);
  // A pair and a real value about -1.
  const mixed = wideRoots(wide([-1, 1e-3, 0, -1e-3, -1, 0, 0, 0, -1.001]), 3);
  expect(mixed.filter(({ im }) => im === 0)).toHaveLength(1);
  const pair = mixed.filter(({ im }) => im !== 0);
  expect(pair[0]).toEqual({ re: pair[1].re, im: -pair[1].im });
  expect(Math.abs(pair[0].im)).toBeCloseTo(1e-3, 15);
});

test("the factor of a semidefinite matrix has its rank and gives it back", () => {
  // Two columns: [1, 2, 3] and [0, 1, -1].
  const w = wide([1, 2, 3, 2, 5, 5, 3, 5, 10]);
  const { l, rank } = wideFactor(w, 3, 1e-30);
  expect(rank).toBe(2);
  for (let i = 0; i < 3; i++) {
    for (let j = 0; j < 3; j++) {
      let sum = 0;
      for (let k = 0; k < rank; k++) sum += l.hi[i * rank + k] * l.hi[j * rank + k];
      expect(sum).toBeCloseTo(w.hi[i * 3 + j], 14);
    }
  }
});

test("singular values twenty powers of ten apart keep their digits although the rows are mixed", () => {
  // Rows of a rotation times diag(1, 1e-20), the smaller part held in the low words.
  const [c, s] = [0.6, 0.8];
  const x: Wide = { hi: Float64Array.of(c, 0, -s, 0), lo: new Float64Array(4) };
  x.hi[1] = s * 1e-20;
  x.hi[3] = c * 1e-20;
  const [large, small] = wideSingularValues(x, 2, 2);
  expect(large).toBeCloseTo(1, 15);
  expect(small / 1e-20).toBeCloseTo(1, 13);
});

test("singular values agree with the trace and the determinant of random matrices", () => {
  const random = seededUniform(8);
  for (let round = 0; round < 20; round++) {
    const [a, b, c, d] = Array.from({ length: 4 }, () => 2 * random() - 1);
    const [large, small] = wideSingularValues(wide([a, b, c, d]), 2, 2);
    expect(large * small).toBeCloseTo(Math.abs(a * d - b * c), 14);
    expect(large * large + small * small).toBeCloseTo(a * a + b * b + c * c + d * d, 14);
  }
});
