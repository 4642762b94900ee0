import { compareSpeed } from "./bench/compare-speed";
import { timeDemoPlants } from "./bench/demo-plants";
import type { OtherClock } from "./bench/timed-case";

/** What a person waits for, then the core beside SciPy. */
export async function bench(other: OtherClock): Promise<void> {
  timeDemoPlants();
  await compareSpeed(other);
}
