import "./node-version.mjs";
import { runCommand } from "./command.mjs";

await runCommand(
  async () => {
    const { checkReference } = await import("./reference/check.mjs");
    const { failed } = await checkReference();
    return failed === 0 ? 0 : 1;
  },
  { interrupted: 130 },
);
