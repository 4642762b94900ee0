import { bundle } from "../bundle.mjs";
import { askPython, findScipy } from "./scipy.mjs";

/** @typedef {import("../test-report.mjs").Tally} Tally */

const heads = ["", "problems", "of tolerance", "error by", "ours", "SciPy's", "ours no larger"];

/**
 * Solves seeded random problems here and with SciPy, prints how far both agree, and counts the kinds of problems.
 * Without SciPy nothing is compared, which counts as skipped; on a machine of continuous integration it counts as failed.
 * @returns {Promise<Tally>}
 */
export async function checkReference() {
  if (!findScipy()) {
    console.log("Not run: SciPy was not found (on Debian: sudo apt-get install python3-scipy). Nothing was compared.");
    return process.env.CI ? { passed: 0, failed: 1, skipped: 0 } : { passed: 0, failed: 0, skipped: 1 };
  }
  await bundle(["reference"]);
  const bundled = new URL("../../../dist/reference.mjs", import.meta.url);
  /** @type {{ compareAll: typeof import("./compare.ts").compareAll }} */
  const { compareAll } = await import(bundled.href);
  let version = "";
  const rows = await compareAll(async (questions) => {
    const reply = await askPython("reference/answer.py", questions);
    version = reply.version;
    return reply;
  });
  console.log(`Against SciPy ${version}, random problems:`);
  const cells = rows.map(({ name, problems, worst, measure, ourError, theirError, ahead }) => [
    name,
    String(problems),
    worst.toPrecision(2),
    measure,
    ourError.toExponential(1),
    theirError.toExponential(1),
    `${ahead} of ${problems}`,
  ]);
  const widths = heads.map((head, k) => Math.max(head.length, ...cells.map((row) => row[k].length)));
  for (const row of [heads, ...cells]) {
    console.log(row.map((cell, k) => (k === 0 ? cell.padEnd(widths[k]) : cell.padStart(widths[k]))).join("  "));
  }
  const apart = rows.filter(({ worst }) => !(worst <= 1));
  for (const { name, worst } of apart) console.log(`Disagreement: ${name}, ${worst.toPrecision(3)} times what rounding allows.`);
  return { passed: rows.length - apart.length, failed: apart.length, skipped: 0 };
}
