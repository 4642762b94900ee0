import { expect, test } from "vitest";
import { CAUTIONS } from "@/control/words/cautions";
import type { GainSource } from "@/lib/files/gain-document";
import { gainAsCsv, gainAsJson } from "@/lib/files/gain-export";

const K = [
  [0.1 + 0.2, -1.5, 1 / 3],
  [5e-324, -1.797_693_134_862_315_7e308, 12],
];
const source: GainSource = {
  plant: { name: "Two carriages", revision: 3 },
  design: { name: "=soft", revision: 2 },
  methodVersion: "1",
  model: {
    timeBase: { kind: "continuous" },
    axes: [],
    states: [
      { name: "-left", unit: "mm", axis: null, scale: null },
      { name: "right", unit: "mm", axis: null, scale: null },
      { name: "tilt", unit: "mrad", axis: null, scale: null },
    ],
    inputs: [
      { name: "force, left", unit: "N", axis: null, scale: null, lower: null, upper: null },
      { name: "force, right", unit: "N", axis: null, scale: null, lower: null, upper: null },
    ],
    outputs: [],
    disturbances: [],
    commanded: [{ name: "travel", unit: "mm", axis: null, amplitude: 1 }],
    ...{ A: [], B: [], C: [], D: [], E: [], H: [], J: [] },
    operatingPoint: { states: [12.5, 0, 0], inputs: [40, 0], outputs: [] },
  },
  gains: {
    K,
    method: "weights",
    residual: 1e-16,
    bound: 4e-15,
    errorBound: 2e-15,
    P: null,
    eigenvectorCondition: null,
    poleError: null,
  },
  reference: { F: [[2], [3]], steadyState: [[1]], reached: [true], obstacle: null },
  observer: null,
};

/** RFC 4180, written apart from the writer: records of cells. */
function readCsv(text: string): string[][] {
  const records: string[][] = [];
  for (const line of text.split("\r\n").slice(0, -1)) {
    const cells = [...`,${line}`.matchAll(/,(?:"((?:[^"]|"")*)"|([^,]*))/g)];
    records.push(cells.map(([, quoted, plain]) => quoted?.replaceAll('""', '"') ?? plain ?? ""));
  }
  return records;
}

test("the CSV gives back every gain bit for bit, under its signal names and units", () => {
  const records = readCsv(gainAsCsv(source).content);
  const at = records.findIndex(([first]) => first === "K");
  expect(records[at].slice(0, 5)).toEqual(["K", "state feedback gain", "'-left", "right", "tilt"]);
  expect(records[at + 1].slice(1, 5)).toEqual(["unit", "mm", "mm", "mrad"]);
  expect(records[at + 2].slice(0, 2)).toEqual(["force, left", "N"]);
  const entries = [2, 3].map((row) => records[at + row].slice(2, 5).map(Number));
  expect(entries).toEqual(K);
});

test("the JSON gives back every gain bit for bit", () => {
  const document = JSON.parse(gainAsJson(source).content);
  expect(document.matrices[0].entries).toEqual(K);
  expect(document.matrices[1]).toMatchObject({ symbol: "F", entries: [[2], [3]] });
});

test("sign equation, operating point, time base, method and every caution leave with the numbers", () => {
  for (const { content } of [gainAsCsv(source), gainAsJson(source)]) {
    expect(content).toContain("u = -K x + F r");
    expect(content).toContain("Continuous law");
    expect(content).toContain("12.5");
    expect(content).toContain("4e-15");
    for (const caution of CAUTIONS) expect(content).toContain(caution.slice(0, 60));
  }
});

test("a sampled law names its period, and an observer its equation and gain", () => {
  const sampled: GainSource = {
    ...source,
    model: {
      ...source.model,
      timeBase: { kind: "sampled", period: 0.002 },
      outputs: [{ name: "encoder", unit: "mm", axis: null, scale: null }],
    },
    reference: null,
    observer: { kind: "full", L: [[1], [2], [3]], residual: 0, bound: 1e-15, poles: [], method: "poles" },
  };
  const { content } = gainAsCsv(sampled);
  expect(content).toContain("every 0.002 s");
  expect(content).toContain("u = -K xhat,");
  expect(content).toContain("L (y(k) - C xhat(k) - D u(k))");
  expect(
    readCsv(content)
      .find(([first]) => first === "L")
      ?.slice(0, 3),
  ).toEqual(["L", "observer gain", "encoder"]);
});

test("no text of the user's opens as a formula", () => {
  for (const record of readCsv(gainAsCsv(source).content)) {
    for (const cell of record) if (Number.isNaN(Number(cell))) expect(cell).not.toMatch(/^\s*[=+\-@]/);
  }
});
