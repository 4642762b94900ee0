import type { Evidence } from "@/control/design/evidence";
import type { PlantChecks } from "@/control/plant/report";
import type { ChecksJob, DesignJob, EvaluationJob, NumericJob, NumericValue, PlantVerdict } from "./numeric-job";
import { type NumericOptions, NumericPool } from "./numeric-pool";
import { numericWorkerScript } from "./numeric-worker-script";

const THREADS = 2;

// One pool per process, also across the hot reloads of development, which evaluate this module anew.
const kept = globalThis as typeof globalThis & { gainwrightNumericPool?: Promise<NumericPool> };

export async function runNumeric(job: ChecksJob, options: NumericOptions): Promise<PlantChecks>;
export async function runNumeric(job: DesignJob, options: NumericOptions): Promise<Evidence>;
export async function runNumeric(job: EvaluationJob, options: NumericOptions): Promise<PlantVerdict>;
/** Runs the core beside the main thread. What it throws is said at `NumericPool.run`. */
export async function runNumeric(job: NumericJob, options: NumericOptions): Promise<NumericValue> {
  kept.gainwrightNumericPool ??= startPool();
  return (await kept.gainwrightNumericPool).run(job, options);
}

async function startPool(): Promise<NumericPool> {
  try {
    return new NumericPool(THREADS, await numericWorkerScript());
  } catch (error) {
    kept.gainwrightNumericPool = undefined; // so that the next request tries again
    throw error;
  }
}

export async function closeNumericPool(): Promise<void> {
  const open = kept.gainwrightNumericPool;
  kept.gainwrightNumericPool = undefined;
  await (await open)?.close();
}
