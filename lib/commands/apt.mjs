import { spawnSync } from "node:child_process";
import { isRoot } from "./paths.mjs";

/** @param {string} program */
export function onPath(program) {
  const found = spawnSync("sh", ["-c", 'command -v -- "$1"', "sh", program], { encoding: "utf8" });
  return found.status === 0 ? found.stdout.trim() : undefined;
}

export const canInstall = () => isRoot && onPath("apt-get") !== undefined;

/**
 * Installs Debian packages; true when it worked. The lists are refreshed only if the first try fails.
 * @param {string[]} packages
 */
export function install(packages) {
  console.log(`Installing ${packages.join(", ")} from this system's packages …`);
  let complaint = "";
  const apt = (/** @type {string[]} */ ...args) => {
    const env = { ...process.env, DEBIAN_FRONTEND: "noninteractive" };
    const { status, stderr } = spawnSync("apt-get", ["-qq", ...args], {
      env,
      encoding: "utf8",
      stdio: ["ignore", "ignore", "pipe"],
      timeout: 900_000,
    });
    complaint = stderr;
    return status === 0;
  };
  const wanted = ["install", "-y", "--no-install-recommends", ...packages];
  const done = apt(...wanted) || (apt("update") && apt(...wanted));
  if (!done) console.error(complaint);
  return done;
}
