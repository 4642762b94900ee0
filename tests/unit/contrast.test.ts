import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";

// Pairs that the components use; floors from WCAG 2.2, success criteria 1.4.3 (text) and 1.4.11 (controls, graphics).
const css = readFileSync(new URL("../../app/globals.css", import.meta.url), "utf8");

type Rgb = readonly [number, number, number];
const rgb = (hex: string): Rgb => [1, 3, 5].map((at) => Number.parseInt(hex.slice(at, at + 2), 16)) as unknown as Rgb;

const tokens = new Map(
  [...css.matchAll(/--([a-z0-9-]+): light-dark\((#[0-9a-f]{6}), (#[0-9a-f]{6})\);/g)].map(([, name, light, dark]) => [
    name,
    { light: rgb(light), dark: rgb(dark) },
  ]),
);
const percent = (name: string) => {
  const found = new RegExp(`--${name}: (\\d+)%;`).exec(css);
  if (!found) throw new Error(`no token --${name}`);
  return Number(found[1]) / 100;
};

type Theme = "light" | "dark";
const THEMES: readonly Theme[] = ["light", "dark"];

function colour(name: string, theme: Theme): Rgb {
  const pair = tokens.get(name);
  if (!pair) throw new Error(`no token --${name}`);
  return pair[theme];
}

/** Relative luminance and contrast ratio as WCAG 2.2 defines them. */
function luminance(color: Rgb): number {
  const [r, g, b] = color.map((channel) => {
    const c = channel / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}
function contrast(a: Rgb, b: Rgb): number {
  const [low, high] = [luminance(a), luminance(b)].sort((x, y) => x - y);
  return (high + 0.05) / (low + 0.05);
}
const mix = (over: Rgb, under: Rgb, share: number): Rgb =>
  over.map((channel, i) => channel * share + under[i] * (1 - share)) as unknown as Rgb;

const AXES = ["axis-1", "axis-2", "axis-3", "axis-4", "axis-5", "axis-6", "axis-7", "axis-8", "axis-none"];
const GROUNDS = ["paper", "sheet"];
const STATES = ["met", "caution", "unmet"];

const TEXT: readonly (readonly [string, string])[] = [
  ...GROUNDS.flatMap((ground) => ["ink", "soft", "unmet-mark"].map((text) => [text, ground] as const)),
  ...STATES.flatMap((state) => [
    ["ink", state] as const,
    [`${state}-mark`, "sheet"] as const,
    [`${state}-mark`, "paper"] as const,
  ]),
  ["unmet-mark", "unmet"],
  ["on-action", "action"],
  ["on-action", "soft"],
  ["ink", "rule"],
  ["sheet", "ink"],
];

const GRAPHICS: readonly (readonly [string, string])[] = [
  ...GROUNDS.flatMap((ground) => [...AXES, "ghost", "control", "focus", "action"].map((mark) => [mark, ground] as const)),
  ...STATES.flatMap((state) => [[`${state}-mark`, state] as const, ["focus", state] as const, ["ink", state] as const]),
];

describe.each(THEMES)("in the %s theme", (theme) => {
  test.each(TEXT)("text in %s on %s reaches 4.5 to 1", (text, ground) => {
    expect(contrast(colour(text, theme), colour(ground, theme))).toBeGreaterThanOrEqual(4.5);
  });

  test.each(GRAPHICS)("the mark %s on %s reaches 3 to 1", (mark, ground) => {
    expect(contrast(colour(mark, theme), colour(ground, theme))).toBeGreaterThanOrEqual(3);
  });

  test.each(AXES)("figures stay readable on the weave of %s, even where a hatch line crosses them", (axis) => {
    const sheet = colour("sheet", theme);
    for (const share of [percent("weave-own"), percent("weave-hatch-most")]) {
      const ground = mix(colour(axis, theme), sheet, share);
      expect(contrast(colour("ink", theme), ground)).toBeGreaterThanOrEqual(4.5);
    }
  });
});

test("every colour of the sheet is given for both themes, and the axes of the design are all there", () => {
  expect(tokens.size).toBeGreaterThanOrEqual(25);
  for (const axis of AXES) expect(tokens.has(axis)).toBe(true);
});
