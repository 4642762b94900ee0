import { fileURLToPath } from "node:url";
import { defineConfig } from "vitest/config";

const at = (path: string) => fileURLToPath(new URL(path, import.meta.url));
const withoutDatabase = ["unit", "published", "property"];
const withDatabase = ["db", "api", "security", "failure"];

const project = (name: string, globalSetup: string[]) => ({
  extends: true as const,
  test: { name, include: [`tests/${name}/**/*.test.{ts,tsx}`], globalSetup },
});

export default defineConfig({
  root: at(".."),
  resolve: {
    alias: [
      { find: /^@\//, replacement: at("../") },
      { find: /^server-only$/, replacement: at("./helpers/server-only.ts") },
    ],
  },
  test: {
    maxWorkers: 2,
    testTimeout: 20_000,
    hookTimeout: 60_000,
    teardownTimeout: 20_000,
    passWithNoTests: false,
    allowOnly: false,
    projects: [
      ...withoutDatabase.map((name) => project(name, [])),
      ...withDatabase.map((name) => project(name, [at("./helpers/global-setup.ts")])),
    ],
    coverage: { provider: "v8", include: ["control/**", "lib/**", "db/**"], reportsDirectory: at("../coverage") },
  },
});
