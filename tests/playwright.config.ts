import { defineConfig } from "@playwright/test";
import { chromiumPath } from "../lib/commands/browser.mjs";

export default defineConfig({
  testDir: "e2e",
  outputDir: "../test-results",
  globalSetup: "./helpers/browser-stack.ts",
  timeout: 120_000,
  globalTimeout: 1_700_000,
  expect: { timeout: 20_000 },
  workers: 2,
  forbidOnly: true,
  reporter: "list",
  use: {
    // Set by the global setup, once the stack serves.
    baseURL: process.env.BASE_URL,
    // Far from UTC and half an hour off: a time shown in the wrong zone is seen.
    timezoneId: "America/St_Johns",
    locale: "en-GB",
    trace: "retain-on-failure",
    launchOptions: {
      executablePath: chromiumPath(),
      args: [
        "--no-sandbox",
        "--disable-gpu",
        "--disable-quic",
        "--no-first-run",
        "--disable-background-networking",
        "--disable-component-update",
        "--disable-sync",
      ],
    },
  },
});
