import "./node-version.mjs";
import { runCommand } from "./command.mjs";
import { ensurePackages } from "./packages.mjs";
import { explain } from "./stop.mjs";
import { closingLine, one, sum } from "./test-report.mjs";

const filters = process.argv.slice(2);

await runCommand(
  async () => {
    /** @type {import("./test-report.mjs").Tally[]} */
    const tallies = [];
    try {
      ensurePackages({ development: true });
      const { testAll } = await import("./test-run.mjs");
      await testAll(filters, (tally) => tallies.push(tally));
    } catch (error) {
      explain(error);
      tallies.push(one(false));
    }
    const all = sum(tallies);
    console.log(`\n${closingLine(all)}`);
    return all.failed === 0 && all.passed > 0 ? 0 : 1;
  },
  { interrupted: 130 },
);
