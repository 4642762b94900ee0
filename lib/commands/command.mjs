import { stopChildren } from "./children.mjs";
import { root } from "./paths.mjs";
import { explain } from "./stop.mjs";

/**
 * Runs a command to its exit code. However it ends, by itself, by an error or by a signal, its children are stopped first.
 * @param {() => Promise<number>} work
 * @param {{ interrupted: number }} codes the exit code after Ctrl-C or SIGTERM
 */
export async function runCommand(work, { interrupted }) {
  process.chdir(root);
  /** @type {Promise<never> | undefined} */
  let ending;
  const end = (/** @type {number} */ code) => {
    ending ??= stopChildren().then(() => process.exit(code));
    return ending;
  };
  for (const signal of /** @type {const} */ (["SIGINT", "SIGTERM", "SIGHUP"])) {
    process.on(signal, () => {
      if (!ending) console.log("\nStopping …");
      end(interrupted);
    });
  }
  try {
    await end(await work());
  } catch (error) {
    // Children that were just stopped make the work under way fail; that is no news.
    if (!ending) explain(error);
    await end(1);
  }
}
