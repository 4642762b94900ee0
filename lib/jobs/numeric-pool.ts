import { Worker } from "node:worker_threads";
import type { Evidence } from "@/control/design/evidence";
import { NumericalError } from "@/control/errors";
import type { PlantChecks } from "@/control/plant/report";
import { DomainError } from "@/lib/errors";
import { FairQueue } from "./fair-queue";
import type { ChecksJob, DesignJob, EvaluationJob, NumericAnswer, NumericJob, NumericValue, PlantVerdict } from "./numeric-job";

export type NumericOptions = {
  /** Whose turn it takes. */
  readonly teamId: string;
  readonly timeoutMs?: number;
  readonly signal?: AbortSignal;
};

type Task = {
  readonly job: NumericJob;
  readonly teamId: string;
  readonly timeoutMs: number;
  readonly resolve: (value: NumericValue) => void;
  readonly reject: (reason: unknown) => void;
};
type Run = { readonly task: Task; readonly timer: NodeJS.Timeout };

const LIMITS = { running: 2, waiting: 10, waitingInAll: 60 };
const TIMEOUT_MS = 20_000;
const HEAP_MB = 512;
const RETRY_SECONDS = 3;

/** Worker threads that run the core. Each job has a time limit, because a thread that computes hears nothing until it ends. */
export class NumericPool {
  readonly #size: number;
  readonly #script: string;
  readonly #queue = new FairQueue<Task>(LIMITS);
  readonly #running = new Map<Worker, Run>();
  #idle: Worker[] = [];

  constructor(size: number, script: string) {
    this.#size = size;
    this.#script = script;
  }

  run(job: ChecksJob, options: NumericOptions): Promise<PlantChecks>;
  run(job: DesignJob, options: NumericOptions): Promise<Evidence>;
  run(job: EvaluationJob, options: NumericOptions): Promise<PlantVerdict>;
  run(job: NumericJob, options: NumericOptions): Promise<NumericValue>;
  /**
   * @throws NumericalError as the core threw it; DomainError `busy` when the line is full, `unsolvable` when time or memory ran
   * out; the signal's reason when aborted
   */
  async run(job: NumericJob, { teamId, timeoutMs = TIMEOUT_MS, signal }: NumericOptions): Promise<NumericValue> {
    signal?.throwIfAborted();
    let giveUp = () => {};
    try {
      return await new Promise<NumericValue>((resolve, reject) => {
        const task: Task = { job, teamId, timeoutMs, resolve, reject };
        if (!this.#queue.join(task)) return reject(busy());
        giveUp = () => this.#abandon(task, signal?.reason);
        signal?.addEventListener("abort", giveUp);
        this.#dispatch();
      });
    } finally {
      signal?.removeEventListener("abort", giveUp);
    }
  }

  /** Ends every thread; whatever runs or waits is told to come again. */
  async close(): Promise<void> {
    for (const task of this.#queue.drain()) task.reject(busy());
    const workers = [...this.#idle, ...this.#running.keys()];
    for (const worker of workers) this.#stop(worker, busy());
    await Promise.all(workers.map((worker) => worker.terminate()));
  }

  #dispatch(): void {
    while (this.#running.size < this.#size) {
      const task = this.#queue.next();
      if (!task) return;
      const worker = this.#idle.pop() ?? this.#spawn();
      worker.ref();
      const timer = setTimeout(() => this.#stop(worker, outOfTime(task.timeoutMs)), task.timeoutMs);
      this.#running.set(worker, { task, timer });
      worker.postMessage(task.job);
    }
  }

  #spawn(): Worker {
    const worker = new Worker(this.#script, { env: {}, execArgv: [], resourceLimits: { maxOldGenerationSizeMb: HEAP_MB } });
    worker.on("message", (answer: NumericAnswer) => {
      const run = this.#release(worker);
      if (!run) return;
      worker.unref(); // an idle thread keeps no process alive
      this.#idle.push(worker);
      settle(run.task, answer);
      this.#dispatch();
    });
    worker.on("error", (error) => this.#stop(worker, crash(error)));
    worker.on("exit", () => this.#stop(worker, new Error("A numeric worker ended while it computed.")));
    return worker;
  }

  /** Ends a thread, and the job it runs with `reason`; the next job gets a new thread. */
  #stop(worker: Worker, reason: unknown): void {
    this.#idle = this.#idle.filter((other) => other !== worker);
    const run = this.#release(worker);
    void worker.terminate();
    if (!run) return;
    run.task.reject(reason);
    this.#dispatch();
  }

  #release(worker: Worker): Run | undefined {
    const run = this.#running.get(worker);
    if (!run) return undefined;
    clearTimeout(run.timer);
    this.#running.delete(worker);
    this.#queue.finished(run.task.teamId);
    return run;
  }

  #abandon(task: Task, reason: unknown): void {
    if (this.#queue.leave(task)) task.reject(reason);
    for (const [worker, run] of this.#running) if (run.task === task) this.#stop(worker, reason);
  }
}

function settle({ resolve, reject }: Task, answer: NumericAnswer): void {
  if (answer.outcome === "done") resolve(answer.value);
  else if (answer.outcome === "refused") reject(new NumericalError(answer.code, answer.data));
  else reject(new Error(`The core failed: ${answer.message}`, { cause: answer.stack }));
}

function busy(): DomainError {
  return new DomainError("busy", "Too many computations are waiting. Try again in a few seconds.", { retryAfter: RETRY_SECONDS });
}

function outOfTime(timeoutMs: number): DomainError {
  const seconds = timeoutMs / 1000;
  const words = `The computation was stopped after ${seconds} seconds.`;
  return new DomainError("unsolvable", words, { code: "time-limit", data: { seconds } });
}

function crash(error: unknown): unknown {
  if (!(error instanceof Error) || !("code" in error) || error.code !== "ERR_WORKER_OUT_OF_MEMORY") return error;
  const words = "The computation needed more memory than one may use.";
  return new DomainError("unsolvable", words, { code: "too-large", data: { what: "memory" } });
}
