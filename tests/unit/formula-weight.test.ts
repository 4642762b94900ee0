import { readdirSync } from "node:fs";
import { join } from "node:path";
import { gzipSync } from "node:zlib";
import { build, type Metafile } from "esbuild";
import { expect, test } from "vitest";
import { root } from "@/lib/commands/paths.mjs";

const PARSER = "control/expression/parse-tree.ts";
const common = { absWorkingDir: root, bundle: true, write: false, format: "esm", outdir: "out", logLevel: "silent" } as const;

/** The files that are loaded together with an output, without those that it asks for later. */
function loadedWith(output: string, outputs: Metafile["outputs"], seen = new Set<string>()): Set<string> {
  if (seen.has(output)) return seen;
  seen.add(output);
  for (const { path, kind } of outputs[output]?.imports ?? []) if (kind === "import-statement") loadedWith(path, outputs, seen);
  return seen;
}

test("no component brings the parser of formulas along: it is fetched when the first formula has to be evaluated", async () => {
  const entryPoints = readdirSync(join(root, "components"), { recursive: true, encoding: "utf8" })
    .filter((file) => /\.tsx?$/.test(file))
    .map((file) => join("components", file));
  const { metafile } = await build({
    ...common,
    entryPoints,
    splitting: true,
    packages: "external",
    jsx: "automatic",
    metafile: true,
    loader: { ".css": "empty" },
  });
  const holders = Object.entries(metafile.outputs).filter(([, { inputs }]) => PARSER in inputs);
  expect(holders.map(([, { entryPoint }]) => entryPoint)).toEqual(["control/plant/evaluate-plant.ts"]);
  const [[holder]] = holders;
  const ours = Object.entries(metafile.outputs).filter(([, { entryPoint }]) => entryPoint?.startsWith("components/"));
  expect(ours.length).toBe(entryPoints.length);
  for (const [output, { entryPoint }] of ours) expect(loadedWith(output, metafile.outputs).has(holder), entryPoint).toBe(false);
});

test("the parser with everything it needs weighs at most 95 kB over the wire", async () => {
  const { outputFiles } = await build({
    ...common,
    entryPoints: ["control/expression/evaluate-expression.ts"],
    minify: true,
    platform: "browser",
  });
  const weight = gzipSync(outputFiles[0].contents, { level: 9 }).length;
  expect(weight).toBeLessThan(95_000);
  expect(weight).toBeGreaterThan(5_000);
});
