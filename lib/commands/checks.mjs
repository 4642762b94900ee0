import { checkBoundaries } from "./boundaries.mjs";
import { runChild } from "./children.mjs";
import { root, script } from "./paths.mjs";

/** @typedef {{ name: string, run: () => Promise<boolean> }} Check */

/** @param {string} name @param {string} program @param {string[]} args */
const passes = async (name, program, args) =>
  (await runChild(process.execPath, [program, ...args], { name, cwd: root, seconds: 300 })).code === 0;

async function boundariesHold() {
  const { modules, violations } = await checkBoundaries(root);
  for (const { rule, from, to } of violations) console.error(`  ${rule}: ${from} → ${to}`);
  console.log(`  ${modules.length} modules, ${violations.length} imports that are not allowed`);
  return violations.length === 0;
}

/** What can be told without running anything of ours; none of it needs the network. @type {readonly Check[]} */
export const checks = [
  {
    name: "types",
    run: async () =>
      (await passes("Route types", script("next", "dist/bin/next"), ["typegen"])) &&
      (await passes("Types", script("typescript", "bin/tsc"), ["--noEmit", "-p", "tsconfig.json"])),
  },
  { name: "types of the core", run: () => passes("Types", script("typescript", "bin/tsc"), ["-p", "control/tsconfig.json"]) },
  {
    name: "lint and format",
    run: () => passes("Lint", script("@biomejs/biome", "bin/biome"), ["check", "--error-on-warnings", "."]),
  },
  { name: "imports between folders", run: boundariesHold },
];
