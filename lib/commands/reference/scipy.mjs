import { spawn, spawnSync } from "node:child_process";
import { join } from "node:path";
import { canInstall, install } from "../apt.mjs";
import { root } from "../paths.mjs";

/** Debian's own Python: its packages belong to it alone. */
const python = "/usr/bin/python3";
const PATIENCE_MS = 120_000;

const usable = () => spawnSync(python, ["-c", "import scipy.linalg, scipy.signal"], { stdio: "ignore" }).status === 0;

/** The Python that has SciPy, installed from Debian's packages when root may do so; undefined where it cannot be had. */
export function findScipy() {
  return usable() || (canInstall() && install(["python3-scipy"]) && usable()) ? python : undefined;
}

/** One thread, and no remarks about style. */
export const oneThread = () => ({ ...process.env, OPENBLAS_NUM_THREADS: "1", OMP_NUM_THREADS: "1", PYTHONWARNINGS: "ignore" });

/**
 * Runs a script of this folder on one thread: a JSON document in, a JSON document out.
 * @param {string} script
 * @param {unknown} question
 * @returns {Promise<any>}
 */
export async function askPython(script, question) {
  const child = spawn(python, [join(root, "lib/commands", script)], {
    env: oneThread(),
    stdio: ["pipe", "pipe", "inherit"],
    timeout: PATIENCE_MS,
  });
  let text = "";
  child.stdout.setEncoding("utf8").on("data", (part) => {
    text += part;
  });
  const ended = new Promise((resolve, reject) => child.once("error", reject).once("close", resolve));
  child.stdin.end(JSON.stringify(question));
  const code = await ended;
  if (code !== 0) throw new Error(`${script} ended with ${code}.`);
  return JSON.parse(text);
}
