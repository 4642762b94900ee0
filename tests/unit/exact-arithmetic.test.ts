import { Matrix } from "ml-matrix";
import { expect, test } from "vitest";
import { exactExponential, fixedDifference } from "@/lib/commands/reference/exact-exponential";
import { exactly, exactNorm, plus, times, toDouble, transposed } from "@/lib/commands/reference/exact-matrix";
import { eigenvalueErrors } from "@/lib/commands/reference/exact-polynomial";
import { exactResponse } from "@/lib/commands/reference/exact-response";

const back = (M: ReturnType<typeof exactly>) => M.rows.map((row) => row.map((x) => toDouble(x, M.exponent)));

test("whole numbers carry doubles of every size through sums and products without rounding", () => {
  const rows = [[1e300, -5e-324, 0.1, -0, 2 ** -1022]];
  expect(back(exactly(rows))).toEqual([[1e300, -5e-324, 0.1, 0, 2 ** -1022]]);
  const [a, b] = [exactly([[1, 2 ** -80]]), exactly([[1], [1]])];
  // 1 + 2^-80 - 1 is lost in doubles.
  expect(exactNorm(plus(times(a, b), exactly([[1]]), -1))).toBe(2 ** -80);
  expect(back(transposed(a))).toEqual([[1], [2 ** -80]]);
  expect(() => exactly([[Number.NaN]])).toThrow();
});

test("the error of an eigenvalue is what it is off by", () => {
  const rotation = exactly([
    [0, 2],
    [-2, 0],
  ]);
  const [right, off] = eigenvalueErrors(rotation, [
    { re: 0, im: 2 },
    { re: 1e-9, im: 2 },
  ]);
  expect(right).toBe(0);
  expect(off / 1e-9).toBeCloseTo(1, 6);
});

test("the exact exponential of a turn by one is its cosine and sine, of a chain its polynomial", () => {
  const turn = exactExponential(
    new Matrix([
      [0, 1],
      [-1, 0],
    ]),
  );
  const known = new Matrix([
    [Math.cos(1), Math.sin(1)],
    [-Math.sin(1), Math.cos(1)],
  ]);
  for (const apart of fixedDifference(turn, known)) expect(Math.abs(apart)).toBeLessThan(Number.EPSILON);
  const chain = exactExponential(
    new Matrix([
      [0, 3],
      [0, 0],
    ]),
  );
  expect(
    fixedDifference(
      chain,
      new Matrix([
        [1, 3],
        [0, 1],
      ]),
    ),
  ).toEqual([0, 0, 0, 0]);
});

test("the exact response of a lag and of an oscillator are those on paper", () => {
  // 1 / (1 + 2i) = 0.2 - 0.4i
  const lag = exactResponse(new Matrix([[-1]]), new Matrix([[1]]), new Matrix([[1]]), 2);
  expect(lag[0]).toBeCloseTo(0.2, 15);
  expect(lag[1]).toBeCloseTo(-0.4, 15);
  // 1 / (s² + s + 4) at s = i: 1 / (3 + i) = 0.3 - 0.1i
  const A = new Matrix([
    [0, 1],
    [-4, -1],
  ]);
  const oscillator = exactResponse(A, new Matrix([[0], [1]]), new Matrix([[1, 0]]), 1);
  expect(oscillator[0]).toBeCloseTo(0.3, 15);
  expect(oscillator[1]).toBeCloseTo(-0.1, 15);
});
