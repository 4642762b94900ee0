import { mkdirSync, renameSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { root } from "./paths.mjs";

/** What runs beside the pages: file in `dist/`, without its ending, by source. */
const entries = {
  migrate: "db/migrate.ts",
  seed: "lib/commands/seed.ts",
  worker: "lib/commands/worker.ts",
  bench: "lib/commands/bench.ts",
  "fuzz-worker": "lib/commands/fuzz/fuzz-worker.ts",
  reference: "lib/commands/reference/compare.ts",
  "numeric-worker": "lib/jobs/numeric-worker.ts",
};

/** With its packages inside, a thread starts in 30 ms instead of 400. */
const selfContained = ["numeric-worker"];

/**
 * Bundles from TypeScript into `dist/`: it takes a few hundredths of a second. Each file appears whole or not at all,
 * since another process may be about to load it.
 * @param {string[]} [names]
 */
export async function bundle(names = Object.keys(entries)) {
  const { build, stop } = await import("esbuild");
  /** @param {string[]} some @param {"bundle" | "external"} packages */
  const filesOf = async (some, packages) => {
    const { outputFiles } = await build({
      entryPoints: Object.fromEntries(Object.entries(entries).filter(([name]) => some.includes(name))),
      absWorkingDir: root,
      outdir: "dist",
      outExtension: { ".js": ".mjs" },
      write: false,
      bundle: true,
      packages,
      // The package only throws outside a server bundle, which this is.
      alias: { "server-only": join(root, "node_modules/server-only/empty.js") },
      platform: "node",
      format: "esm",
      target: "node20",
      sourcemap: "inline",
      logLevel: "warning",
    });
    return outputFiles;
  };
  const inside = names.filter((name) => selfContained.includes(name));
  const beside = names.filter((name) => !selfContained.includes(name));
  const outputFiles = [...(await filesOf(inside, "bundle")), ...(await filesOf(beside, "external"))];
  await stop();
  for (const { path, contents } of outputFiles) {
    const unfinished = `${path}.${process.pid}`;
    mkdirSync(dirname(path), { recursive: true });
    writeFileSync(unfinished, contents);
    renameSync(unfinished, path);
  }
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await bundle(process.argv.slice(2));
