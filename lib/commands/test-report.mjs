import { existsSync, readFileSync } from "node:fs";

/** @typedef {{ passed: number, failed: number, skipped: number }} Tally */

/** @param {boolean} passed @returns {Tally} */
export const one = (passed) => ({ passed: passed ? 1 : 0, failed: passed ? 0 : 1, skipped: 0 });

/** @param {readonly Tally[]} tallies @returns {Tally} */
export const sum = (tallies) =>
  tallies.reduce(
    (all, each) => ({ passed: all.passed + each.passed, failed: all.failed + each.failed, skipped: all.skipped + each.skipped }),
    { passed: 0, failed: 0, skipped: 0 },
  );

/**
 * Counts a run by its report. A run that crashed, told nothing or ran no test counts as failed.
 * @param {string} file
 * @param {number} code the exit code of the run
 * @param {(report: unknown) => Tally} read
 */
export function tallyOf(file, code, read) {
  /** @type {Tally} */
  let tally = { passed: 0, failed: 0, skipped: 0 };
  try {
    if (existsSync(file)) tally = read(JSON.parse(readFileSync(file, "utf8")));
  } catch {
    return sum([tally, one(false)]);
  }
  const silent = code !== 0 && tally.failed === 0;
  return silent || tally.passed + tally.failed === 0 ? sum([tally, one(false)]) : tally;
}

/** @param {unknown} report @returns {Tally} */
export function readVitest(report) {
  const { numPassedTests, numFailedTests, numPendingTests, numTodoTests, testResults } =
    /** @type {Record<"numPassedTests" | "numFailedTests" | "numPendingTests" | "numTodoTests", number> & { testResults: { status: string, assertionResults: { status: string }[] }[] }} */ (
      report
    );
  // A file that cannot be loaded fails without any test of it having failed.
  const broken = testResults.filter(
    (file) => file.status === "failed" && !file.assertionResults.some(({ status }) => status === "failed"),
  );
  return { passed: numPassedTests, failed: numFailedTests + broken.length, skipped: numPendingTests + numTodoTests };
}

/**
 * A browser test that passed at its second try has failed once: it counts as failed.
 * @param {unknown} report
 * @returns {Tally}
 */
export function readPlaywright(report) {
  const { stats, errors } =
    /** @type {{ stats: Record<"expected" | "unexpected" | "flaky" | "skipped", number>, errors: unknown[] }} */ (report);
  return { passed: stats.expected, failed: stats.unexpected + stats.flaky + errors.length, skipped: stats.skipped };
}

/** @param {Tally} tally */
export const closingLine = ({ passed, failed, skipped }) =>
  `${passed} passed, ${failed} failed${skipped ? `, ${skipped} skipped` : ""}`;
