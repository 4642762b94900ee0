import { mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join } from "node:path";
import { afterAll, describe, expect, test } from "vitest";
import { checkBoundaries } from "@/lib/commands/boundaries.mjs";
import { root } from "@/lib/commands/paths.mjs";

const folder = mkdtempSync(join(tmpdir(), "boundaries-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** A small tree with one import of every kind that is refused, and the same number that are allowed. */
const planted: Readonly<Record<string, string>> = {
  "control/clean.ts": 'export { Matrix } from "ml-matrix";',
  "control/reads-a-file.ts": 'export { readFileSync } from "node:fs";',
  "control/evaluates.ts": 'export { parse } from "mathjs";',
  "control/expression/parses.ts": 'export { parse } from "mathjs";',
  "control/turns.ts": 'import { round } from "./round"; export const turns = () => round;',
  "control/round.ts": 'import { turns } from "./turns"; export const round = () => turns;',
  "lib/schemas/plant.ts": 'export { plants } from "../../db/queries/plants";',
  "lib/schemas/clean.ts": 'export { z } from "zod"; export { Matrix } from "../../control/clean";',
  "lib/client/fetches.ts": 'export { rename } from "../services/rename";',
  "lib/services/rename.ts": 'export { plants } from "../../db/queries/plants";',
  "lib/services/answers.ts": 'export { NextResponse } from "next/server";',
  "lib/jobs/draws.ts": 'export { useState } from "react";',
  "lib/api/route.ts": 'export { plants } from "../../db/queries/plants";',
  "lib/commands/shows.ts": 'export { Name } from "../../components/name";',
  "db/queries/plants.ts": "export const plants = 1;",
  "db/queries/serves.ts": 'export { rename } from "../../lib/services/rename";',
  "components/name.tsx":
    'import type { rename } from "../lib/services/rename"; export const Name = (each: typeof rename) => each;',
  "components/asks.tsx": 'export { plants } from "../db/queries/plants";',
  "app/page.tsx": 'export { sql } from "drizzle-orm";',
  "app/clean.tsx": 'export { Name } from "../components/name";',
  "app/lost.tsx": 'export { nowhere } from "./nowhere";',
};

symlinkSync(join(root, "node_modules"), join(folder, "node_modules"));
writeFileSync(join(folder, "tsconfig.json"), '{ "compilerOptions": { "module": "esnext", "moduleResolution": "bundler" } }');
for (const [path, text] of Object.entries(planted)) {
  mkdirSync(dirname(join(folder, path)), { recursive: true });
  writeFileSync(join(folder, path), text);
}
const seen = await checkBoundaries(folder);
const found = new Set(seen.violations.map(({ rule, from }) => `${rule}: ${from}`));

describe("the import rules", () => {
  test.each([
    "control-is-pure: control/reads-a-file.ts",
    "formulas-have-one-door: control/evaluates.ts",
    "no-cycles: control/round.ts",
    "schemas-are-isomorphic: lib/schemas/plant.ts",
    "client-is-isomorphic: lib/client/fetches.ts",
    "services-know-no-framework: lib/services/answers.ts",
    "tasks-know-no-framework: lib/jobs/draws.ts",
    "requests-hold-no-query: lib/api/route.ts",
    "commands-know-no-screen: lib/commands/shows.ts",
    "db-knows-no-service: db/queries/serves.ts",
    "screens-and-routes-hold-no-query: components/asks.tsx",
    "screens-and-routes-hold-no-query: app/page.tsx",
    "components-know-no-service: components/name.tsx",
    "browser-never-reaches-the-database: components/name.tsx",
    "nothing-missing: app/lost.tsx",
  ])("find the planted %s", (expected) => {
    expect([...found]).toContain(expected);
  });

  test.each([
    "control/clean.ts",
    "control/expression/parses.ts",
    "lib/schemas/clean.ts",
    "lib/services/rename.ts",
    "app/clean.tsx",
  ])("let %s pass", (path) => {
    expect([...found].filter((each) => each.endsWith(path))).toEqual([]);
  });

  test("are not content with a tree in which they can read nothing", async () => {
    const empty = mkdtempSync(join(folder, "empty-"));
    mkdirSync(join(empty, "control"));
    writeFileSync(join(empty, "tsconfig.json"), "{}");
    writeFileSync(join(empty, "outside.ts"), "export {};");
    await expect(checkBoundaries(empty)).rejects.toThrow("no module");
  });
});

const sources = ["app", "components", "control", "db", "lib"].flatMap((part) =>
  readdirSync(join(root, part), { recursive: true, encoding: "utf8" })
    .filter((path) => /\.(tsx?|mjs)$/.test(path))
    .map((path) => ({ path: `${part}/${path}`, text: readFileSync(join(root, part, path), "utf8") })),
);
const where = (pattern: RegExp) => sources.filter(({ text }) => pattern.test(text)).map(({ path }) => path);

const { modules, violations } = await checkBoundaries(root);

describe("the sources", () => {
  test("keep the import rules", () => {
    expect(violations).toEqual([]);
  });

  test("parse formulas in one module alone", () => {
    const importers = modules.filter(({ dependencies }) =>
      dependencies.some(({ resolved }) => resolved.includes("node_modules/mathjs/")),
    );
    expect(importers).toHaveLength(1);
    expect(importers[0].source).toMatch(/^control\/expression\//);
  });

  test("never evaluate a formula, put raw HTML into a page or raw text into a statement", () => {
    expect(where(/dangerouslySetInnerHTML/)).toEqual([]);
    expect(where(/\bsql\.raw\b/)).toEqual([]);
    expect(where(/\bnew Function\b|\beval\(/)).toEqual([]);
  });

  test("read the environment in lib/env.ts alone, commands apart", () => {
    expect(where(/\bprocess\.env\b/).filter((path) => !path.startsWith("lib/commands/"))).toEqual(["lib/env.ts"]);
  });

  test("mark every query and service as the server's own", () => {
    const servers = sources.filter(
      ({ path }) => /^(db\/(queries\/|client\.ts)|lib\/services\/)/.test(path) && path.endsWith(".ts"),
    );
    // A module of types alone leaves nothing that a browser could run.
    const running = servers.filter(({ text }) => /^export (async |default )?(function|const|class|let)/m.test(text));
    expect(running.filter(({ text }) => !text.includes('import "server-only"')).map(({ path }) => path)).toEqual([]);
  });

  test("stay under the ceiling of 300 lines a file", () => {
    expect(sources.filter(({ text }) => text.split("\n").length > 301).map(({ path }) => path)).toEqual([]);
  });
});
