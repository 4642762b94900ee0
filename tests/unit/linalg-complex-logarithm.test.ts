import { expect, test } from "vitest";
import { complexLogarithm } from "../../control/linalg/complex-logarithm";
import { seededUniform } from "../helpers/seeded";

test("agrees with the engine's logarithm and angle over all magnitudes and quadrants", () => {
  const random = seededUniform(81);
  for (let trial = 0; trial < 5000; trial++) {
    const size = 10 ** (trial % 3 === 0 ? 600 * random() - 300 : 2 * random() - 1);
    const turn = 2 * Math.PI * random() - Math.PI;
    const z = { re: size * Math.cos(turn), im: size * Math.sin(turn) };
    const { re, im } = complexLogarithm(z);
    const modulus = Math.hypot(z.re, z.im);
    // Near one the engine's value of ln |z| is itself only as good as the rounded modulus.
    expect(Math.abs(re - Math.log(modulus))).toBeLessThan(4 * Number.EPSILON * (1 + Math.abs(Math.log(modulus))));
    expect(Math.abs(im - Math.atan2(z.im, z.re))).toBeLessThan(8 * Number.EPSILON);
  }
});

test("on the axes and near one", () => {
  expect(complexLogarithm({ re: 1, im: 0 })).toEqual({ re: 0, im: 0 });
  expect(complexLogarithm({ re: -1, im: 0 })).toEqual({ re: 0, im: Math.PI });
  expect(complexLogarithm({ re: 0, im: 2 })).toEqual({ re: Math.LN2, im: Math.PI / 2 });
  expect(complexLogarithm({ re: 0, im: -2 })).toEqual({ re: Math.LN2, im: -Math.PI / 2 });
  expect(complexLogarithm({ re: 5e-324, im: 0 }).re).toBeCloseTo(-1074 * Math.LN2, 12);
  // ln(1 - 2⁻⁴⁰) = -2⁻⁴⁰ - 2⁻⁸¹ - ...
  expect(complexLogarithm({ re: 1 - 2 ** -40, im: 0 }).re).toBe(-(2 ** -40) - 2 ** -81);
  // |3/5 + 4i/5| is one but for the rounding of the two fractions, which this keeps and the modulus would lose.
  const { re, im } = complexLogarithm({ re: 0.6, im: 0.8 });
  expect(Math.abs(re)).toBeLessThan(2 ** -53);
  expect(im).toBeCloseTo(Math.atan2(4, 3), 15);
});
