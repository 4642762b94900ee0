import { switchAccelerator } from "@/control/accelerator/accelerator";
import { frequencyCases } from "./frequency-cases";
import { placementCases } from "./placement-cases";
import { responseCases } from "./response-cases";
import { riccatiCases } from "./riccati-cases";
import { spectrumCases } from "./spectrum-cases";
import type { OtherClock, TimedCase } from "./timed-case";

/** Seconds for each side in each round. */
const BUDGET = 0.06;
/** Seconds until the engine has compiled what is hot; its compiling threads count as our processor time. */
const WARMING = 0.5;
const ROUNDS = 5;
/** Of a call that takes more than this many seconds, fewer rounds tell enough. */
const LONG = 0.5;
const FEW = 3;

const median = (values: readonly number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)];

/** Processor seconds of one call, the mean over as many as fit into the budget; waiting for other work does not count. */
function timeOurs(work: () => void, budget = BUDGET): number {
  const before = process.cpuUsage();
  let calls = 0;
  for (const end = performance.now() + 1_000 * budget; calls === 0 || performance.now() < end; calls++) work();
  const { user, system } = process.cpuUsage(before);
  return (user + system) / 1e6 / calls;
}

const milliseconds = (seconds: number) => (1_000 * seconds).toPrecision(3).padStart(10);

async function timedLine({ name, target, ours, question, accelerated = true }: TimedCase, other: OtherClock): Promise<string> {
  switchAccelerator(accelerated);
  const warm = Math.max(timeOurs(ours, WARMING), (await other?.(question, BUDGET)) ?? 0);
  const rounds: { own: number; their: number }[] = [];
  for (let round = 0; round < (warm > LONG ? FEW : ROUNDS); round++)
    rounds.push({ own: timeOurs(ours), their: (await other?.(question, BUDGET)) ?? Number.NaN });
  switchAccelerator(true);
  const own = milliseconds(median(rounds.map((round) => round.own)));
  const line = `${name.padEnd(64)} ${own}`;
  if (!other) return line;
  const ratio = median(rounds.map((round) => round.own / round.their));
  const verdict = target === null ? "" : `${String(target).padStart(6)}  ${ratio <= target ? "met" : "not met"}`;
  return `${line} ${milliseconds(median(rounds.map((round) => round.their)))} ${ratio.toPrecision(2).padStart(8)} ${verdict}`;
}

/** Our processor times beside SciPy's on one thread, in alternating rounds of one run; all figures are medians of the rounds. */
export async function compareSpeed(other: OtherClock): Promise<void> {
  const heads = other ? ["ours", "SciPy", "ratio", "target"] : ["ours"];
  const widths = [10, 10, 8, 6];
  console.log(`\n${"processor milliseconds".padEnd(64)} ${heads.map((head, k) => head.padStart(widths[k])).join(" ")}`);
  const groups = [
    () => riccatiCases(false),
    () => riccatiCases(true),
    placementCases,
    spectrumCases,
    frequencyCases,
    responseCases,
  ];
  for (const cases of groups) for (const each of cases()) console.log(await timedLine(each, other));
}
