import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, expect, test } from "vitest";
import { closingLine, readPlaywright, readVitest, sum, tallyOf } from "@/lib/commands/test-report.mjs";

const folder = mkdtempSync(join(tmpdir(), "report-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const report = (content: unknown) => {
  const file = join(folder, "report.json");
  writeFileSync(file, typeof content === "string" ? content : JSON.stringify(content));
  return file;
};
const vitest = (passed: number, failed: number, testResults: unknown[] = []) => ({
  numPassedTests: passed,
  numFailedTests: failed,
  numPendingTests: 0,
  numTodoTests: 0,
  testResults,
});

test("a run is counted by its report", () => {
  expect(tallyOf(report(vitest(7, 0)), 0, readVitest)).toEqual({ passed: 7, failed: 0, skipped: 0 });
  expect(tallyOf(report(vitest(7, 2)), 1, readVitest)).toEqual({ passed: 7, failed: 2, skipped: 0 });
  const browser = { stats: { expected: 4, unexpected: 1, flaky: 1, skipped: 2 }, errors: [] };
  expect(tallyOf(report(browser), 1, readPlaywright)).toEqual({ passed: 4, failed: 2, skipped: 2 });
});

test("a run that crashed, told nothing, ran nothing or could not load a file has failed", () => {
  expect(tallyOf(join(folder, "absent.json"), 0, readVitest).failed).toBe(1);
  expect(tallyOf(report("not json"), 0, readVitest).failed).toBe(1);
  expect(tallyOf(report("{}"), 0, readVitest).failed).toBe(1);
  expect(tallyOf(report(vitest(0, 0)), 0, readVitest).failed).toBe(1);
  expect(tallyOf(report(vitest(7, 0)), 124, readVitest)).toEqual({ passed: 7, failed: 1, skipped: 0 });
  expect(tallyOf(report(vitest(7, 0, [{ status: "failed", assertionResults: [] }])), 1, readVitest).failed).toBe(1);
  const crashed = {
    stats: { expected: 0, unexpected: 0, flaky: 0, skipped: 0 },
    errors: [{ message: "the stack did not start" }],
  };
  expect(tallyOf(report(crashed), 1, readPlaywright).failed).toBe(1);
});

test("the closing line adds up all steps", () => {
  const tallies = [
    { passed: 3, failed: 0, skipped: 0 },
    { passed: 4, failed: 1, skipped: 0 },
  ];
  expect(closingLine(sum(tallies))).toBe("7 passed, 1 failed");
  expect(closingLine({ passed: 1, failed: 0, skipped: 2 })).toBe("1 passed, 0 failed, 2 skipped");
});
