import base from "./playwright.config";

/** Times what a person feels; judged by the reader, never by a test. */
export default { ...base, testDir: "bench", testMatch: /\.bench\.ts$/, workers: 1, outputDir: "../dist/bench-results" };
