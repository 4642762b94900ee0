import { expect, test } from "vitest";
import { changeText, weightLines } from "@/components/designs/recipe/weight-words";
import type { Summary } from "@/control/design/evidence";

const figures = (settling: number | null, efforts: readonly [number, number | null][], cross: number | null): Summary => ({
  worstSettling: settling,
  worstRise: null,
  worstOvershoot: null,
  worstCrossPeak: cross === null ? null : { source: 0, signal: 1, peak: cross },
  peakEffort: efforts.map(([peak, overLimit]) => ({ peak, overLimit })),
});
const inputs = [{ name: "F1" }, { name: "F2" }];

test("a change is said in percent with its sign, one too small to matter as none", () => {
  expect(changeText(2, 2.5)).toBe("+25 %");
  expect(changeText(2, 1.5)).toBe("\u221225 %");
  expect(changeText(2, 2.001)).toBe("±0 %");
  expect(changeText(0, 1)).toBeNull();
  expect(changeText(null, 1)).toBeNull();
});

test("each weight has its line, judged by the input nearest to its limit", () => {
  const now = figures(
    2,
    [
      [100, 0.2],
      [10, 0.8],
    ],
    0.1,
  );
  const doubled = figures(
    1.8,
    [
      [300, 0.6],
      [11, 0.88],
    ],
    0.08,
  );
  const lines = weightLines(
    {
      now,
      effects: [
        { of: "state", index: 1, doubled },
        { of: "input", index: 0, doubled: null },
      ],
    },
    inputs,
  );
  expect(lines.get("state:1")).toBe("twice the weight: settling \u221210 %, F2 +10 %, cross-axis \u221220 %");
  expect(lines.get("input:0")).toBe("twice the weight: no prediction");
  expect(lines.get("state:0")).toBeUndefined();
});

test("without limits the input that moves most is judged by, without steps there is nothing to say", () => {
  const now = figures(
    null,
    [
      [100, null],
      [10, null],
    ],
    null,
  );
  const doubled = figures(
    null,
    [
      [110, null],
      [30, null],
    ],
    null,
  );
  expect(weightLines({ now, effects: [{ of: "state", index: 0, doubled }] }, inputs).get("state:0")).toBe(
    "twice the weight: F1 +10 %",
  );
  const still = figures(null, [], null);
  expect(weightLines({ now: still, effects: [{ of: "state", index: 0, doubled: still }] }, []).get("state:0")).toBe(
    "twice the weight: no steps to judge by",
  );
});
