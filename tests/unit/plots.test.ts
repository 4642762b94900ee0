import { describe, expect, test } from "vitest";
import { axisStyle, designDash } from "@/components/plots/axis-style";
import { plotText } from "@/components/plots/overlay-data";
import { DAMPING_RAYS, PLANE, planeScale, rayEnd } from "@/components/plots/pole-plane-scale";
import type { ResponseCell, ResponseRow } from "@/components/plots/response-data";
import { CELL, responsePath, yOf } from "@/components/plots/response-path";
import { drawnLimits, rowRange } from "@/components/plots/response-scale";
import { cellCaption, cellSentence, farLimits } from "@/components/plots/response-words";

const cell = (values: number[], more: Partial<ResponseCell> = {}): ResponseCell => ({
  values,
  final: 0,
  peak: null,
  peakAt: null,
  ...more,
});
const row = (more: Partial<ResponseRow>): ResponseRow => ({
  key: "F",
  label: "F",
  unit: "N",
  axis: 0,
  kind: "effort",
  cells: [cell([0, 100, 0], { peak: 100, peakAt: 0.2 })],
  ...more,
});
const column = { key: "x", label: "x commanded 10 mm", axis: 0 };

describe("axis styles", () => {
  test("tell eight axes apart by hue and, without colour, by dash", () => {
    const styles = Array.from({ length: 8 }, (_, axis) => axisStyle(axis));
    expect(new Set(styles.map(({ hue }) => hue)).size).toBe(8);
    expect(new Set(styles.map(({ dash }) => dash)).size).toBe(8);
    expect(axisStyle(8)).toEqual(axisStyle(0));
    expect(axisStyle(null).hue).toBe("var(--axis-none)");
  });

  test("give each of six designs its own dash", () => {
    expect(new Set(Array.from({ length: 6 }, (_, design) => designDash(design))).size).toBe(6);
  });
});

describe("a row of responses", () => {
  test("has one scale that holds zero, every curve, ghosts and estimates, and the value at rest", () => {
    const range = rowRange(
      row({ cells: [cell([1, 2], { final: 3, ghost: [-4, 0] }), null, cell([0, 5], { estimated: [6, 0] })] }),
    );
    expect(range.low).toBeLessThan(-4);
    expect(range.high).toBeGreaterThan(6);
    expect(yOf(range.high, range)).toBe(0);
    expect(yOf(range.low, range)).toBe(CELL.height);
  });

  test("of nothing but zeros still has a scale", () => {
    const { low, high } = rowRange(row({ cells: [cell([0, 0])] }));
    expect(high - low).toBeGreaterThan(0);
  });

  test("draws a near limit and names a far one", () => {
    const near = row({ limits: { lower: -120, upper: 120 } });
    expect(drawnLimits(near)).toEqual([-120, 120]);
    expect(farLimits(near)).toBeNull();
    const far = row({ limits: { lower: -5000, upper: null } });
    expect(drawnLimits(far)).toEqual([]);
    expect(farLimits(far)).toBe("limit \u22125000 off scale");
  });

  test("is said in words with peak, time, settling and the limit that is hit", () => {
    const beyond = row({ limits: { lower: -90, upper: 90 } });
    const said = cellSentence(beyond, column, { ...cell([0]), peak: 100, peakAt: 0.2, settling: 0.5 });
    expect(said).toBe("x commanded 10 mm: F peak 100 N at 0.2 s, 0 N at rest, settled after 0.5 s, beyond its limit of 90 N.");
  });

  test("captions the commanded quantity with its value at rest and all others with their peak", () => {
    expect(cellCaption(cell([], { own: true, final: 10, peak: 10.5 }))).toBe("10");
    expect(cellCaption(cell([], { peak: -0.173 }))).toBe("peak \u22120.173");
  });
});

describe("a response path", () => {
  test("of many samples keeps a lone peak", () => {
    const values = new Float64Array(100_000);
    values[54_321] = 1;
    values[54_322] = -1;
    const path = responsePath(values, { low: -1, high: 1 });
    expect(path).toContain(" 0");
    expect(path).toContain(` ${CELL.height}`);
    expect(path.split("L").length).toBeLessThan(1000);
  });

  test("of a held input is stairs", () => {
    expect(responsePath([0, 1], { low: 0, high: 1 }, true)).toBe("M0 800H2000V0");
  });

  test("leaves out what is not finite", () => {
    expect(responsePath([0, Number.NaN, 1], { low: 0, high: 1 })).toBe("M0 800L2000 0");
  });
});

describe("the pole plane", () => {
  test.each([true, false])("leads from a pole to its place and back, sampled: %s", (sampled) => {
    const pole = { re: -0.3, im: 0.6 };
    const { x, y, poleAt } = planeScale([pole], sampled);
    expect(poleAt(x(pole.re), y(pole.im)).re).toBeCloseTo(pole.re, 12);
    expect(poleAt(x(pole.re), y(pole.im)).im).toBeCloseTo(pole.im, 12);
  });

  const inside = (poles: { re: number; im: number }[], sampled: boolean) => {
    const { x, y } = planeScale(poles, sampled);
    return poles.every(({ re, im }) => x(re) >= 0 && x(re) <= PLANE.width && y(im) >= 0 && y(im) <= PLANE.height);
  };

  test("has room for every pole, unstable ones too, and for none", () => {
    expect(
      inside(
        [
          { re: -800, im: 0 },
          { re: 30, im: 200 },
        ],
        false,
      ),
    ).toBe(true);
    expect(inside([{ re: 0, im: 0 }], false)).toBe(true);
    expect(inside([{ re: -1.7, im: 0.3 }], true)).toBe(true);
    expect(Number.isFinite(planeScale([], false).x(0))).toBe(true);
  });

  test("keeps the unit circle round when sampled", () => {
    const { x, y } = planeScale([], true);
    expect(x(1) - x(0)).toBeCloseTo(y(0) - y(1), 12);
  });

  test.each(DAMPING_RAYS)("draws the ray of damping %d through poles of that damping", (damping) => {
    const { re, im } = rayEnd(damping, planeScale([{ re: -10, im: 30 }], false));
    expect(-re / Math.sqrt(re * re + im * im)).toBeCloseTo(damping, 12);
  });
});

test("names with markup reach the chart library as plain text", () => {
  expect(plotText("<b>a & b</b>")).toBe("&lt;b&gt;a &amp; b&lt;/b&gt;");
});
