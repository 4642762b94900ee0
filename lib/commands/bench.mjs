import "./node-version.mjs";
import { runCommand } from "./command.mjs";

await runCommand(
  async () => {
    const { bundle } = await import("./bundle.mjs");
    await bundle(["bench"]);
    const bundled = new URL("../../dist/bench.mjs", import.meta.url);
    const { bench } = await import(bundled.href);
    bench();
    return 0;
  },
  { interrupted: 130 },
);
