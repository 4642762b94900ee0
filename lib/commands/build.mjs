import { createHash } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { lastLines, runChild } from "./children.mjs";
import { root, script } from "./paths.mjs";
import { Stop } from "./stop.mjs";

const sources = [
  "app",
  "components",
  "control",
  "db",
  "drizzle",
  "lib",
  "public",
  "instrumentation.ts",
  "instrumentation-client.ts",
  "next.config.ts",
  "package-lock.json",
  "postcss.config.mjs",
  "proxy.ts",
  "tsconfig.json",
  "tsconfig.build.json",
];
const fingerprintFile = join(root, ".next", "fingerprint");

/** @param {string} path @returns {string[]} */
function filesUnder(path) {
  if (!existsSync(path)) return [];
  if (!statSync(path).isDirectory()) return [path];
  return readdirSync(path)
    .sort()
    .flatMap((name) => filesUnder(join(path, name)));
}

/** Changes with every source of the production build, and with nothing else. */
function fingerprint() {
  const hash = createHash("sha256").update(process.version);
  for (const file of sources.flatMap((source) => filesUnder(join(root, source)))) {
    hash.update(file.slice(root.length)).update(readFileSync(file));
  }
  return hash.digest("hex");
}

function builtFrom() {
  try {
    return readFileSync(fingerprintFile, "utf8");
  } catch {
    return undefined;
  }
}

/** Builds the pages for production when a source changed since the last time. */
export async function buildIfChanged() {
  const wanted = fingerprint();
  if (builtFrom() === wanted) return;
  console.log("Building the pages …");
  rmSync(fingerprintFile, { force: true });
  // Types of routes that are gone would break the type check.
  for (const stale of ["types", join("dev", "types")]) rmSync(join(root, ".next", stale), { recursive: true, force: true });
  mkdirSync(join(root, "dist"), { recursive: true });
  const { code, child } = await runChild(process.execPath, [script("next", "dist/bin/next"), "build"], {
    name: "The build",
    seconds: 900,
    cwd: root,
    log: join(root, "dist", "build.log"),
    env: { ...process.env, NODE_ENV: "production", NEXT_TELEMETRY_DISABLED: "1" },
  });
  if (code !== 0) throw new Stop("The pages could not be built:", lastLines(child, 60));
  dropSourceMaps(join(root, ".next", "static"));
  writeFileSync(fingerprintFile, wanted);
}

/** The bundler writes an empty source map for every worker, whatever its settings say. @param {string} folder */
function dropSourceMaps(folder) {
  for (const file of readdirSync(folder, { recursive: true, encoding: "utf8" })) {
    if (file.endsWith(".map")) rmSync(join(folder, file));
  }
}
