import { describe, expect, test } from "vitest";
import type { PoleEntry } from "../../control/design/recipe";
import type { NumericalError } from "../../control/errors";
import { complexExponential } from "../../control/poles/complex-exponential";
import { requireStablePoles } from "../../control/poles/require-stable-poles";
import { polesPerEntry, resolvePoles } from "../../control/poles/resolve-poles";

const continuous = { kind: "continuous" } as const;
const sampled = { kind: "sampled", period: 0.1 } as const;

function refusal(run: () => unknown): NumericalError {
  try {
    run();
  } catch (error) {
    return error as NumericalError;
  }
  throw new Error("expected a refusal");
}

describe("resolvePoles", () => {
  test("lists the poles of each kind of entry in the order of the entries", () => {
    const entries: PoleEntry[] = [
      { kind: "real", value: -1 },
      { kind: "pair", re: -2, im: -3 },
      { kind: "damping", frequency: 5, damping: 0.6 },
      { kind: "time-constant", seconds: 0.25 },
    ];
    expect(resolvePoles(entries, continuous)).toEqual([
      { re: -1, im: 0 },
      { re: -2, im: 3 },
      { re: -2, im: -3 },
      { re: -3, im: 4 },
      { re: -3, im: -4 },
      { re: -4, im: 0 },
    ]);
    expect(entries.map(polesPerEntry)).toEqual([1, 2, 2, 1]);
  });

  test("gives two real poles for damping of one and above, the slow one without cancellation", () => {
    const [critical, other] = resolvePoles([{ kind: "damping", frequency: 3, damping: 1 }], continuous);
    expect([critical, other]).toEqual([
      { re: -3, im: 0 },
      { re: -3, im: 0 },
    ]);
    const [slow, fast] = resolvePoles([{ kind: "damping", frequency: 1, damping: 1e9 }], continuous);
    expect(slow.re).toBeCloseTo(-5e-10, 24);
    expect(fast.re).toBeCloseTo(-2e9, 0);
  });

  test("keeps negative damping as an unstable pair, which the stability check then names", () => {
    const poles = resolvePoles(
      [
        { kind: "real", value: -1 },
        { kind: "damping", frequency: 2, damping: -0.5 },
      ],
      continuous,
    );
    expect(poles[1].re).toBe(1);
    const error = refusal(() => requireStablePoles(poles, continuous));
    expect(error.code).toBe("unstable-pole");
    expect(error.data).toEqual({ index: 1, pole: poles[1] });
    expect(resolvePoles([{ kind: "damping", frequency: 1, damping: -1 }], continuous)[0].re).toBe(1);
  });

  test("maps damping and time constants by exp(s h) for a sampled plant, and leaves poles in z alone", () => {
    const [z] = resolvePoles([{ kind: "time-constant", seconds: 0.2 }], sampled);
    expect(z.re).toBeCloseTo(Math.exp(-0.5), 15);
    const [upper, lower] = resolvePoles([{ kind: "damping", frequency: 4, damping: 0.5 }], sampled);
    const size = Math.exp(-0.2);
    const angle = 0.4 * Math.sqrt(0.75);
    expect(upper.re).toBeCloseTo(size * Math.cos(angle), 15);
    expect(upper.im).toBeCloseTo(size * Math.sin(angle), 15);
    expect(lower).toEqual({ re: upper.re, im: -upper.im });
    expect(resolvePoles([{ kind: "pair", re: 0.5, im: 0.2 }], sampled)[0]).toEqual({ re: 0.5, im: 0.2 });
  });

  test.each<[string, PoleEntry]>([
    ["a time constant of zero", { kind: "time-constant", seconds: 0 }],
    ["a negative time constant", { kind: "time-constant", seconds: -1 }],
    ["a frequency of zero", { kind: "damping", frequency: 0, damping: 0.7 }],
    ["an infinite pole", { kind: "real", value: Number.POSITIVE_INFINITY }],
    ["a pole that is not a number", { kind: "pair", re: Number.NaN, im: 1 }],
    ["an oscillation beyond half the sampling rate", { kind: "damping", frequency: 40, damping: 0.1 }],
  ])("refuses %s with the place of the entry, and gives the entry back where it is finite", (_, entry) => {
    const error = refusal(() => resolvePoles([{ kind: "real", value: 0.5 }, entry], sampled));
    expect(error.code).toBe("bad-option");
    const given = JSON.stringify(entry).includes("null") ? {} : { given: entry };
    expect(error.data).toEqual({ option: "poles", index: 1, ...given });
  });
});

test("resolvePoles refuses a continuous pole beyond the largest number", () => {
  const entry: PoleEntry = { kind: "damping", frequency: 1e300, damping: 1e300 };
  expect(refusal(() => resolvePoles([entry], continuous)).data).toEqual({ option: "poles", index: 0, given: entry });
});

describe("requireStablePoles", () => {
  test("accepts the open left half plane and the open unit disk, and nothing on the boundary", () => {
    expect(() => requireStablePoles([{ re: -1e-300, im: 5 }], continuous)).not.toThrow();
    expect(refusal(() => requireStablePoles([{ re: 0, im: 1 }], continuous)).code).toBe("unstable-pole");
    expect(() =>
      requireStablePoles(
        [
          { re: 0, im: 0 },
          { re: -0.99, im: 0.1 },
        ],
        sampled,
      ),
    ).not.toThrow();
    expect(refusal(() => requireStablePoles([{ re: 0.6, im: 0.8 }], sampled)).code).toBe("unstable-pole");
    expect(refusal(() => requireStablePoles([{ re: -1, im: 0 }], sampled)).code).toBe("unstable-pole");
  });
});

describe("complexExponential", () => {
  test("stays within 4 ε of the platform's functions over the whole range of a sampled loop", () => {
    for (let k = 0; k <= 400; k++) {
      const re = 2 - (k * k) / 400;
      const im = (Math.PI * ((k * 37) % 401)) / 401;
      const found = complexExponential({ re, im });
      const size = Math.exp(re);
      const distance = Math.abs(found.re - size * Math.cos(im)) + Math.abs(found.im - size * Math.sin(im));
      expect(distance).toBeLessThanOrEqual(4 * Number.EPSILON * size);
    }
  });

  test("is exact at zero, and zero far to the left", () => {
    expect(complexExponential({ re: 0, im: 0 })).toEqual({ re: 1, im: 0 });
    expect(complexExponential({ re: -1e6, im: 0 }).re).toBe(0);
  });
});
