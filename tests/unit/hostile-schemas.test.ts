import { readdirSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, test } from "vitest";
import { z } from "zod";
import { issuesOf, issueWords } from "@/lib/schemas/issues";
import { almostRight, hostileValue } from "../helpers/hostile-values";
import { processorMs } from "../helpers/processor-time";
import { seededUniform } from "../helpers/seeded";

const folder = fileURLToPath(new URL("../../lib/schemas/", import.meta.url));
const files = readdirSync(folder).filter((file) => file.endsWith(".ts"));

async function schemasOf(file: string): Promise<[string, z.ZodType][]> {
  const module: Record<string, unknown> = await import(/* @vite-ignore */ `${folder}${file}`);
  return Object.entries(module).flatMap(([name, value]) => (value instanceof z.ZodType ? [[name, value]] : []));
}
const schemas = (await Promise.all(files.map(schemasOf))).flat();

/** Every number in it is one that JSON has; facts of refusals and audit events, which nobody sends in, are left open. */
const holdsFinite = (value: unknown): boolean => {
  if (typeof value === "number") return Number.isFinite(value);
  if (typeof value !== "object" || value === null) return true;
  return Object.entries(value).every(([name, inner]) => name === "data" || holdsFinite(inner));
};

let taken = 0;

describe("parses whatever it is given, and says in a few words what has to change", () => {
  test.each(schemas)("%s", (name, schema) => {
    const random = seededUniform([...name].reduce((sum, sign) => 31 * sum + sign.charCodeAt(0), 7));
    for (let round = 0; round < 200; round++) {
      const value = round % 4 === 0 ? hostileValue(random) : almostRight(schema, random, [0, 0.02, 0.2, 0.5][round % 4]);
      const began = processorMs();
      const { success, data, error } = schema.safeParse(value, { error: issueWords });
      expect(processorMs() - began, `round ${round}`).toBeLessThan(500);
      if (success) {
        taken += 1;
        expect(holdsFinite(data), `round ${round}`).toBe(true);
        continue;
      }
      const issues = issuesOf(error);
      expect(issues.length).toBeGreaterThan(0);
      expect(issues.length).toBeLessThanOrEqual(50);
      for (const { pointer, detail } of issues) {
        expect(pointer).toMatch(/^(\/.*)?$/s);
        expect(detail, `round ${round} at ${pointer}`).toMatch(/^["A-Z]/);
        expect(detail).not.toMatch(/undefined|\[object|NaN/);
      }
    }
    expect("polluted" in {}).toBe(false);
  });
});

test("what was tried came close enough: many values were right", () => {
  expect(schemas.length).toBeGreaterThan(80);
  expect(taken).toBeGreaterThan(2_000);
});
