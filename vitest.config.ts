export { default } from "./tests/vitest.config.ts";
