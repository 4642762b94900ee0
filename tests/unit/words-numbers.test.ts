import { expect, test } from "vitest";
import { formatComplex } from "@/control/words/format-complex";
import { formatFrequency, formatNumber, formatPercent, formatSeconds } from "@/control/words/format-number";
import { leadingNames } from "@/control/words/join-names";

test.each([
  [0, "0"],
  [-0, "0"],
  [1, "1"],
  [-1.5, "−1.5"],
  [99.0272373581435, "99.03"],
  [833.3333333, "833.3"],
  [12345.6, "12350"],
  [99999.4, "1e5"],
  [123456, "1.235e5"],
  [0.0012346, "0.001235"],
  [0.00012, "1.2e−4"],
  [-4.2e-17, "−4.2e−17"],
  [9.9996, "10"],
  [0.00099996, "0.001"],
  [1.7976931348623157e308, "1.798e308"],
  [5e-324, "4.941e−324"],
  [2.4525, "2.453"],
])("%d is shown as %s", (value, shown) => {
  expect(formatNumber(value)).toBe(shown);
});

test("other counts of digits are kept to", () => {
  expect(formatNumber(Math.PI, 2)).toBe("3.1");
  expect(formatNumber(Math.PI, 8)).toBe("3.1415927");
  expect(formatNumber(-1234, 2)).toBe("−1200");
});

test("what is no number is said to be none", () => {
  expect(formatNumber(Number.NaN)).toBe("not a number");
  expect(formatNumber(Number.NEGATIVE_INFINITY)).toBe("not a number");
});

test("a pair is written with ±, one of it with its own sign, a real pole alone", () => {
  expect(formatComplex({ re: -0.91, im: 99.0272 })).toBe("−0.91 ± 99.03 i");
  expect(formatComplex({ re: -0.91, im: -99.0272 }, { pair: false })).toBe("−0.91 − 99.03 i");
  expect(formatComplex({ re: -0.91, im: 99.0272 }, {})).toBe("−0.91 + 99.03 i");
  expect(formatComplex({ re: -833.33333, im: 0 })).toBe("−833.3");
});

test("frequencies come in Hz, times in the unit people say, shares in percent", () => {
  expect(formatFrequency(99.0314)).toBe("15.8 Hz");
  expect(formatFrequency(2 * Math.PI * 25_000)).toBe("25 kHz");
  expect(formatSeconds(0.0012)).toBe("1.2 ms");
  expect(formatSeconds(0.553)).toBe("0.553 s");
  expect(formatSeconds(1060)).toBe("17.7 min");
  expect(formatSeconds(36_000)).toBe("10 h");
  expect(formatPercent(0.0168)).toBe("1.7 %");
});

test("signals that take part alike are named in the plant's order, whatever rounding made of their shares", () => {
  const signals = ["x1", "x2", "v1", "v2"].map((name) => ({ name }));
  const third = 1 / 3;
  expect(leadingNames([third, third + 1e-15, third - 1e-15, 0], signals)).toEqual(["x1", "x2", "v1"]);
  expect(leadingNames([0.2, 0.5, -0.25, 0.05], signals)).toEqual(["x2", "v1"]);
  expect(leadingNames([0, 0, 0, 0], signals)).toEqual([]);
});
