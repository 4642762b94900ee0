import { describe, expect, test } from "vitest";
import { parseNumber } from "@/components/ui/parse-number";

describe("a typed number", () => {
  test.each([
    ["1.5", 1.5],
    ["1,5", 1.5],
    ["-0,25", -0.25],
    ["\u22121.2e\u22124", -1.2e-4],
    ["1e3", 1000],
    [" 12\u00a0345,5 ", 12345.5],
    ["1.234", 1.234],
    ["0,125", 0.125],
    [",5", 0.5],
    ["1,2345", 1.2345],
    ["1,234,567", 1234567],
    ["1,234.5", 1234.5],
    ["1.234,5", 1234.5],
    ["1.234.567", 1234567],
  ])("%s is %d in every locale", (text, value) => {
    expect(parseNumber(text)).toEqual({ kind: "number", value });
  });

  test("1,234 is asked back with both readings", () => {
    expect(parseNumber("1,234")).toEqual({ kind: "ambiguous", decimal: 1.234, grouped: 1234 });
    expect(parseNumber("-12,500")).toEqual({ kind: "ambiguous", decimal: -12.5, grouped: -12500 });
  });

  test.each(["abc", "1.2.3", "1e999", "--1", "1,2,3", "NaN", "Infinity", "0x10"])("%s is refused", (text) => {
    expect(parseNumber(text)).toEqual({ kind: "not-a-number" });
  });

  test("nothing but spaces is empty", () => {
    expect(parseNumber(" \u00a0")).toEqual({ kind: "empty" });
  });
});
