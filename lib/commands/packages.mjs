import { spawnSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "./paths.mjs";
import { Stop } from "./stop.mjs";

/** @typedef {{ version?: string, dev?: boolean, optional?: boolean, devOptional?: boolean, link?: boolean }} Locked */

/** @param {string} file @returns {Record<string, Locked>} */
const packagesIn = (file) => JSON.parse(readFileSync(join(root, file), "utf8")).packages;

/** @param {boolean} withDevelopment */
function upToDate(withDevelopment) {
  try {
    const installed = packagesIn("node_modules/.package-lock.json");
    return Object.entries(packagesIn("package-lock.json")).every(([path, { version, dev, optional, devOptional }]) => {
      const notNeeded = path === "" || optional || devOptional || (dev && !withDevelopment);
      return notNeeded || installed[path]?.version === version;
    });
  } catch {
    return false;
  }
}

/**
 * Installs the packages of the lock file when they are missing or other versions.
 * @param {{ development: boolean }} what
 */
export function ensurePackages({ development }) {
  if (upToDate(development)) return;
  console.log("Installing packages (npm ci) …");
  const npm = process.env.npm_execpath;
  const [program, args] = npm ? [process.execPath, [npm]] : ["npm", []];
  const all = [...args, "ci", "--no-audit", "--no-fund", "--loglevel=error", ...(development ? ["--include=dev"] : [])];
  const { status } = spawnSync(program, all, { cwd: root, stdio: ["ignore", "inherit", "inherit"], timeout: 900_000 });
  if (status !== 0) throw new Stop("The packages could not be installed. Do one thing: run npm ci, and read what it says.");
}
