import { mkdirSync, readdirSync, rmSync } from "node:fs";
import { join } from "node:path";
import { ensureChromium } from "./browser.mjs";
import { buildIfChanged } from "./build.mjs";
import { runChild } from "./children.mjs";
import { root, script } from "./paths.mjs";
import { postgresPrograms } from "./postgres-programs.mjs";
import { explain } from "./stop.mjs";
import { one, readPlaywright, readVitest, tallyOf } from "./test-report.mjs";

/** @typedef {import("./test-report.mjs").Tally} Tally */

const reports = join(root, "coverage");
/** Where the clock and its zone can matter; the numerics know neither. */
const zoned = ["unit", "db", "api"];

/** On this signal, and no other, both runners take down what they set up. */
const runner = { cwd: root, signal: /** @type {const} */ ("SIGINT"), patience: 20_000 };

/** @param {readonly string[]} filters @returns {{ vitest: string[], playwright: string[] }} */
function matching(filters) {
  const all = readdirSync(join(root, "tests"), { recursive: true, encoding: "utf8" }).map((path) => `tests/${path}`);
  const wanted = all.filter((path) => filters.length === 0 || filters.some((filter) => path.includes(filter)));
  return {
    vitest: wanted.filter((path) => /\.test\.tsx?$/.test(path)),
    playwright: wanted.filter((path) => /\.spec\.ts$/.test(path)),
  };
}

/** @param {string[]} args @param {string} [zone] @returns {Promise<Tally>} */
async function vitest(args, zone) {
  const report = join(reports, "vitest.json");
  rmSync(report, { force: true });
  const env = { ...process.env, ...(zone ? { TZ: zone } : {}) };
  const output = ["--reporter=default", "--reporter=json", `--outputFile.json=${report}`];
  const all = [script("vitest", "vitest.mjs"), "run", "--config", "tests/vitest.config.ts", ...output, ...args];
  const { code } = await runChild(process.execPath, all, { ...runner, name: "vitest", env, seconds: 1_200 });
  return tallyOf(report, code, readVitest);
}

/** @param {string[]} files @returns {Promise<Tally>} */
async function playwright(files) {
  const report = join(reports, "playwright.json");
  rmSync(report, { force: true });
  const env = { ...process.env, PLAYWRIGHT_JSON_OUTPUT_NAME: report };
  const args = ["test", "--config", "tests/playwright.config.ts", "--reporter=list,json", ...files];
  const all = [script("@playwright/test", "cli.js"), ...args];
  const { code } = await runChild(process.execPath, all, { ...runner, name: "Playwright", env, seconds: 1_800 });
  return tallyOf(report, code, readPlaywright);
}

/**
 * Runs one step and counts it; whatever it throws is a failure of the step, and the later ones still run.
 * @param {string} name
 * @param {() => Promise<Tally>} run
 */
async function step(name, run) {
  console.log(`\n── ${name}`);
  const began = Date.now();
  const tally = await run().catch((error) => {
    explain(error);
    return one(false);
  });
  console.log(`── ${name}: ${tally.passed} passed, ${tally.failed} failed after ${Math.round((Date.now() - began) / 1_000)} s`);
  return tally;
}

/**
 * The whole test run, or with filters only the test files whose path contains one of them.
 * @param {readonly string[]} filters
 * @param {(tally: Tally) => void} count
 */
export async function testAll(filters, count) {
  const whole = filters.length === 0;
  const files = matching(filters);
  mkdirSync(reports, { recursive: true });
  postgresPrograms("");
  if (files.playwright.length > 0 || whole) ensureChromium();
  if (whole) {
    const { checks } = await import("./checks.mjs");
    for (const { name, run } of checks) count(await step(name, async () => one(await run())));
    const { checkReference } = await import("./reference/check.mjs");
    count(await step("the core against SciPy", checkReference));
  }
  if (files.vitest.length > 0 || whole) count(await step("vitest", () => vitest(whole ? [] : files.vitest)));
  const zones = whole ? (process.env.GAINWRIGHT_TEST_ZONES ?? "").split(" ").filter(Boolean) : [];
  const projects = zoned.flatMap((project) => ["--project", project]);
  for (const zone of zones) count(await step(`vitest in ${zone}`, () => vitest(projects, zone)));
  if (files.playwright.length > 0 || whole) {
    const build = await step("production build", () => buildIfChanged().then(() => one(true)));
    count(build);
    if (build.failed === 0) count(await step("browser tests", () => playwright(whole ? [] : files.playwright)));
  }
}
