import { ensureChromium } from "../browser.mjs";
import { buildIfChanged } from "../build.mjs";
import { runChild } from "../children.mjs";
import { root, script } from "../paths.mjs";
import { postgresPrograms } from "../postgres-programs.mjs";

/** What the hand feels on the bench: the production build in Chromium, on a throw-away database. */
export async function benchInBrowser() {
  postgresPrograms("");
  ensureChromium();
  await buildIfChanged();
  const args = [script("@playwright/test", "cli.js"), "test", "--config", "tests/playwright-bench.config.ts", "--reporter=line"];
  const { code } = await runChild(process.execPath, args, {
    cwd: root,
    signal: "SIGINT",
    patience: 20_000,
    name: "Playwright",
    env: process.env,
    seconds: 900,
  });
  return code;
}
