import "./node-version.mjs";
import { runCommand } from "./command.mjs";

await runCommand(
  async () => {
    const { bundle } = await import("./bundle.mjs");
    const { startScipyClock } = await import("./bench/scipy-clock.mjs");
    await bundle(["bench"]);
    const bundled = new URL("../../dist/bench.mjs", import.meta.url);
    /** @type {typeof import("./bench.ts")} */
    const { bench } = await import(bundled.href);
    const scipy = startScipyClock();
    if (!scipy) console.log("SciPy was not found (on Debian: sudo apt-get install python3-scipy): only our own times follow.");
    await bench(scipy?.clock ?? null);
    scipy?.stop();
    const { benchInBrowser } = await import("./bench/in-browser.mjs");
    return benchInBrowser();
  },
  { interrupted: 130 },
);
