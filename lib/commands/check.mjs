import "./node-version.mjs";
import { runCommand } from "./command.mjs";

await runCommand(
  async () => {
    const { checks } = await import("./checks.mjs");
    let failed = 0;
    for (const { name, run } of checks) {
      console.log(`${name} …`);
      if (!(await run())) failed += 1;
    }
    console.log(failed === 0 ? "All checks passed." : `${failed} of ${checks.length} checks failed.`);
    return failed === 0 ? 0 : 1;
  },
  { interrupted: 130 },
);
