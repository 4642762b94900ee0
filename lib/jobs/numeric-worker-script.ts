import { execFile } from "node:child_process";
import { join } from "node:path";
import { promisify } from "node:util";
import { isProduction } from "@/lib/env";

const SECONDS = 60;

/**
 * Where the bundled worker lies. Outside production it is bundled anew by each process that needs it, in a process of its own,
 * so that neither bundler ever sees the other.
 */
export async function numericWorkerScript(): Promise<string> {
  // From the working folder and at run time: the bundler of the pages must not follow this path.
  const inProject = (...path: string[]) => join(/* turbopackIgnore: true */ process.cwd(), ...path);
  if (!isProduction()) {
    await promisify(execFile)(process.execPath, [inProject("lib", "commands", "bundle.mjs"), "numeric-worker"], {
      timeout: SECONDS * 1000,
    });
  }
  return inProject("dist", "numeric-worker.mjs");
}
