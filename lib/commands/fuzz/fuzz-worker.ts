import { parentPort, workerData } from "node:worker_threads";
import { NumericalError } from "@/control/errors";
import { CORE_CALLS, refusalWords, staysStable } from "./core-calls";
import { type HostileProblem, hostileProblem } from "./hostile-problem";
import { strayNumber } from "./stray-number";

export type Finding = { readonly seed: number; readonly call: string; readonly problem: string };
export type FuzzReport = {
  readonly answered: Record<string, number>;
  readonly refused: Record<string, number>;
  readonly findings: Finding[];
  /** Longest call in milliseconds, by name and by the number of states: up to `SIZES`. */
  readonly slowest: Record<string, { ms: number; seed: number }[]>;
  /** Milliseconds in all, by name. */
  readonly spent: Record<string, number>;
};

const SIZES = [4, 8, 20];
/** Of one function in one report: the first ones tell enough. */
const MOST_FINDINGS = 20;
/** A report every so many plants, so that a thread that has to be ended takes little with it. */
const PART = 25;

type Task = { readonly seed: number; readonly cases: number; readonly progress: Int32Array };

/** The whole program of one fuzzing thread. `progress` tells its watcher which call is under way, should it never return. */
function fuzz({ seed, cases, progress }: Task): void {
  const names = Object.keys(CORE_CALLS);
  for (let start = seed; start < seed + cases; start += PART) {
    const report: FuzzReport = { answered: {}, refused: {}, findings: [], slowest: {}, spent: {} };
    for (let plant = start; plant < Math.min(start + PART, seed + cases); plant++) {
      const problem = hostileProblem(plant);
      Atomics.store(progress, 1, plant);
      names.forEach((name, index) => {
        Atomics.store(progress, 2, index);
        Atomics.add(progress, 0, 1);
        tryCall(name, problem, report);
      });
    }
    parentPort?.postMessage(report);
  }
}

function tryCall(name: string, problem: HostileProblem, report: FuzzReport): void {
  const began = performance.now();
  const fault = faultOf(name, problem, report);
  noteTime(report, name, problem, performance.now() - began);
  if (fault && report.findings.filter(({ call }) => call === name).length < MOST_FINDINGS)
    report.findings.push({ seed: problem.seed, call: name, problem: fault });
}

/** What is wrong with one call, or null. */
function faultOf(name: string, problem: HostileProblem, { answered, refused }: FuzzReport): string | null {
  try {
    const answer = CORE_CALLS[name](problem);
    answered[name] = (answered[name] ?? 0) + 1;
    const stray = strayNumber(answer.value);
    if (stray !== null) return `a number that is none at ${stray}`;
    if (answer.holds === false) return "its own bound does not hold";
    return staysStable(answer, problem) ? null : "the gain does not stabilise";
  } catch (error) {
    if (!(error instanceof NumericalError)) return described(error);
    refused[name] = (refused[name] ?? 0) + 1;
    return oddWords(error, problem);
  }
}

function oddWords(error: NumericalError, problem: HostileProblem): string | null {
  try {
    refusalWords(error, problem);
    return null;
  } catch (odd) {
    return described(odd);
  }
}

const described = (error: unknown) => (error instanceof Error ? (error.stack ?? error.message) : String(error)).slice(0, 600);

function noteTime({ slowest, spent }: FuzzReport, name: string, { n, seed }: HostileProblem, ms: number): void {
  spent[name] = (spent[name] ?? 0) + ms;
  const size = SIZES.findIndex((limit) => n <= limit);
  slowest[name] ??= SIZES.map(() => ({ ms: 0, seed: 0 }));
  if (ms > slowest[name][size].ms) slowest[name][size] = { ms, seed };
}

fuzz(workerData);
