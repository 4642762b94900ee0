import type { LiveAnswer, LiveJob, LiveTask, LiveValues } from "./live-messages";

/** A worker that is at it for longer than this is ended when something newer is asked for: it cannot be interrupted otherwise. */
const PATIENCE_MS = 400;
const LONGEST_MS = 30_000;

export type LiveOutcome<Value> =
  | { readonly kind: "done"; readonly value: Value }
  /** Something newer was asked for, or somebody pressed Stop. */
  | { readonly kind: "dropped" }
  | { readonly kind: "too-long" }
  /** The browser runs no worker, or the worker itself failed. */
  | { readonly kind: "broken" };

type Asked = {
  readonly job: LiveJob;
  readonly answer: (outcome: LiveOutcome<LiveValues[LiveTask["kind"]]>) => void;
  readonly progress: ((done: number) => void) | undefined;
};
type Running = Asked & { readonly since: number; readonly limit: ReturnType<typeof setTimeout> };

/** One worker, one job at a time: the newest request wins, those in between are dropped unsolved. */
export class LiveWorker {
  readonly #makeWorker: () => Worker;
  #worker: Worker | null = null;
  #running: Running | null = null;
  #waiting: Asked | null = null;
  #lastId = 0;

  constructor(makeWorker: () => Worker) {
    this.#makeWorker = makeWorker;
  }

  /** `progress` is told how many parts of the work are done. */
  run<Task extends LiveTask>(task: Task, progress?: (done: number) => void): Promise<LiveOutcome<LiveValues[Task["kind"]]>> {
    return new Promise((resolve) => {
      this.#waiting?.answer({ kind: "dropped" });
      // The worker answers a job of a kind with a value of that kind.
      const answer = resolve as Asked["answer"];
      this.#waiting = { job: { ...task, id: ++this.#lastId }, answer, progress };
      if (this.#running && performance.now() - this.#running.since > PATIENCE_MS) this.#endRunning({ kind: "dropped" });
      this.#startNext();
    });
  }

  /** Gives up whatever is asked for and ends the worker; the next request starts another. */
  stop(): void {
    this.#waiting?.answer({ kind: "dropped" });
    this.#waiting = null;
    this.#endRunning({ kind: "dropped" });
  }

  #startNext(): void {
    const next = this.#waiting;
    if (this.#running || !next) return;
    this.#waiting = null;
    const worker = this.#workerOrNull();
    if (!worker) {
      next.answer({ kind: "broken" });
      return;
    }
    const limit = setTimeout(() => this.#endRunning({ kind: "too-long" }), LONGEST_MS);
    this.#running = { ...next, since: performance.now(), limit };
    worker.postMessage(next.job);
  }

  #workerOrNull(): Worker | null {
    if (this.#worker) return this.#worker;
    try {
      const worker = this.#makeWorker();
      worker.addEventListener("message", ({ data }: MessageEvent<LiveAnswer>) => this.#told(data));
      // One that was ended while its program was still being fetched may say so late: that is not the present one's failure.
      worker.addEventListener("error", () => worker === this.#worker && this.#endRunning({ kind: "broken" }));
      this.#worker = worker;
    } catch {
      return null; // no workers here: the caller has another way
    }
    return this.#worker;
  }

  #told(answer: LiveAnswer): void {
    if (answer.id !== this.#running?.job.id) return;
    if (answer.outcome === "progress") this.#running.progress?.(answer.done);
    else if (answer.outcome === "failed") this.#endRunning({ kind: "broken" });
    else this.#settle({ kind: "done", value: answer.value });
  }

  /** Ends the worker with what it is doing. */
  #endRunning(outcome: LiveOutcome<never>): void {
    this.#worker?.terminate();
    this.#worker = null;
    this.#settle(outcome);
  }

  #settle(outcome: LiveOutcome<LiveValues[LiveTask["kind"]]>): void {
    const done = this.#running;
    this.#running = null;
    if (done) clearTimeout(done.limit);
    done?.answer(outcome);
    this.#startNext();
  }
}
