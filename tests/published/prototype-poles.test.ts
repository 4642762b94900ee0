import { describe, expect, test } from "vitest";
import { HIGHEST_PROTOTYPE_ORDER, type PrototypeSet, prototypePoles } from "@/control/poles/prototype-poles";

/** Coefficients of the product of all factors, highest power first. */
function polynomialOf(set: PrototypeSet, order: number): number[] {
  const factors = prototypePoles(set, order, 1).map((entry) => {
    if (entry.kind === "time-constant") return [1, 1 / entry.seconds];
    if (entry.kind !== "damping") throw new Error("a prototype is a damped pair or a time constant");
    return [1, 2 * entry.damping * entry.frequency, entry.frequency * entry.frequency];
  });
  return factors.reduce(
    (product, factor) => {
      const next = new Array<number>(product.length + factor.length - 1).fill(0);
      product.forEach((a, i) => {
        factor.forEach((b, j) => {
          next[i + j] += a * b;
        });
      });
      return next;
    },
    [1],
  );
}

const expectCoefficients = (set: PrototypeSet, table: readonly (readonly number[])[], digits: number) =>
  table.forEach((published, index) => {
    const computed = polynomialOf(set, index + 2);
    expect(computed).toHaveLength(published.length);
    published.forEach((coefficient, k) => {
      expect(computed[k], `${set}, order ${index + 2}, coefficient ${k}`).toBeCloseTo(coefficient, digits);
    });
  });

// Graham & Lathrop, The synthesis of optimum transient response, AIEE Transactions 72 (II), 1953, pages 273-288; order 3 re-read in
// an open textbook, the others from memory.
test("the ITAE set of 1953 has the published coefficients of orders 2 to 6", () => {
  expectCoefficients(
    "itae-1953",
    [
      [1, 1.4, 1],
      [1, 1.75, 2.15, 1],
      [1, 2.1, 3.4, 2.7, 1],
      [1, 2.8, 5, 5.5, 3.4, 1],
      [1, 3.25, 6.6, 8.6, 7.45, 3.95, 1],
    ],
    9,
  );
});

// The criterion of 1953 minimised anew: our own computation, no source.
test("the recomputed ITAE set differs from that of 1953 from the second digit on", () => {
  expectCoefficients(
    "itae",
    [
      [1, 1.505, 1],
      [1, 1.784, 2.172, 1],
      [1, 1.952, 3.346, 2.647, 1],
      [1, 2.067, 4.497, 4.673, 3.256, 1],
      [1, 2.151, 5.628, 6.932, 6.792, 3.739, 1],
    ],
    9,
  );
});

// Butterworth, On the theory of filter amplifiers, Experimental Wireless 7, 1930, pages 536-541; coefficients from memory.
test("the Butterworth set has the published coefficients of orders 2 to 6", () => {
  const two = Math.SQRT2;
  expectCoefficients(
    "butterworth",
    [
      [1, two, 1],
      [1, 2, 2, 1],
      [1, 2.613125929753, 3.414213562373, 2.613125929753, 1],
      [1, 3.2360679775, 5.2360679775, 5.2360679775, 3.2360679775, 1],
      [1, 3.863703305156, 7.464101615138, 9.14162017269, 7.464101615138, 3.863703305156, 1],
    ],
    9,
  );
});

// Thomson, Delay networks having maximally flat frequency characteristics, Proceedings of the IEE 96 (III), 1949, pages 487-490:
// reverse Bessel polynomials s² + 3s + 3, s³ + 6s² + 15s + 15, ... The coefficients follow from their closed form.
describe("the Bessel set", () => {
  const factorial = (n: number): number => (n < 2 ? 1 : n * factorial(n - 1));
  const reverseBessel = (n: number) =>
    Array.from({ length: n + 1 }, (_, i) => {
      const k = n - i;
      return factorial(2 * n - k) / (2 ** (n - k) * factorial(k) * factorial(n - k));
    });

  test("is that of the reverse Bessel polynomials, scaled to unit geometric mean, orders 1 to 6", () => {
    for (let n = 1; n <= HIGHEST_PROTOTYPE_ORDER; n++) {
      const bessel = reverseBessel(n);
      const scale = bessel[n] ** (1 / n);
      const computed = polynomialOf("bessel", n);
      bessel.forEach((coefficient, k) => {
        expect(computed[k]).toBeCloseTo(coefficient / scale ** k, 9);
      });
    }
  });
});

test("every set has unit geometric mean, scales with the frequency, and ends at order six", () => {
  for (const set of ["bessel", "itae-1953", "itae", "butterworth"] as const) {
    for (let order = 1; order <= HIGHEST_PROTOTYPE_ORDER; order++) {
      expect(polynomialOf(set, order).at(-1)).toBeCloseTo(1, 9);
      const slow = prototypePoles(set, order, 1);
      prototypePoles(set, order, 20).forEach((entry, k) => {
        const other = slow[k];
        if (entry.kind === "damping" && other.kind === "damping") {
          expect(entry.frequency).toBeCloseTo(20 * other.frequency, 12);
          expect(entry.damping).toBe(other.damping);
        } else if (entry.kind === "time-constant" && other.kind === "time-constant") {
          expect(entry.seconds).toBeCloseTo(other.seconds / 20, 12);
        } else throw new Error("the kinds of the entries depend on the frequency");
      });
    }
    expect(() => prototypePoles(set, 7, 1)).toThrow("bad-option");
    expect(() => prototypePoles(set, 2, 0)).toThrow("bad-option");
  }
});
