import { existsSync } from "node:fs";
import { createRequire } from "node:module";
import { join } from "node:path";
import { cruise } from "dependency-cruiser";
import extractTSConfig from "dependency-cruiser/config-utl/extract-ts-config";
import { root } from "./paths.mjs";
import { Stop } from "./stop.mjs";

const rules = createRequire(import.meta.url)(join(root, "tests/boundaries.cjs"));
const parts = ["app", "components", "control", "db", "lib", "proxy.ts", "instrumentation.ts", "instrumentation-client.ts"];

/**
 * Checks the imports of a source tree against `tests/boundaries.cjs`.
 * @param {string} baseDir
 */
export async function checkBoundaries(baseDir) {
  const { options, forbidden } = rules;
  const present = parts.filter((part) => existsSync(join(baseDir, part)));
  const { output } = await cruise(present, { ...options, baseDir, ruleSet: { forbidden, options }, validate: true }, undefined, {
    tsConfig: extractTSConfig(join(baseDir, "tsconfig.json")),
  });
  if (typeof output === "string") throw new Stop("The import check gave no result that can be read.");
  const own = output.modules.filter(({ source }) => !source.includes("node_modules") && /\.(tsx?|mjs)$/.test(source));
  // A parser that cannot read TypeScript finds nothing and is content with it.
  if (own.length === 0) throw new Stop("The import check read no module at all.");
  return {
    modules: own,
    violations: output.summary.violations.map(({ rule, from, to }) => ({ rule: rule.name, from, to })),
  };
}
