import { Worker } from "node:worker_threads";
import { bundle } from "../bundle.mjs";

/** @typedef {import("./fuzz-worker.ts").FuzzReport} FuzzReport */
/** @typedef {{ seed: number, cases: number }} Stretch */

/** No call may take longer than this, on however busy a machine. */
const PATIENCE_MS = 20_000;
/** Plants between two words of a thread. */
const STRETCH = 250;

/** @returns {FuzzReport} */
const nothing = () => ({ answered: {}, refused: {}, findings: [], slowest: {}, spent: {} });

/**
 * Tries `cases` random plants from the seed `from` on, in threads, each plant with every function of the core. A call that does not return is a
 * finding like any other: its thread is ended and the next plant tried in a new one.
 * @param {{ from: number, cases: number, threads: number,
 *   onStretch?: (done: number, findings: FuzzReport["findings"]) => void }} options
 */
export async function watchFuzz({ from, cases, threads, onStretch }) {
  await bundle(["fuzz-worker"]);
  const whole = nothing();
  let next = from;
  let done = 0;
  const take = () => {
    const stretch = { seed: next, cases: Math.min(STRETCH, from + cases - next) };
    next += stretch.cases;
    return stretch;
  };
  const thread = async () => {
    for (let stretch = take(); stretch.cases > 0; stretch = take()) {
      /** @type {FuzzReport["findings"]} */
      const findings = [];
      for (let left = /** @type {Stretch | null} */ (stretch); left; ) {
        const { report, rest } = await tryStretch(left);
        merge(whole, report);
        findings.push(...report.findings);
        left = rest;
      }
      done += stretch.cases;
      onStretch?.(done, findings);
    }
  };
  await Promise.all(Array.from({ length: threads }, thread));
  return whole;
}

/**
 * One thread for one stretch.
 * @param {Stretch} stretch
 * @returns {Promise<{ report: FuzzReport, rest: Stretch | null }>}
 */
async function tryStretch(stretch) {
  const progress = new Int32Array(new SharedArrayBuffer(12));
  const report = nothing();
  const worker = new Worker(new URL("../../../dist/fuzz-worker.mjs", import.meta.url), {
    workerData: { ...stretch, progress },
    execArgv: ["--enable-source-maps"],
  });
  worker.on("message", (/** @type {FuzzReport} */ part) => merge(report, part));
  const problem = await new Promise((resolve) => {
    let seen = { calls: -1, at: Date.now() };
    const watch = setInterval(() => {
      const calls = Atomics.load(progress, 0);
      if (calls !== seen.calls) seen = { calls, at: Date.now() };
      else if (Date.now() - seen.at > PATIENCE_MS) resolve(`no answer after ${PATIENCE_MS / 1_000} s`);
    }, 500);
    worker.once("error", (error) => resolve(String(error)));
    worker.once("exit", () => {
      clearInterval(watch);
      resolve(null);
    });
  });
  await worker.terminate();
  if (problem === null) return { report, rest: null };
  const [, seed, call] = progress;
  report.findings.push({ seed, call: `call ${call}`, problem });
  const cases = stretch.seed + stretch.cases - seed - 1;
  return { report, rest: cases > 0 ? { seed: seed + 1, cases } : null };
}

/** @param {FuzzReport} whole @param {FuzzReport} part */
function merge(whole, part) {
  for (const key of /** @type {const} */ (["answered", "refused", "spent"]))
    for (const [name, more] of Object.entries(part[key])) whole[key][name] = (whole[key][name] ?? 0) + more;
  whole.findings.push(...part.findings);
  for (const [name, sizes] of Object.entries(part.slowest)) {
    whole.slowest[name] = sizes.map((entry, size) => {
      const before = whole.slowest[name]?.[size];
      return before && before.ms >= entry.ms ? before : entry;
    });
  }
}
