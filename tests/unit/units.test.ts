import { describe, expect, test } from "vitest";
import { apiDescription } from "@/app/api/v1/openapi.json/description";
import { CAUTIONS } from "@/control/words/cautions";
import { readable } from "@/lib/api/readable-description";
import type { JsonSchema } from "@/lib/api/readable-schema";
import { type GainSource, gainDocument } from "@/lib/files/gain-document";
import { gainAsCsv, gainAsJson } from "@/lib/files/gain-export";
import { smallPlant } from "../helpers/small-plant";

const UNIT =
  /\b(in seconds|in rad\/s|in percent|per second|per step|without a unit|units? of (both|the|its)|own coordinates?|in `unit`)/;

/** Places of numbers for which nothing says a unit. Whole numbers are counts, places and versions. */
function bareNumbers(schema: JsonSchema, place: string, told = false): string[] {
  const known = told || UNIT.test(schema.description ?? "");
  const kinds = [schema.type ?? []].flat();
  const inside = [
    ...Object.entries(schema.properties ?? {}).flatMap(([name, field]) => bareNumbers(field, `${place}.${name}`, known)),
    ...(schema.items ? bareNumbers(schema.items, `${place}[]`, known) : []),
    ...(typeof schema.additionalProperties === "object" ? bareNumbers(schema.additionalProperties, `${place}.*`, known) : []),
    ...[...(schema.oneOf ?? []), ...(schema.anyOf ?? [])].flatMap((one, i) => bareNumbers(one, `${place}|${i}`, known)),
  ];
  return kinds.includes("number") && !schema.enum && !known ? [place, ...inside] : inside;
}

test("every number that the API takes or gives has its unit in the description, in the words that the reader gets", async () => {
  const description = await apiDescription();
  const schemas = Object.entries(description.components?.schemas ?? {}) as [string, JsonSchema][];
  expect(
    bareNumbers({ type: "object", properties: { mass: { type: "array", items: { type: ["number", "null"] } } } }, "x"),
  ).toEqual(["x.mass[]"]);
  expect(schemas.flatMap(([name, schema]) => bareNumbers(schema, name))).toEqual([]);
  const inline = JSON.parse(JSON.stringify(description.paths ?? {}), (key, value) =>
    key === "schema" && bareNumbers(value, "inline").length > 0 ? { bare: bareNumbers(value, "inline") } : value,
  );
  expect(JSON.stringify(inline)).not.toContain('"bare"');
  const shown = readable(description).schemas.flatMap(({ alternatives }) => alternatives.flat());
  expect(shown.find(({ name }) => name === "worstSettling")?.note).toBe("in seconds");
  expect(shown.filter(({ note }) => UNIT.test(note)).length).toBeGreaterThan(60);
});

const model = smallPlant(
  {
    A: [
      [0, 1, 0],
      [0, 0, 1],
      [0, 0, 0],
    ],
    B: [[0], [0], [2]],
    C: [
      [1, 0, 0],
      [0, 0, 1],
    ],
  },
  {
    states: ["m", "m/s", "m/s²"].map((unit, i) => ({ name: `q${i}`, unit, axis: 0, scale: null })),
    inputs: [{ name: "force", unit: "N", axis: 0, scale: null, lower: null, upper: null }],
    outputs: ["m", "m/s²"].map((unit, i) => ({ name: `y${i}`, unit, axis: 0, scale: null })),
    commanded: [{ name: "travel", unit: "mm", axis: 0, amplitude: 1 }],
    operatingPoint: { states: [1, 2, 3], inputs: [4], outputs: [5, 6] },
  },
);
const verified = { residual: 1e-16, bound: 1e-14, poles: [], method: "poles" };
const full = {
  kind: "full",
  L: [
    [1, 2],
    [3, 4],
    [5, 6],
  ],
  ...verified,
} as const;
const reduced = {
  kind: "reduced",
  order: 1,
  Fw: [[-3]],
  Fy: [[1, 2]],
  Fu: [[3]],
  Gw: [[1], [2], [3]],
  Gy: [
    [1, 2],
    [3, 4],
    [5, 6],
  ],
  ...verified,
} as const;
const sourceWith = (observer: GainSource["observer"]): GainSource => ({
  plant: { name: "Cart", revision: 1 },
  design: { name: "Soft", revision: 1 },
  methodVersion: "1",
  model,
  gains: {
    K: [[1, 2, 3]],
    method: "poles",
    residual: 0,
    bound: 1e-14,
    errorBound: null,
    P: null,
    eigenvectorCondition: 2,
    poleError: 0,
  },
  reference: { F: [[7]], steadyState: [[1]], reached: [true], obstacle: null },
  observer,
});

/** One line of RFC 4180 without line breaks inside. */
const cellsOf = (line: string) =>
  [...`,${line}`.matchAll(/,(?:"((?:[^"]|"")*)"|([^,]*))/g)].map(([, quoted, plain]) => quoted ?? plain ?? "");

describe.each([
  ["a full observer", full],
  ["a reduced observer", reduced],
  ["no observer", null],
])("a gain with %s leaves without a bare number", (_, observer) => {
  const source = sourceWith(observer);

  test("as JSON: every matrix names a signal and a unit for each row and column, every value beside its unit", () => {
    const document: ReturnType<typeof gainDocument> = JSON.parse(gainAsJson(source).content);
    expect(document).toEqual(JSON.parse(JSON.stringify(gainDocument(source))));
    for (const { symbol, rows, columns, entries } of document.matrices) {
      expect([entries.length, new Set(entries.map(({ length }) => length))], symbol).toEqual([
        rows.length,
        new Set([columns.length]),
      ]);
      for (const { name, unit } of [...rows, ...columns]) expect(name && unit, `${symbol} ${name}`).toBeTruthy();
    }
    expect(document.operatingPoint).toHaveLength(6);
    for (const { name, unit } of document.operatingPoint) expect(name && unit, name).toBeTruthy();
  });

  test("as CSV: above each column and before each row stand its signal and its unit", () => {
    const lines = gainAsCsv(source).content.split("\r\n").map(cellsOf);
    const heads = lines.flatMap((_, at) => (lines[at + 1]?.[1] === "unit" ? [at] : []));
    expect(heads.length).toBe(gainDocument(source).matrices.length);
    for (const at of heads) {
      const columns = lines[at].slice(2).filter(Boolean).length;
      expect(lines[at + 1].slice(2).filter(Boolean)).toHaveLength(columns);
      for (const row of lines.slice(
        at + 2,
        lines.findIndex((cells, i) => i > at && cells.every((cell) => cell === "")),
      )) {
        expect(row[0] && row[1], lines[at][0]).toBeTruthy();
        expect(row.slice(2).filter(Boolean)).toHaveLength(columns);
      }
    }
    for (const cells of lines.filter(([first]) => first === "operating point")) expect(cells.filter(Boolean)).toHaveLength(5);
    expect(lines.filter(([first]) => first === "caution")).toHaveLength(CAUTIONS.length);
  });
});
