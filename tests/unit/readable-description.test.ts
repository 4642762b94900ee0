import { expect, test } from "vitest";
import { apiDescription } from "@/app/api/v1/openapi.json/description";
import { compactJson } from "@/lib/api/compact-json";
import { readable } from "@/lib/api/readable-description";
import { fieldsOf, typeInWords } from "@/lib/api/readable-schema";

test("types are told in words, matrices as rows, alternatives by their fields", () => {
  expect(typeInWords({ type: ["string", "null"], maxLength: 40 })).toBe("text, at most 40 or null");
  expect(typeInWords({ type: "array", maxItems: 60, items: { type: "array", maxItems: 12, items: { type: "number" } } })).toBe(
    "rows of number, at most 60 × 12",
  );
  expect(typeInWords({ type: "integer", minimum: 1, maximum: 100 })).toBe("whole number from 1 to 100");
  expect(typeInWords({ type: "object", additionalProperties: { type: "string", maxLength: 9 } })).toBe(
    "text, at most 9, by name",
  );
  const kind = (name: string) => ({ type: "object", properties: { kind: { type: "string", enum: [name] } } });
  expect(typeInWords({ oneOf: [kind("none"), { $ref: "#/components/schemas/Other" }] })).toBe('{ kind: "none" } or Other');
});

test("the fields of nameless objects stand under the way that leads to them", () => {
  const inner = { type: "object", properties: { tag: { type: "string" } }, required: ["tag"] };
  const fields = fieldsOf({ type: "object", properties: { axes: { type: "array", items: inner }, at: inner } });
  expect(fields.flat().map(({ name, required }) => [name, required])).toEqual([
    ["axes", false],
    ["axes[].tag", true],
    ["at", false],
    ["at.tag", true],
  ]);
});

test("every operation and every named shape of the document reaches the reader, and no name leads nowhere", async () => {
  const description = await apiDescription();
  const { groups, schemas } = readable(description);
  const operations = groups.flatMap((group) => group.operations);
  const count = Object.values(description.paths ?? {}).reduce((sum, item) => sum + Object.keys(item ?? {}).length, 0);
  expect(operations.length).toBe(count);
  expect(schemas.map(({ name }) => name)).toEqual(Object.keys(description.components?.schemas ?? {}));
  const told = [
    ...operations.flatMap(({ body, replies }) => [body ?? "", ...replies.map(({ type }) => type)]),
    ...fieldTypes(schemas),
  ];
  const names = told.flatMap((text) => text.match(/\b[A-Z][a-z][A-Za-z]*\b/g) ?? []);
  expect(names.length).toBeGreaterThan(50);
  for (const name of names)
    expect(
      schemas.some((schema) => schema.name === name),
      name,
    ).toBe(true);
});

const fieldTypes = (schemas: ReturnType<typeof readable>["schemas"]) =>
  schemas.flatMap(({ alternatives }) => alternatives.flatMap((fields) => fields.map(({ type }) => type)));

test("compact JSON is the same JSON, with short parts on one line", () => {
  const value = {
    A: [
      [1, -2.5e-7, null],
      ["a, b", { c: [] }],
    ],
    long: Array.from({ length: 40 }, (_, index) => index),
    empty: {},
  };
  const text = compactJson(value);
  expect(JSON.parse(text)).toEqual(value);
  expect(text.split("\n")).toContain('  "A": [[1, -2.5e-7, null], ["a, b", { "c": [] }]],');
});
