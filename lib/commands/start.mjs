import "./node-version.mjs";
import { runCommand } from "./command.mjs";
import { ensurePackages } from "./packages.mjs";

await runCommand(
  async () => {
    ensurePackages({ development: false });
    // Only now can modules be loaded that use packages.
    const { serve } = await import("./serve.mjs");
    return serve();
  },
  { interrupted: 0 },
);
