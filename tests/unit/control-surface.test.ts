import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import ts from "typescript";
import { describe, expect, test } from "vitest";
import * as core from "@/control/index";
import { root } from "@/lib/commands/paths.mjs";

/** Few enough to know by heart what each is for. */
const MOST_EXPORTS = 50;
const MOST_LINES = 300;
const FIELDS = ["Shapes", "Units", "Throws", "Accuracy", "Source"];

const folder = join(root, "control");

/** Name and module of everything that `control/index.ts` exports and that is there when it runs. */
function runtimeExports(): { name: string; file: string }[] {
  const index = sourceOf(join(folder, "index.ts"));
  return index.statements.flatMap((statement) => {
    if (!ts.isExportDeclaration(statement) || statement.isTypeOnly) return [];
    const { exportClause, moduleSpecifier } = statement;
    if (!exportClause || !ts.isNamedExports(exportClause) || !moduleSpecifier || !ts.isStringLiteral(moduleSpecifier))
      throw new Error(`control/index.ts exports by name only: ${statement.getText(index)}`);
    const file = join(folder, `${moduleSpecifier.text}.ts`);
    return exportClause.elements.filter(({ isTypeOnly }) => !isTypeOnly).map(({ name }) => ({ name: name.text, file }));
  });
}

function sourceOf(file: string): ts.SourceFile {
  return ts.createSourceFile(file, readFileSync(file, "utf8"), ts.ScriptTarget.ES2023, true);
}

/** The comment before the declaration of a name. */
function docstring({ name, file }: { name: string; file: string }): string {
  const source = sourceOf(file);
  const declaration = source.statements.find(
    (statement) =>
      ((ts.isFunctionDeclaration(statement) || ts.isClassDeclaration(statement)) && statement.name?.text === name) ||
      (ts.isVariableStatement(statement) &&
        statement.declarationList.declarations.some((one) => one.name.getText(source) === name)),
  );
  if (!declaration) return "";
  const comments = ts.getLeadingCommentRanges(source.text, declaration.getFullStart()) ?? [];
  return comments
    .map(({ pos, end }) => source.text.slice(pos, end))
    .filter((comment) => comment.startsWith("/**"))
    .join("\n");
}

const exported = runtimeExports();
const functions = exported.filter(({ name }) => {
  const value: unknown = Reflect.get(core, name);
  return typeof value === "function" && !/^[A-Z]/.test(name);
});

describe("the surface of the core", () => {
  test("is what the index names, no more, and stays small", () => {
    expect(exported.map(({ name }) => name).sort()).toEqual(Object.keys(core).sort());
    expect(exported.length).toBeGreaterThan(20);
    expect(exported.length).toBeLessThanOrEqual(MOST_EXPORTS);
  });

  test.each(exported)("$name says what it is", (one) => {
    expect(docstring(one)).toMatch(/^\/\*\*[\s\S]*[A-Za-z]{3}/);
  });

  test.each(functions)("$name states its shapes, units, refusals, accuracy and source", (one) => {
    const text = docstring(one);
    const stated = FIELDS.filter((field) => new RegExp(`^ \\* ${field} {2,}\\S`, "m").test(text));
    expect(stated).toEqual(FIELDS);
  });
});

test("every module of the core is short enough to read at once", () => {
  const modules = readdirSync(folder, { recursive: true, encoding: "utf8" }).filter((path) => path.endsWith(".ts"));
  expect(modules.length).toBeGreaterThan(100);
  const lines = (path: string) => readFileSync(join(folder, path), "utf8").trimEnd().split("\n").length;
  expect(modules.filter((path) => lines(path) >= MOST_LINES)).toEqual([]);
});
